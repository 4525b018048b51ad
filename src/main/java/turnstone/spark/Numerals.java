package turnstone.spark;

import com.fasterxml.jackson.core.io.NumberOutput;

/** Numbers as their shortest round-trip decimals, the same on every JVM. */
final class Numerals {
    private Numerals() {}

    static String shortest(double value) {
        return NumberOutput.toString(value, true);
    }

    static String shortest(float value) {
        return NumberOutput.toString(value, true);
    }
}
