package turnstone.trial;

import java.util.OptionalDouble;

/** Intervals of shares on the scale ln(f/(1 − f)), where they are nearly symmetric and stay between 0 and 1. */
final class Logit {
    private Logit() {}

    static double of(double share) {
        return StrictMath.log(share / (1 - share));
    }

    static double back(double logit) {
        return 1 / (1 + StrictMath.exp(-logit));
    }

    /** The interval of a share whose ends lie {@code reach} away to first order. */
    static Estimate around(double point, double reach, double confidence, double df, int count) {
        return between(point, of(point), reach / (point * (1 - point)), confidence, df, count);
    }

    /** The interval with its middle and reach on the logit scale. */
    static Estimate between(double point, double middle, double reach, double confidence, double df, int count) {
        return new Estimate(
                OptionalDouble.of(point),
                OptionalDouble.of(back(middle - reach)),
                OptionalDouble.of(back(middle + reach)),
                confidence,
                OptionalDouble.of(df),
                count,
                "");
    }
}
