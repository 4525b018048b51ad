package turnstone.fisher;

import java.util.Arrays;

/** Sums over the within scatter in head-output units, without ridge, that are wanted to a few digits only: in doubles, in index order. */
final class WithinEnergy {
    /** A vector that lost all but this share of its length to the others lies in their span. */
    private static final double IN_SPAN = 1e-8;

    private final double[][] within;
    private final int d;
    private final double degreesOfFreedom;

    WithinEnergy(ExtendedMatrix within, long degreesOfFreedom) {
        this.within = within.high;
        d = within.columns;
        this.degreesOfFreedom = degreesOfFreedom;
    }

    /** Largest length, in within-variance units, of what rounding the axes to doubles cuts off. */
    double storageCost(ExtendedMatrix axes) {
        double largest = 0;
        for (int i = 0; i < axes.rows; i++) {
            double[] cut = axes.low[i];
            double square = dot(times(cut), cut) / degreesOfFreedom;
            largest = Math.max(largest, square);
        }
        return Math.sqrt(largest);
    }

    /** Expected energy outside the span of the axes, and its effective degrees of freedom. */
    ResidualNorm outside(double[][] axes) {
        double[][] basis = orthonormal(axes);
        int r = basis.length;
        double[][] images = new double[r][];
        for (int k = 0; k < r; k++) {
            images[k] = times(basis[k]);
        }
        // R·W·R = W − QᵀG − GᵀQ + Qᵀ(G·Qᵀ)Q with G = Q·W, row by row: traces without cancellation of large sums.
        double[][] both = new double[r][];
        for (int k = 0; k < r; k++) {
            both[k] = images[k].clone();
            for (int m = 0; m < r; m++) {
                add(-dot(images[k], basis[m]), basis[m], both[k]);
            }
        }
        double trace = 0;
        double squares = 0;
        double whole = 0;
        double[] row = new double[d];
        for (int i = 0; i < d; i++) {
            System.arraycopy(within[i], 0, row, 0, d);
            whole += row[i];
            for (int k = 0; k < r; k++) {
                add(-basis[k][i], both[k], row);
                add(-images[k][i], basis[k], row);
            }
            trace += row[i];
            squares += dot(row, row);
        }
        if (r >= d || trace <= whole * IN_SPAN * IN_SPAN) {
            return new ResidualNorm(basis, 0, 0);
        }
        return new ResidualNorm(basis, trace / degreesOfFreedom, trace * trace / squares);
    }

    /** Gram–Schmidt, twice over; zero axes and those in the span of the ones before are left out. */
    private static double[][] orthonormal(double[][] axes) {
        double[][] basis = new double[axes.length][];
        int count = 0;
        for (double[] axis : axes) {
            double[] vector = axis.clone();
            double before = Math.sqrt(dot(vector, vector));
            if (before == 0) {
                continue;
            }
            for (int pass = 0; pass < 2; pass++) {
                for (int k = 0; k < count; k++) {
                    add(-dot(vector, basis[k]), basis[k], vector);
                }
            }
            double length = Math.sqrt(dot(vector, vector));
            if (length <= before * IN_SPAN) {
                continue;
            }
            for (int i = 0; i < vector.length; i++) {
                vector[i] /= length;
            }
            basis[count++] = vector;
        }
        return Arrays.copyOf(basis, count);
    }

    private double[] times(double[] vector) {
        double[] image = new double[d];
        for (int i = 0; i < d; i++) {
            add(vector[i], within[i], image);
        }
        return image;
    }

    private static void add(double a, double[] x, double[] y) {
        for (int i = 0; i < y.length; i++) {
            y[i] += a * x[i];
        }
    }

    private static double dot(double[] a, double[] b) {
        double sum = 0;
        for (int i = 0; i < a.length; i++) {
            sum += a[i] * b[i];
        }
        return sum;
    }
}
