package turnstone.fisher;

import java.util.Optional;
import turnstone.fault.Fault;

/**
 * Finds directions whose within variance is no larger than that of the rounding to counts, step²/12 a channel, carried through the tail.
 *
 * <p>A direction x counts where x·Sw·x ≤ t·x·N·x with t = 1 for lossless counts, 2 for rounded ones, and N = T·diag(step²/12)·Tᵀ. An eigenvalue of that pencil is estimated
 * first; only where it is near the limit are the directions counted, by the signs of the pivots of Sw − limit·N (Sylvester's law of inertia).
 */
final class RoundingNoise {
    /** Lossless counts: what is below the variance of even rounding is remarked upon. */
    private static final double LOSSLESS_TIMES = 1;

    /** Rounded counts: a sample of the variance of even rounding seldom passes twice its expectation. */
    private static final double ROUNDED_TIMES = 2;

    /** How far above the limit an estimate may lie and still be looked at closely: it is good to a percent. */
    private static final double NEAR = 1.5;

    private final FitRequest request;
    private final Scatter scatter;
    private final double[] roundingVariance;

    RoundingNoise(FitRequest request, Scatter scatter) {
        this.request = request;
        this.scatter = scatter;
        roundingVariance = new double[request.scale().channels()];
        for (int i = 0; i < roundingVariance.length; i++) {
            double step = request.scale().step(i);
            roundingVariance[i] = step * step / 12;
        }
    }

    /**
     * A remark where the counts are lossless and the directions may be real; nothing where there are none.
     *
     * @throws Fault of kind input where the counts are rounded
     */
    Optional<String> check(SpectralEstimate estimate, double[] equilibration) {
        double times = request.roundedSource() == RoundedSource.ROUNDED ? ROUNDED_TIMES : LOSSLESS_TIMES;
        double limit = times * scatter.degreesOfFreedom();
        double smallest = estimate.smallestAgainst(x -> noise(x, equilibration));
        if (smallest > NEAR * limit) {
            return Optional.empty();
        }
        int count = count(limit);
        if (count == 0) {
            return Optional.empty();
        }
        String found = count + " of " + scatter.within().columns
                + " directions have a within variance no larger than that of rounding to the count scale";
        if (request.roundedSource() == RoundedSource.ROUNDED) {
            throw Fault.input("the fit would rest on rounding noise: " + found)
                    .expected("a ridge")
                    .remedy("give a ridge between 1e-8 and 0.1, such as 0.001");
        }
        return Optional.of(
                found + "; the counts hold the source without loss, so they may be real: try a ridge beside this fit");
    }

    private double[] noise(double[] x, double[] equilibration) {
        double[] unscaled = new double[x.length];
        for (int i = 0; i < x.length; i++) {
            unscaled[i] = x[i] * equilibration[i];
        }
        double[] image = scatter.tail().diagonalSandwich(roundingVariance, unscaled);
        for (int i = 0; i < x.length; i++) {
            image[i] *= equilibration[i];
        }
        return image;
    }

    /** Eigenvalues of W − limit·N that are not positive. */
    private int count(double limit) {
        int d = roundingVariance.length;
        ExtendedMatrix diagonal = new ExtendedMatrix(d, d);
        for (int i = 0; i < d; i++) {
            diagonal.set(i, i, DoubleDouble.of(roundingVariance[i]));
        }
        ExtendedMatrix noise = scatter.tail().sandwich(diagonal);
        ExtendedMatrix difference = scatter.within().copy();
        double[] powers = WithinFactor.equilibrate(difference);
        WithinFactor.scale(noise, powers);
        for (int i = 0; i < difference.rows; i++) {
            difference.addRow(i, DoubleDouble.of(-limit), noise, i);
        }
        return Factor.of(difference, Double.NEGATIVE_INFINITY).nonPositivePivots();
    }
}
