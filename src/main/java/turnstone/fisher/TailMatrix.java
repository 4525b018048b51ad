package turnstone.fisher;

import turnstone.measure.Tail;

/** A tail T applied in double-double: T·S·Tᵀ to scatter, T·x to rows, Tᵀ·a to axes. Coefficients are rounded once, to 106 bits. */
final class TailMatrix {
    private final Tail tail;
    private final int[][] columns;
    private final DoubleDouble[][] coefficients;

    TailMatrix(Tail tail) {
        this.tail = tail;
        columns = new int[tail.outputs()][];
        coefficients = new DoubleDouble[tail.outputs()][];
        for (int i = 0; i < columns.length; i++) {
            columns[i] = tail.columns(i);
            long[] numerators = tail.numerators(i);
            DoubleDouble denominator = DoubleDouble.of(tail.denominator(i));
            coefficients[i] = new DoubleDouble[numerators.length];
            for (int k = 0; k < numerators.length; k++) {
                coefficients[i][k] = DoubleDouble.of(numerators[k]).over(denominator);
            }
        }
    }

    int outputs() {
        return columns.length;
    }

    boolean isIdentity() {
        return tail.isIdentity();
    }

    int[] columns(int output) {
        return columns[output];
    }

    /** T·S·Tᵀ of a symmetric full matrix, symmetric and full. */
    ExtendedMatrix sandwich(ExtendedMatrix symmetric) {
        if (isIdentity()) {
            return symmetric.copy();
        }
        ExtendedMatrix result = timesRows(timesRows(symmetric).transposed());
        result.mirrorLower();
        return result;
    }

    /** T·S: rows combined. */
    private ExtendedMatrix timesRows(ExtendedMatrix s) {
        ExtendedMatrix result = new ExtendedMatrix(outputs(), s.columns);
        for (int i = 0; i < outputs(); i++) {
            for (int k = 0; k < columns[i].length; k++) {
                result.addRow(i, coefficients[i][k], s, columns[i][k]);
            }
        }
        return result;
    }

    /** Each row x becomes T·x. */
    ExtendedMatrix apply(ExtendedMatrix rows) {
        ExtendedMatrix result = new ExtendedMatrix(rows.rows, outputs());
        for (int row = 0; row < rows.rows; row++) {
            for (int i = 0; i < outputs(); i++) {
                DoubleDouble sum = DoubleDouble.ZERO;
                for (int k = 0; k < columns[i].length; k++) {
                    sum = sum.plus(rows.at(row, columns[i][k]).times(coefficients[i][k]));
                }
                result.set(row, i, sum);
            }
        }
        return result;
    }

    /** Each row a becomes Tᵀ·a: the same projection, of inputs instead of outputs. */
    ExtendedMatrix fold(ExtendedMatrix rows) {
        ExtendedMatrix result = new ExtendedMatrix(rows.rows, tail.inputs());
        for (int row = 0; row < rows.rows; row++) {
            for (int i = 0; i < outputs(); i++) {
                for (int k = 0; k < columns[i].length; k++) {
                    int c = columns[i][k];
                    DoubleDouble add = rows.at(row, i).times(coefficients[i][k]);
                    result.set(row, c, result.at(row, c).plus(add));
                }
            }
        }
        return result;
    }

    /** T·diag(v)·Tᵀ·x in doubles, for estimates. */
    double[] diagonalSandwich(double[] v, double[] x) {
        double[] inner = new double[tail.inputs()];
        for (int i = 0; i < columns.length; i++) {
            for (int k = 0; k < columns[i].length; k++) {
                inner[columns[i][k]] += coefficients[i][k].high() * x[i];
            }
        }
        double[] result = new double[columns.length];
        for (int i = 0; i < columns.length; i++) {
            for (int k = 0; k < columns[i].length; k++) {
                int c = columns[i][k];
                result[i] += coefficients[i][k].high() * (v[c] * inner[c]);
            }
        }
        return result;
    }
}
