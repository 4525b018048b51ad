package turnstone.fisher;

/**
 * A mutable matrix of double-double numbers, row-major in two arrays: element (i, j) is at i·columns + j of {@code high} and {@code low}.
 *
 * <p>The arrays are shared with the kernels on purpose; the matrix never leaves the package.
 */
final class ExtendedMatrix {
    final int rows;
    final int columns;
    final double[] high;
    final double[] low;

    ExtendedMatrix(int rows, int columns) {
        this.rows = rows;
        this.columns = columns;
        this.high = new double[Math.multiplyExact(rows, columns)];
        this.low = new double[high.length];
    }

    DoubleDouble at(int row, int column) {
        int k = row * columns + column;
        return new DoubleDouble(high[k], low[k]);
    }

    void set(int row, int column, DoubleDouble value) {
        int k = row * columns + column;
        high[k] = value.high();
        low[k] = value.low();
    }

    ExtendedMatrix copy() {
        ExtendedMatrix copy = new ExtendedMatrix(rows, columns);
        System.arraycopy(high, 0, copy.high, 0, high.length);
        System.arraycopy(low, 0, copy.low, 0, low.length);
        return copy;
    }

    ExtendedMatrix transposed() {
        ExtendedMatrix result = new ExtendedMatrix(columns, rows);
        for (int i = 0; i < rows; i++) {
            for (int j = 0; j < columns; j++) {
                result.high[j * rows + i] = high[i * columns + j];
                result.low[j * rows + i] = low[i * columns + j];
            }
        }
        return result;
    }

    /** Row {@code row} += a · row {@code from} of another matrix with as many columns. */
    void addRow(int row, DoubleDouble a, ExtendedMatrix other, int from) {
        Kernels.multiplyAdd(
                a.high(), a.low(), other.high, other.low, from * columns, high, low, row * columns, columns);
    }

    /** Row {@code row} times a. */
    void scaleRow(int row, DoubleDouble a) {
        Kernels.scale(a.high(), a.low(), high, low, row * columns, columns);
    }

    /** Row {@code row} of this times row {@code otherRow} of another with as many columns. */
    DoubleDouble dotRows(int row, ExtendedMatrix other, int otherRow) {
        return Kernels.dot(high, low, row * columns, other.high, other.low, otherRow * columns, columns);
    }

    /** The lower triangle of a square matrix onto the upper one. */
    void mirrorLower() {
        for (int i = 1; i < rows; i++) {
            for (int j = 0; j < i; j++) {
                high[j * columns + i] = high[i * columns + j];
                low[j * columns + i] = low[i * columns + j];
            }
        }
    }

    /** A row as doubles: the high parts, which are the nearest doubles. */
    double[] rounded(int row) {
        double[] values = new double[columns];
        System.arraycopy(high, row * columns, values, 0, columns);
        return values;
    }

    /** All rows as doubles. */
    double[][] rounded() {
        double[][] values = new double[rows][];
        for (int i = 0; i < rows; i++) {
            values[i] = rounded(i);
        }
        return values;
    }
}
