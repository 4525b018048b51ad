package turnstone.fisher;

/**
 * Triangular solutions with a {@link Factor} of a positive definite matrix: from rows b to D^(-1/2)·L⁻¹·b and back.
 *
 * <p>With S = L·D·Lᵀ and white = D^(-1/2)·L⁻¹, white·S·whiteᵀ = I. Right sides are rows of a matrix, overwritten.
 */
final class Whitening {
    private final Factor factor;
    private final int size;
    private final double[] minusInverseHigh;
    private final double[] minusInverseLow;
    private final DoubleDouble[] inverseRoots;

    Whitening(Factor factor) {
        this.factor = factor;
        size = factor.size();
        minusInverseHigh = new double[size];
        minusInverseLow = new double[size];
        inverseRoots = new DoubleDouble[size];
        for (int k = 0; k < size; k++) {
            DoubleDouble inverse = DoubleDouble.ONE.over(factor.pivot(k)).negated();
            minusInverseHigh[k] = inverse.high();
            minusInverseLow[k] = inverse.low();
            inverseRoots[k] = DoubleDouble.ONE.over(factor.pivot(k).root());
        }
    }

    /** Each row b becomes D^(-1/2)·L⁻¹·b. */
    void whiten(ExtendedMatrix right) {
        ExtendedMatrix rows = factor.rows();
        for (int row = 0; row < right.rows; row++) {
            for (int k = 0; k < size; k++) {
                DoubleDouble z = right.at(row, k);
                DoubleDouble multiplier = z.times(new DoubleDouble(minusInverseHigh[k], minusInverseLow[k]));
                Kernels.multiplyAdd(
                        multiplier.high(),
                        multiplier.low(),
                        rows.high[k],
                        rows.low[k],
                        right.high[row],
                        right.low[row],
                        k + 1,
                        size);
                right.set(row, k, z.times(inverseRoots[k]));
            }
        }
    }

    /** Each row u becomes L⁻ᵀ·D^(-1/2)·u. */
    void unwhiten(ExtendedMatrix right) {
        // Column i of Lᵀ is row i of L: transposed once, so that the inner loop runs along rows.
        ExtendedMatrix lower = unitLower();
        for (int row = 0; row < right.rows; row++) {
            for (int k = 0; k < size; k++) {
                right.set(row, k, right.at(row, k).times(inverseRoots[k]));
            }
            for (int i = size - 1; i > 0; i--) {
                DoubleDouble multiplier = right.at(row, i).negated();
                Kernels.multiplyAdd(
                        multiplier.high(),
                        multiplier.low(),
                        lower.high[i],
                        lower.low[i],
                        right.high[row],
                        right.low[row],
                        0,
                        i);
            }
        }
    }

    private ExtendedMatrix unitLower() {
        ExtendedMatrix scaled = factor.rows().copy();
        for (int k = 0; k < size; k++) {
            Kernels.scale(-minusInverseHigh[k], -minusInverseLow[k], scaled.high[k], scaled.low[k], k, size);
        }
        return scaled.transposed();
    }
}
