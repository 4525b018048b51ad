package turnstone.fisher;

import java.util.Arrays;

/**
 * The axes of a fit turned towards other axes, for reading plots from night to night; distances and decisions stay the same.
 *
 * <p>All products are taken in the within scatter of the fit itself (over n − g, without ridge, in head-output units), not an average of old
 * and new: the old model's scatter need not be at hand. Axis i is compared with axis i of the reference. Sources: P. H. Schönemann,
 * Psychometrika 31 (1966), 1–10, for the rotation; Å. Björck and G. H. Golub, Mathematics of Computation 27 (1973), 579–594, for the angles.
 */
public final class Orientation {
    /** How axes may be turned. */
    public enum Manner {
        /** Each axis keeps its place and takes the sign that makes its product with the reference axis positive. */
        SIGNS,
        /** The orthogonal matrix, reflections included, that brings the axes nearest to the reference; ratios are then no longer those of single axes. */
        PROCRUSTES
    }

    private final Fit fit;
    private final double[][] rotation;
    private final double[] principalAngles;

    private Orientation(Fit fit, double[][] rotation, double[] principalAngles) {
        this.fit = fit;
        this.rotation = rotation;
        this.principalAngles = principalAngles;
    }

    /**
     * Turns a fit towards other axes.
     *
     * @param reference axes in the head-output units of the fit, any number of rows, none of length zero
     */
    public static Orientation of(Fit fit, double[][] reference, Manner manner) {
        int d = fit.centre().length;
        if (reference.length == 0 || Arrays.stream(reference).anyMatch(row -> row.length != d)) {
            throw new IllegalArgumentException("reference axes need " + d + " components each");
        }
        double[][] axes = fit.axes();
        double[][] cross = fit.withinProducts(axes, reference);
        double[][] rotation = manner == Manner.SIGNS ? signs(cross) : nearest(cross);
        return new Orientation(fit, rotation, angles(fit, axes, reference, cross));
    }

    /** The orthogonal matrix [r][r] that the axes are multiplied by. */
    public double[][] rotation() {
        return Arrays.stream(rotation).map(double[]::clone).toArray(double[][]::new);
    }

    /**
     * Angles between the two spans, ascending, in radians, as many as the smaller span has axes; angles below about 1e-7 cannot be told from
     * zero.
     */
    public double[] principalAngles() {
        return principalAngles.clone();
    }

    /** The fit with its axes and positions turned. */
    public Fit turned() {
        return fit.turned(rotation);
    }

    private static double[][] signs(double[][] cross) {
        int r = cross.length;
        double[][] rotation = new double[r][r];
        for (int i = 0; i < r; i++) {
            rotation[i][i] = i < cross[i].length && cross[i][i] < 0 ? -1 : 1;
        }
        return rotation;
    }

    /** V·Uᵀ of the singular value decomposition U·Σ·Vᵀ of the cross products, padded with zeros to r × r. */
    private static double[][] nearest(double[][] cross) {
        int r = cross.length;
        ExtendedMatrix square = new ExtendedMatrix(r, r);
        for (int i = 0; i < r; i++) {
            for (int j = 0; j < Math.min(r, cross[i].length); j++) {
                square.set(i, j, DoubleDouble.of(cross[i][j]));
            }
        }
        SmallSingularValues small = SmallSingularValues.of(square);
        ExtendedMatrix right = small.directions();
        ExtendedMatrix left = new ExtendedMatrix(r, r);
        for (int k = 0; k < r; k++) {
            if (small.value(k).high() > 0) {
                for (int i = 0; i < r; i++) {
                    left.set(k, i, square.dotRows(i, right, k).over(small.value(k)));
                }
            } else {
                complete(right, k);
                complete(left, k);
            }
        }
        double[][] rotation = new double[r][r];
        for (int i = 0; i < r; i++) {
            for (int j = 0; j < r; j++) {
                DoubleDouble sum = DoubleDouble.ZERO;
                for (int k = 0; k < r; k++) {
                    sum = sum.plus(right.at(k, i).times(left.at(k, j)));
                }
                rotation[i][j] = sum.high();
            }
        }
        return rotation;
    }

    /** Row k becomes a unit vector orthogonal to the rows before it: the unit vector that keeps most of its length, made orthogonal. */
    private static void complete(ExtendedMatrix rows, int k) {
        int d = rows.columns;
        double best = -1;
        ExtendedMatrix chosen = new ExtendedMatrix(1, d);
        for (int c = 0; c < d; c++) {
            ExtendedMatrix candidate = new ExtendedMatrix(1, d);
            candidate.set(0, c, DoubleDouble.ONE);
            for (int pass = 0; pass < 2; pass++) {
                for (int m = 0; m < k; m++) {
                    candidate.addRow(0, candidate.dotRows(0, rows, m).negated(), rows, m);
                }
            }
            double length = candidate.dotRows(0, candidate, 0).high();
            if (length > best) {
                best = length;
                chosen = candidate;
            }
        }
        DoubleDouble inverse =
                DoubleDouble.ONE.over(chosen.dotRows(0, chosen, 0).root());
        Arrays.fill(rows.high[k], 0);
        Arrays.fill(rows.low[k], 0);
        rows.addRow(k, inverse, chosen, 0);
    }

    private static double[] angles(Fit fit, double[][] axes, double[][] reference, double[][] cross) {
        ExtendedMatrix inner = new ExtendedMatrix(cross.length, reference.length);
        for (int i = 0; i < cross.length; i++) {
            for (int j = 0; j < reference.length; j++) {
                inner.set(i, j, DoubleDouble.of(cross[i][j]));
            }
        }
        // Orthonormal in the metric on both sides: rows whitened by one Gram matrix, then columns by the other.
        ExtendedMatrix columns = whitened(fit.withinProducts(axes, axes), inner.transposed());
        ExtendedMatrix both = whitened(fit.withinProducts(reference, reference), columns.transposed());
        SmallSingularValues small = SmallSingularValues.of(both.rows <= both.columns ? both : both.transposed());
        double[] angles = new double[Math.min(both.rows, both.columns)];
        for (int k = 0; k < angles.length; k++) {
            angles[k] = StrictMath.acos(Math.min(1, small.value(k).high()));
        }
        return angles;
    }

    private static ExtendedMatrix whitened(double[][] gram, ExtendedMatrix rows) {
        ExtendedMatrix matrix = new ExtendedMatrix(gram.length, gram.length);
        for (int i = 0; i < gram.length; i++) {
            System.arraycopy(gram[i], 0, matrix.high[i], 0, gram.length);
        }
        Factor factor = Factor.of(matrix, 0);
        if (!factor.setAside().isEmpty()) {
            throw new IllegalArgumentException(
                    "axis " + (factor.setAside().get(0) + 1) + " lies in the span of those before it, or is zero");
        }
        new Whitening(factor).whiten(rows);
        return rows;
    }
}
