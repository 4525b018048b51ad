package turnstone.fisher;

import java.util.Arrays;
import java.util.Comparator;

/**
 * Singular values and right singular vectors of a matrix of few long rows, in double-double.
 *
 * <p>One-sided Jacobi (M. R. Hestenes, Journal of the SIAM 6, 1958): pairs of rows are turned, in a fixed cyclic order, until all are orthogonal;
 * their lengths are the singular values and their directions the vectors.
 */
final class SmallSingularValues {
    /** Rows count as orthogonal below this cosine: what double-double products of long rows can hold. */
    private static final double ORTHOGONAL = 0x1p-98;

    /** Singular values below this share of the largest are rounding, and zero: their squares stand 10^-36 apart. */
    private static final double ZERO_SHARE = 0x1p-60;

    /** Quadratic convergence ends within ten sweeps; more than this is a defect. */
    private static final int MOST_SWEEPS = 60;

    private final ExtendedMatrix directions;
    private final DoubleDouble[] values;

    private SmallSingularValues(ExtendedMatrix directions, DoubleDouble[] values) {
        this.directions = directions;
        this.values = values;
    }

    static SmallSingularValues of(ExtendedMatrix matrix) {
        ExtendedMatrix turned = matrix.copy();
        for (int sweep = 0; sweep(turned); sweep++) {
            if (sweep > MOST_SWEEPS) {
                throw new IllegalStateException("rows do not become orthogonal");
            }
        }
        return sorted(turned);
    }

    private static boolean sweep(ExtendedMatrix m) {
        boolean turnedAny = false;
        DoubleDouble largest = DoubleDouble.ZERO;
        for (int p = 0; p < m.rows; p++) {
            DoubleDouble square = m.dotRows(p, m, p);
            largest = square.high() > largest.high() ? square : largest;
        }
        double negligible = largest.high() * ZERO_SHARE * ZERO_SHARE;
        for (int p = 0; p < m.rows - 1; p++) {
            for (int q = p + 1; q < m.rows; q++) {
                turnedAny |= turn(m, p, q, negligible);
            }
        }
        return turnedAny;
    }

    private static boolean turn(ExtendedMatrix m, int p, int q, double negligible) {
        DoubleDouble pp = m.dotRows(p, m, p);
        DoubleDouble qq = m.dotRows(q, m, q);
        DoubleDouble pq = m.dotRows(p, m, q);
        boolean nothing = pp.high() <= negligible || qq.high() <= negligible;
        double product = Math.sqrt(pp.high()) * Math.sqrt(qq.high());
        // A row that is rounding against the largest has no direction worth turning for.
        if (nothing || Math.abs(pq.high()) <= ORTHOGONAL * product) {
            return false;
        }
        DoubleDouble zeta = qq.minus(pp).over(pq.scaledBy(2));
        DoubleDouble size = zeta.times(zeta).plus(DoubleDouble.ONE).root();
        DoubleDouble tangent =
                zeta.high() >= 0 ? DoubleDouble.ONE.over(zeta.plus(size)) : DoubleDouble.ONE.over(zeta.minus(size));
        DoubleDouble cosine = DoubleDouble.ONE.over(
                tangent.times(tangent).plus(DoubleDouble.ONE).root());
        DoubleDouble sine = cosine.times(tangent);
        ExtendedMatrix before = new ExtendedMatrix(1, m.columns);
        before.addRow(0, DoubleDouble.ONE, m, p);
        m.scaleRow(p, cosine);
        m.addRow(p, sine.negated(), m, q);
        m.scaleRow(q, cosine);
        m.addRow(q, sine, before, 0);
        return true;
    }

    private static SmallSingularValues sorted(ExtendedMatrix m) {
        DoubleDouble[] lengths = new DoubleDouble[m.rows];
        for (int p = 0; p < m.rows; p++) {
            lengths[p] = m.dotRows(p, m, p).root();
        }
        Integer[] order = new Integer[m.rows];
        Arrays.setAll(order, i -> i);
        Arrays.sort(
                order,
                Comparator.<Integer>comparingDouble(i -> -lengths[i].high())
                        .thenComparingDouble(i -> -lengths[i].low()));
        ExtendedMatrix directions = new ExtendedMatrix(m.rows, m.columns);
        DoubleDouble[] values = new DoubleDouble[m.rows];
        for (int k = 0; k < m.rows; k++) {
            DoubleDouble length = lengths[order[k]];
            boolean zero = length.high() <= lengths[order[0]].high() * ZERO_SHARE;
            values[k] = zero ? DoubleDouble.ZERO : length;
            if (!zero) {
                directions.addRow(k, DoubleDouble.ONE.over(length), m, order[k]);
            }
        }
        return new SmallSingularValues(directions, values);
    }

    /** Singular value k, from the largest; exactly zero where it is rounding. */
    DoubleDouble value(int k) {
        return values[k];
    }

    /** Right singular vector k as row k: unit length, or zero where the value is. */
    ExtendedMatrix directions() {
        return directions;
    }
}
