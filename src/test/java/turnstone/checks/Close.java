package turnstone.checks;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

/** Comparison within a relative bound. */
final class Close {
    private Close() {}

    static void relative(String what, double[] found, double[] expected, double bound) {
        assertThat(found).as(what).hasSameSizeAs(expected);
        for (int i = 0; i < found.length; i++) {
            assertThat(found[i])
                    .as("%s, number %d", what, i + 1)
                    .isCloseTo(expected[i], within(bound * Math.abs(expected[i])));
        }
    }

    /** Components within a bound relative to the largest of them, up to one common sign. */
    static void upToSign(String what, double[] found, double[] expected, double bound) {
        double largest = 0;
        int at = 0;
        for (int i = 0; i < expected.length; i++) {
            if (Math.abs(expected[i]) > largest) {
                largest = Math.abs(expected[i]);
                at = i;
            }
        }
        double sign = Math.signum(found[at]) * Math.signum(expected[at]);
        for (int i = 0; i < expected.length; i++) {
            assertThat(sign * found[i])
                    .as("%s, component %d", what, i + 1)
                    .isCloseTo(expected[i], within(bound * largest));
        }
    }
}
