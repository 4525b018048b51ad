package turnstone.fisher;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;

/**
 * S = RᵀD⁻¹R of a symmetric matrix in double-double, R upper triangular with the pivots D on its diagonal: Cholesky without roots.
 *
 * <p>Right-looking, in panels of {@link #PANEL} rows; the upper triangle is updated in tiles of {@link #TILE} columns, each element in the
 * order of the pivots, so the tiling leaves no trace in the result. A pivot at or below the limit is set aside: its row becomes zero and
 * the elimination goes on without it.
 */
final class Factor {
    /** Rows eliminated together: a panel of 32 rows of 256 columns, three arrays, stays in a second-level cache. */
    private static final int PANEL = 32;

    private static final int TILE = 256;

    private final ExtendedMatrix rows;
    private final double[] pivotHigh;
    private final double[] pivotLow;
    private final boolean[] setAside;

    private Factor(ExtendedMatrix rows) {
        this.rows = rows;
        pivotHigh = new double[rows.rows];
        pivotLow = new double[rows.rows];
        setAside = new boolean[rows.rows];
    }

    /**
     * Factors a matrix; its upper triangle is overwritten.
     *
     * @param limit pivots at or below it are set aside; negative infinity to keep all but exact zeros
     */
    static Factor of(ExtendedMatrix symmetric, double limit) {
        Factor factor = new Factor(symmetric);
        int d = symmetric.rows;
        ExtendedMatrix multipliers = new ExtendedMatrix(PANEL, d);
        double[][] tops = new double[PANEL][d];
        for (int first = 0; first < d; first += PANEL) {
            int end = Math.min(first + PANEL, d);
            factor.eliminatePanel(first, end, limit, multipliers);
            factor.updateTrailing(first, end, multipliers, tops);
        }
        return factor;
    }

    private void eliminatePanel(int first, int end, double limit, ExtendedMatrix multipliers) {
        int d = rows.columns;
        for (int k = first; k < end; k++) {
            DoubleDouble pivot = rows.at(k, k);
            pivotHigh[k] = pivot.high();
            pivotLow[k] = pivot.low();
            if (pivot.high() <= limit || pivot.high() == 0) {
                setAside[k] = true;
                Arrays.fill(rows.high[k], k, d, 0);
                Arrays.fill(rows.low[k], k, d, 0);
            }
            double[] factorHigh = multipliers.high[k - first];
            double[] factorLow = multipliers.low[k - first];
            System.arraycopy(rows.high[k], 0, factorHigh, 0, d);
            System.arraycopy(rows.low[k], 0, factorLow, 0, d);
            if (!setAside[k]) {
                DoubleDouble factor = DoubleDouble.ONE.over(pivot).negated();
                Kernels.scale(factor.high(), factor.low(), factorHigh, factorLow, k, d);
            }
            for (int i = k + 1; i < end; i++) {
                Kernels.multiplyAdd(
                        factorHigh[i], factorLow[i], rows.high[k], rows.low[k], rows.high[i], rows.low[i], i, d);
            }
        }
    }

    private void updateTrailing(int first, int end, ExtendedMatrix multipliers, double[][] tops) {
        int d = rows.columns;
        for (int k = first; k < end; k++) {
            for (int j = end; j < d; j++) {
                tops[k - first][j] = Kernels.top(rows.high[k][j]);
            }
        }
        for (int tile = end; tile < d; tile += TILE) {
            int tileEnd = Math.min(tile + TILE, d);
            for (int i = end; i < tileEnd; i++) {
                int from = Math.max(i, tile);
                updateRow(first, end, i, from, tileEnd, multipliers, tops);
            }
        }
    }

    /** Row i less its multiples of the panel's rows, columns {@code from} to {@code to}. */
    private void updateRow(int first, int end, int i, int from, int to, ExtendedMatrix multipliers, double[][] tops) {
        for (int k = first; k < end; k++) {
            int m = k - first;
            subtract(
                    multipliers.high[m][i],
                    multipliers.low[m][i],
                    rows.high[k],
                    rows.low[k],
                    tops[m],
                    rows.high[i],
                    rows.low[i],
                    from,
                    to);
        }
    }

    /** {@link Kernels#multiplyAdd} with the upper halves of x given: y[j] += a·x[j]. */
    private static void subtract(
            double aHigh,
            double aLow,
            double[] xHigh,
            double[] xLow,
            double[] xTops,
            double[] yHigh,
            double[] yLow,
            int from,
            int to) {
        double aTop = Kernels.top(aHigh);
        double aRest = aHigh - aTop;
        for (int j = from; j < to; j++) {
            double x = xHigh[j];
            double xTop = xTops[j];
            double xRest = x - xTop;
            double p = aHigh * x;
            double e = ((aTop * xTop - p) + aTop * xRest + aRest * xTop) + aRest * xRest;
            e += aHigh * xLow[j] + aLow * x;
            double y = yHigh[j];
            double s = y + p;
            double part = s - y;
            double rest = ((y - (s - part)) + (p - part)) + (e + yLow[j]);
            double sum = s + rest;
            yHigh[j] = sum;
            yLow[j] = rest - (sum - s);
        }
    }

    int size() {
        return rows.rows;
    }

    DoubleDouble pivot(int k) {
        return new DoubleDouble(pivotHigh[k], pivotLow[k]);
    }

    /** R: row k holds the unscaled elements at and right of the diagonal. */
    ExtendedMatrix rows() {
        return rows;
    }

    /** Indexes whose pivots were at or below the limit. */
    List<Integer> setAside() {
        List<Integer> list = new ArrayList<>();
        for (int k = 0; k < setAside.length; k++) {
            if (setAside[k]) {
                list.add(k);
            }
        }
        return list;
    }

    /** Number of pivots that are not positive: eigenvalues that are not, by Sylvester's law of inertia. */
    int nonPositivePivots() {
        int count = 0;
        for (double pivot : pivotHigh) {
            count += pivot > 0 ? 0 : 1;
        }
        return count;
    }

    /**
     * Column k as a combination of the columns before it that were not set aside: the coefficients, zero elsewhere.
     *
     * <p>For a column set aside these are what it depends on.
     */
    double[] combination(int k) {
        DoubleDouble[] coefficients = new DoubleDouble[k];
        for (int i = k - 1; i >= 0; i--) {
            DoubleDouble rest = DoubleDouble.ZERO;
            if (!setAside[i]) {
                rest = rows.at(i, k);
                for (int j = i + 1; j < k; j++) {
                    rest = rest.minus(rows.at(i, j).times(coefficients[j]));
                }
                rest = rest.over(pivot(i));
            }
            coefficients[i] = rest;
        }
        return Arrays.stream(coefficients).mapToDouble(DoubleDouble::high).toArray();
    }
}
