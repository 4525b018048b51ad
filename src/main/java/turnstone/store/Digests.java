package turnstone.store;

import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.HexFormat;
import java.util.regex.Pattern;

/** SHA-256 as this package writes it: 64 lower-case hexadecimal digits. */
final class Digests {
    private static final Pattern SHA256 = Pattern.compile("[0-9a-f]{64}");

    private Digests() {}

    static MessageDigest sha256() {
        try {
            return MessageDigest.getInstance("SHA-256");
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException(e);
        }
    }

    static String hex(MessageDigest digest) {
        return HexFormat.of().formatHex(digest.digest());
    }

    static boolean isSha256(String text) {
        return SHA256.matcher(text).matches();
    }
}
