package turnstone.cli;

import com.fasterxml.jackson.core.io.NumberOutput;

/** Numbers as printed: the same digits on every JVM. */
final class Figures {
    private Figures() {}

    /** The shortest decimal that reads back as the same double. */
    static String shortest(double value) {
        return NumberOutput.toString(value, true);
    }
}
