package turnstone.decide;

import java.util.function.DoubleUnaryOperator;

/**
 * Quantiles of the normal, chi-square, Student and beta laws, the same bits on every JVM.
 *
 * <p>Each is found by halving a bracket of its distribution function until the two ends are neighbours or the bracket is under 1e-14
 * relative: slow (some microseconds) and free of surprises. Relative error about 1e-12. A probability outside (0, 1) or degrees of freedom
 * that are not positive are refused with {@link IllegalArgumentException}.
 */
public final class Quantiles {
    private static final double NARROW = 1e-14;
    private static final int MOST_HALVINGS = 2_000;

    private Quantiles() {}

    /** The z with P(Z ≤ z) = probability for the standard normal law. */
    public static double normal(double probability) {
        require(probability);
        if (probability < 0.5) {
            return -normal(1 - probability);
        }
        // P(|Z| ≤ z) is chi-square with one degree of freedom in z².
        double both = 2 * probability - 1;
        return both == 0 ? 0 : Math.sqrt(chiSquare(both, 1));
    }

    /** The x with P(X ≤ x) = probability for chi-square with the stated degrees of freedom, whole or not. */
    public static double chiSquare(double probability, double degreesOfFreedom) {
        require(probability);
        requirePositive(degreesOfFreedom);
        return inverse(
                x -> SpecialFunctions.lowerGamma(degreesOfFreedom / 2, x / 2), probability, degreesOfFreedom + 1);
    }

    /** The t with P(T ≤ t) = probability for Student's law with the stated degrees of freedom, whole or not. */
    public static double student(double probability, double degreesOfFreedom) {
        require(probability);
        requirePositive(degreesOfFreedom);
        if (probability < 0.5) {
            return -student(1 - probability, degreesOfFreedom);
        }
        double both = 2 * probability - 1;
        if (both == 0) {
            return 0;
        }
        return inverse(t -> withinStudent(t, degreesOfFreedom), both, 1);
    }

    /** The lower Clopper–Pearson bound of a share: the p under which {@code hits} or more of {@code of} have probability 1 − confidence. */
    public static double shareLower(long hits, long of, double confidence) {
        requireCount(hits, of);
        require(confidence);
        return hits == 0 ? 0 : betaInverse(1 - confidence, (double) hits, of - hits + 1.0);
    }

    /** The upper Clopper–Pearson bound of a share: the p under which {@code hits} or fewer of {@code of} have probability 1 − confidence. */
    public static double shareUpper(long hits, long of, double confidence) {
        requireCount(hits, of);
        require(confidence);
        return hits == of ? 1 : betaInverse(confidence, hits + 1.0, (double) (of - hits));
    }

    /** P(T ≤ t) for Student's law with the stated degrees of freedom, whole or not. */
    public static double studentShare(double t, double degreesOfFreedom) {
        requirePositive(degreesOfFreedom);
        double half = withinStudent(t, degreesOfFreedom) / 2;
        return t < 0 ? 0.5 - half : 0.5 + half;
    }

    private static double withinStudent(double t, double degreesOfFreedom) {
        double square = t * t;
        return SpecialFunctions.beta(0.5, degreesOfFreedom / 2, square / (degreesOfFreedom + square));
    }

    private static double betaInverse(double probability, double a, double b) {
        return halve(x -> SpecialFunctions.beta(a, b, x), probability, 0, 1);
    }

    private static double inverse(DoubleUnaryOperator distribution, double probability, double firstGuess) {
        double high = firstGuess;
        while (distribution.applyAsDouble(high) < probability) {
            high *= 2;
        }
        return halve(distribution, probability, 0, high);
    }

    private static double halve(DoubleUnaryOperator distribution, double probability, double from, double to) {
        double low = from;
        double high = to;
        for (int i = 0; i < MOST_HALVINGS && high - low > NARROW * high; i++) {
            double middle = low + (high - low) / 2;
            if (distribution.applyAsDouble(middle) < probability) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return low + (high - low) / 2;
    }

    private static void require(double probability) {
        if (!(probability > 0 && probability < 1)) {
            throw new IllegalArgumentException("a probability lies between 0 and 1, not " + probability);
        }
    }

    private static void requirePositive(double degreesOfFreedom) {
        if (!(degreesOfFreedom > 0 && degreesOfFreedom < Double.POSITIVE_INFINITY)) {
            throw new IllegalArgumentException("degrees of freedom are positive, not " + degreesOfFreedom);
        }
    }

    private static void requireCount(long hits, long of) {
        if (hits < 0 || of <= 0 || hits > of) {
            throw new IllegalArgumentException("no share: " + hits + " of " + of);
        }
    }
}
