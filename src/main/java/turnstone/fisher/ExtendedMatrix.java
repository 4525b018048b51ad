package turnstone.fisher;

/**
 * A mutable matrix of double-double numbers, row by row: element (i, j) is {@code high[i][j] + low[i][j]}.
 *
 * <p>The arrays are shared with the kernels on purpose; the matrix never leaves the package.
 */
final class ExtendedMatrix {
    final int rows;
    final int columns;
    final double[][] high;
    final double[][] low;

    ExtendedMatrix(int rows, int columns) {
        this.rows = rows;
        this.columns = columns;
        this.high = new double[rows][columns];
        this.low = new double[rows][columns];
    }

    DoubleDouble at(int row, int column) {
        return new DoubleDouble(high[row][column], low[row][column]);
    }

    void set(int row, int column, DoubleDouble value) {
        high[row][column] = value.high();
        low[row][column] = value.low();
    }

    ExtendedMatrix copy() {
        ExtendedMatrix copy = new ExtendedMatrix(rows, columns);
        for (int i = 0; i < rows; i++) {
            System.arraycopy(high[i], 0, copy.high[i], 0, columns);
            System.arraycopy(low[i], 0, copy.low[i], 0, columns);
        }
        return copy;
    }

    ExtendedMatrix transposed() {
        ExtendedMatrix result = new ExtendedMatrix(columns, rows);
        for (int i = 0; i < rows; i++) {
            for (int j = 0; j < columns; j++) {
                result.high[j][i] = high[i][j];
                result.low[j][i] = low[i][j];
            }
        }
        return result;
    }

    /** Row {@code row} += a · row {@code from} of another matrix with as many columns. */
    void addRow(int row, DoubleDouble a, ExtendedMatrix other, int from) {
        Kernels.multiplyAdd(a.high(), a.low(), other.high[from], other.low[from], high[row], low[row], 0, columns);
    }

    /** Row {@code row} times a. */
    void scaleRow(int row, DoubleDouble a) {
        Kernels.scale(a.high(), a.low(), high[row], low[row], 0, columns);
    }

    /** Row {@code row} of this times row {@code otherRow} of another with as many columns. */
    DoubleDouble dotRows(int row, ExtendedMatrix other, int otherRow) {
        return Kernels.dot(high[row], low[row], other.high[otherRow], other.low[otherRow], 0, columns);
    }

    /** The lower triangle of a square matrix onto the upper one. */
    void mirrorLower() {
        for (int i = 1; i < rows; i++) {
            for (int j = 0; j < i; j++) {
                high[j][i] = high[i][j];
                low[j][i] = low[i][j];
            }
        }
    }

    /** A row as doubles: the high parts, which are the nearest doubles. */
    double[] rounded(int row) {
        return high[row].clone();
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
