package turnstone.trial;

import java.util.OptionalDouble;

/**
 * A figure with the interval that its showings support.
 *
 * @param point the figure; empty where there is none
 * @param lower the lower end; empty where it is not given
 * @param upper the upper end; empty where it is not given
 * @param confidence of the two ends together; each end alone errs with half of what is left
 * @param degreesOfFreedom of the interval; empty where it does not rest on a spread of showings
 * @param showings counted
 * @param note what a reader must know: why an end is not given, or what a bound rests on; empty where there is nothing to say
 */
public record Estimate(
        OptionalDouble point,
        OptionalDouble lower,
        OptionalDouble upper,
        double confidence,
        OptionalDouble degreesOfFreedom,
        int showings,
        String note) {

    static Estimate notGiven(double confidence, int showings, String why) {
        OptionalDouble none = OptionalDouble.empty();
        return new Estimate(none, none, none, confidence, none, showings, why);
    }

    static Estimate pointOnly(double point, double confidence, int showings, String why) {
        OptionalDouble none = OptionalDouble.empty();
        return new Estimate(OptionalDouble.of(point), none, none, confidence, none, showings, why);
    }
}
