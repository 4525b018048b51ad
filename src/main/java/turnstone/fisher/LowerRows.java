package turnstone.fisher;

/** The lower triangle of a d × d matrix in double-double, row by row: row i has i + 1 elements. Not changed once it is handed out. */
final class LowerRows {
    final double[][] high;
    final double[][] low;

    LowerRows(int size) {
        high = new double[size][];
        low = new double[size][];
        for (int i = 0; i < size; i++) {
            high[i] = new double[i + 1];
            low[i] = new double[i + 1];
        }
    }

    /** Bytes that the numbers of one take. */
    static long bytes(int size) {
        return 8L * size * (size + 1L);
    }

    /** Adds weight times these rows to the lower triangle of a matrix. */
    void addTo(ExtendedMatrix lower, double weight) {
        for (int i = 0; i < high.length; i++) {
            Kernels.multiplyAdd(weight, 0, high[i], low[i], lower.high[i], lower.low[i], 0, i + 1);
        }
    }
}
