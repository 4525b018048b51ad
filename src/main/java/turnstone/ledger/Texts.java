package turnstone.ledger;

import java.nio.charset.StandardCharsets;

/** The rule for names that the ledger keeps: not empty, and short enough for the two length bytes of the part layouts. */
final class Texts {
    private static final int MOST_BYTES = 65_535;

    private Texts() {}

    static String check(String what, String text) {
        if (text == null || text.isEmpty() || text.getBytes(StandardCharsets.UTF_8).length > MOST_BYTES) {
            throw new IllegalArgumentException(what + " is missing, empty or too long: " + text);
        }
        return text;
    }
}
