package turnstone.plant;

import java.math.BigInteger;
import java.nio.charset.StandardCharsets;
import java.util.Map;
import turnstone.json.Json;

/**
 * Deals trays into groups that are held out together.
 *
 * <p>A listed tray goes where the plant file says. Any other goes by its name: the number at its end modulo the number of groups, else the first 8
 * hexadecimal digits of the SHA-256 of {@code material/tray} (UTF-8) modulo the number of groups.
 *
 * @param count groups, 1 to 8
 * @param listed material to tray to group, groups counted from 0
 */
public record TrayDeal(int count, Map<String, Map<String, Integer>> listed) {
    /** The most groups there may be. */
    public static final int MOST_GROUPS = 8;

    private static final int DIGEST_DIGITS = 8;

    /** Keeps a copy. */
    public TrayDeal {
        listed = listed.entrySet().stream()
                .collect(java.util.stream.Collectors.toUnmodifiableMap(
                        Map.Entry::getKey, e -> Map.copyOf(e.getValue())));
    }

    /** The group of a tray, from 0. */
    public int group(String material, String tray) {
        Integer stated = listed.getOrDefault(material, Map.of()).get(tray);
        if (stated != null) {
            return stated;
        }
        int digits = tray.length();
        while (digits > 0 && isDigit(tray.charAt(digits - 1))) {
            digits--;
        }
        BigInteger number = digits < tray.length()
                ? new BigInteger(tray.substring(digits))
                : new BigInteger(
                        Json.sha256((material + "/" + tray).getBytes(StandardCharsets.UTF_8))
                                .substring(0, DIGEST_DIGITS),
                        16);
        return number.mod(BigInteger.valueOf(count)).intValueExact();
    }

    private static boolean isDigit(char c) {
        return c >= '0' && c <= '9';
    }
}
