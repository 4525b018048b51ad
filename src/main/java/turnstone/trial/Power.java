package turnstone.trial;

import java.util.OptionalDouble;
import turnstone.decide.Quantiles;

/** What a number of nights could show, from the spread between blocks that was seen. */
final class Power {
    /** Beyond this many nights a plant has changed: it is no use to wait. */
    static final int MOST_NIGHTS = 99;

    private Power() {}

    /**
     * The share of trials whose one-sided bound lies above a value that the truth exceeds by {@code beyond}.
     *
     * <p>Student's law moved by beyond/error stands for the non-central one: within a point of it from 10 degrees of freedom on.
     */
    static double shown(double beyond, double error, int degreesOfFreedom, double confidence) {
        if (error == 0) {
            return beyond > 0 ? 1 : 0;
        }
        double quantile = Quantiles.student(confidence, degreesOfFreedom);
        return 1 - Quantiles.studentShare(quantile - beyond / error, degreesOfFreedom);
    }

    /** The least number of nights for which t·deviation/√blocks is under {@code found}; empty where that is none, or past all waiting. */
    static OptionalDouble nights(double found, double blockDeviation, double blocksPerNight, double confidence) {
        for (int nights = 1; found > 0 && nights <= MOST_NIGHTS; nights++) {
            double blocks = blocksPerNight * nights;
            if (blocks >= 2 && Quantiles.student(confidence, blocks - 1) * blockDeviation / Math.sqrt(blocks) < found) {
                return OptionalDouble.of(nights);
            }
        }
        return OptionalDouble.empty();
    }
}
