package turnstone.fisher;

import java.util.Arrays;

/**
 * What is needed to judge the energy of a record outside the span of the axes, in head-output units.
 *
 * <p>With Q the orthonormal rows of {@link #basis()}, R = I − QᵀQ and Sw the within scatter over its degrees of freedom (no ridge),
 * the energy |R(x − m)|² of a record about the mean of its own material has expectation tr(R·Sw); it is compared with a multiple of
 * χ² of tr(R·Sw)²/tr((R·Sw)²) degrees of freedom (F. E. Satterthwaite, Biometrics Bulletin 2, 1946, 110–114).
 */
public final class ResidualNorm {
    private final double[][] basis;
    private final double expectedEnergy;
    private final double effectiveDegreesOfFreedom;

    /**
     * Takes copies.
     *
     * @param basis r orthonormal rows of d numbers
     * @param expectedEnergy tr(R·Sw), squared head-output units; 0 where the axes span everything
     * @param effectiveDegreesOfFreedom of the scaled χ²; 0 where the energy is 0
     */
    public ResidualNorm(double[][] basis, double expectedEnergy, double effectiveDegreesOfFreedom) {
        if (!(expectedEnergy >= 0) || !(effectiveDegreesOfFreedom >= 0)) {
            throw new IllegalArgumentException(
                    "negative energy or degrees of freedom: " + expectedEnergy + ", " + effectiveDegreesOfFreedom);
        }
        this.basis = copy(basis);
        this.expectedEnergy = expectedEnergy;
        this.effectiveDegreesOfFreedom = effectiveDegreesOfFreedom;
    }

    /** Orthonormal rows [r][d] that span the axes. */
    public double[][] basis() {
        return copy(basis);
    }

    /** Mean of |R(x − m)|² within the materials. */
    public double expectedEnergy() {
        return expectedEnergy;
    }

    /** Degrees of freedom of the χ² that the energy is compared with after scaling. */
    public double effectiveDegreesOfFreedom() {
        return effectiveDegreesOfFreedom;
    }

    /**
     * |R·deviation|² of one deviation from a mean.
     *
     * @param deviation d numbers in head-output units
     */
    public double energy(double[] deviation) {
        double[] left = deviation.clone();
        for (double[] row : basis) {
            double along = 0;
            for (int i = 0; i < row.length; i++) {
                along += row[i] * deviation[i];
            }
            for (int i = 0; i < row.length; i++) {
                left[i] -= along * row[i];
            }
        }
        double energy = 0;
        for (double value : left) {
            energy += value * value;
        }
        return energy;
    }

    private static double[][] copy(double[][] rows) {
        return Arrays.stream(rows).map(double[]::clone).toArray(double[][]::new);
    }
}
