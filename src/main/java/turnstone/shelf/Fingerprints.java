package turnstone.shelf;

import java.util.regex.Pattern;
import turnstone.fault.Fault;

/** The rules for fingerprints as people type them. */
final class Fingerprints {
    private static final Pattern WHOLE = Pattern.compile("[0-9a-f]{64}");
    /** Eight digits: among a thousand models two share them once in ten thousand shelves. */
    private static final Pattern PREFIX = Pattern.compile("[0-9a-f]{8,64}");

    private Fingerprints() {}

    static boolean isWhole(String text) {
        return text != null && WHOLE.matcher(text).matches();
    }

    static void checkPrefix(String prefix) {
        if (prefix == null || !PREFIX.matcher(prefix).matches()) {
            throw Fault.usage("not a model's fingerprint")
                    .found(prefix)
                    .expected("its first 8 or more hexadecimal digits, in lower case");
        }
    }
}
