package turnstone.fisher;

import java.util.function.UnaryOperator;

/**
 * Extreme eigenvalues from a factor, to about a percent, by power iteration in doubles.
 *
 * <p>Doubles are enough: the factor's condition is the root of the matrix's. The start and the order of operations are fixed, so the estimate
 * is the same everywhere.
 */
final class SpectralEstimate {
    private static final double ENOUGH = 1e-3;
    private static final int MOST_STEPS = 200;

    private final int size;
    private final double[][] rows;
    private final double[] pivots;
    private final double[] unitDiagonal;

    SpectralEstimate(Factor factor) {
        size = factor.size();
        rows = factor.rows().high;
        pivots = new double[size];
        unitDiagonal = new double[size];
        for (int k = 0; k < size; k++) {
            pivots[k] = factor.pivot(k).high();
        }
        // Diagonal of S from S = RᵀD⁻¹R, since the factor overwrote it.
        for (int k = 0; k < size; k++) {
            for (int j = k; j < size; j++) {
                double element = rows[k][j];
                unitDiagonal[j] += element * element / pivots[k];
            }
        }
        for (int j = 0; j < size; j++) {
            unitDiagonal[j] = 1 / Math.sqrt(unitDiagonal[j]);
        }
    }

    /** Smallest over largest eigenvalue of the matrix scaled to unit diagonal. */
    double reciprocalCondition() {
        double largest = grow(x -> scaled(times(scaled(x))));
        double inverse = grow(x -> unscaled(solve(unscaled(x))));
        return 1 / (largest * inverse);
    }

    /** Largest eigenvalue of a symmetric positive operator. */
    private double grow(UnaryOperator<double[]> operator) {
        double[] x = start();
        double before = 0;
        for (int step = 0; step < MOST_STEPS; step++) {
            double[] y = operator.apply(x);
            double length = Math.sqrt(dot(y, y));
            for (int i = 0; i < size; i++) {
                y[i] /= length;
            }
            if (Math.abs(length - before) <= ENOUGH * length) {
                return length;
            }
            before = length;
            x = y;
        }
        return before;
    }

    /**
     * Smallest μ of S·x = μ·N·x, from above.
     *
     * @param noise x to N·x, symmetric and not negative, in the factor's scaling
     */
    double smallestAgainst(UnaryOperator<double[]> noise) {
        double[] x = start();
        double before = Double.POSITIVE_INFINITY;
        for (int step = 0; step < MOST_STEPS; step++) {
            double[] image = noise.apply(x);
            double[] y = solve(image);
            double quotient = dot(y, image) / dot(y, noise.apply(y));
            double length = Math.sqrt(dot(y, y));
            for (int i = 0; i < size; i++) {
                y[i] /= length;
            }
            if (Math.abs(quotient - before) <= ENOUGH * quotient) {
                return quotient;
            }
            before = quotient;
            x = y;
        }
        return before;
    }

    /** A unit vector with no pattern that data might share: the fractional parts of multiples of the golden ratio, signs alternating by parity. */
    private double[] start() {
        double[] x = new double[size];
        double fraction = 0.5;
        for (int i = 0; i < size; i++) {
            fraction += 0.6180339887498949;
            fraction -= fraction >= 1 ? 1 : 0;
            x[i] = 0.25 + fraction * ((i & 1) == 0 ? 1 : -1);
        }
        double length = Math.sqrt(dot(x, x));
        for (int i = 0; i < size; i++) {
            x[i] /= length;
        }
        return x;
    }

    private double[] scaled(double[] x) {
        double[] y = new double[size];
        for (int i = 0; i < size; i++) {
            y[i] = x[i] * unitDiagonal[i];
        }
        return y;
    }

    private double[] unscaled(double[] x) {
        double[] y = new double[size];
        for (int i = 0; i < size; i++) {
            y[i] = x[i] / unitDiagonal[i];
        }
        return y;
    }

    /** Rᵀ·D⁻¹·R·x. */
    private double[] times(double[] x) {
        double[] y = new double[size];
        for (int k = 0; k < size; k++) {
            double sum = 0;
            for (int j = k; j < size; j++) {
                sum += rows[k][j] * x[j];
            }
            double factor = sum / pivots[k];
            for (int j = k; j < size; j++) {
                y[j] += factor * rows[k][j];
            }
        }
        return y;
    }

    /** S⁻¹·b. */
    private double[] solve(double[] b) {
        double[] x = b.clone();
        for (int k = 0; k < size; k++) {
            double factor = x[k] / pivots[k];
            for (int j = k + 1; j < size; j++) {
                x[j] -= factor * rows[k][j];
            }
        }
        for (int k = size - 1; k >= 0; k--) {
            double sum = x[k];
            for (int j = k + 1; j < size; j++) {
                sum -= rows[k][j] * x[j];
            }
            x[k] = sum / pivots[k];
        }
        return x;
    }

    private static double dot(double[] a, double[] b) {
        double sum = 0;
        for (int i = 0; i < a.length; i++) {
            sum += a[i] * b[i];
        }
        return sum;
    }
}
