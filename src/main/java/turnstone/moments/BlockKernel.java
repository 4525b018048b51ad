package turnstone.moments;

/**
 * Adds the sums of products of a block of count records to a packed triangle: {@code triangle[i(i+1)/2 + j] += sum over k of x[k][i] x[k][j]} for
 * {@code i >= j}.
 *
 * <p>Every implementation gives the same doubles, bit for bit, because every product and every partial sum is an integer that a double holds
 * exactly: see {@link Bounds}. The order of summation and fused multiplication are therefore free. Implementations may be shared by threads.
 */
public interface BlockKernel {
    /**
     * Folds a block of records.
     *
     * @param rows records one after the other, {@code rows[k * channels + c]}; integers of at most {@link Bounds#COARSE_LIMIT} in size, or the
     *     halves of split counts; entries past {@code rowCount * channels} are not read
     * @param rowCount records in the block; with those already in the triangle at most {@link Bounds#TRIANGLE_RECORDS}; zero is allowed
     * @param channels columns of a record, at least 1
     * @param triangle packed lower triangle by rows, {@code channels (channels + 1) / 2} entries or more
     * @throws IllegalArgumentException if an array is shorter than the counts say
     */
    void fold(double[] rows, int rowCount, int channels, double[] triangle);

    /** What the log calls it, with the vector width where there is one. */
    String name();
}
