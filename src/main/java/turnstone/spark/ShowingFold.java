package turnstone.spark;

/** One showing within one task: outcomes and the exact sums of the accepted records. Not thread-safe. */
final class ShowingFold {
    /** {@code 2^31 * (2^21 - 1) < 2^53}: doubles add so many coarse counts exactly. */
    private static final int COARSE_RECORDS = Integer.MAX_VALUE;

    /** {@code 2^10 * 2^43 = 2^53}: doubles add so many fine counts exactly. */
    private static final int FINE_RECORDS = 1 << 10;

    /** {@code 2^19 * 2^43 < 2^63}: 64 bits hold so many counts; then the task hands on. */
    static final long MOST_RECORDS = 1L << 19;

    private final int drainAt;
    private final double[] pending;
    private final long[] sums;
    private int pendingRecords;
    private long records;
    private long noSignal;
    private long quarantined;

    ShowingFold(FoldShape shape) {
        this.drainAt = shape.anyFine() ? FINE_RECORDS : COARSE_RECORDS;
        this.pending = new double[shape.channels()];
        this.sums = new long[shape.channels()];
    }

    static long bytes(int channels) {
        return 16L * channels;
    }

    void accept(double[] counts) {
        for (int c = 0; c < pending.length; c++) {
            pending[c] += counts[c];
        }
        records++;
        pendingRecords++;
        if (pendingRecords == drainAt) {
            drain();
        }
    }

    private void drain() {
        for (int c = 0; c < pending.length; c++) {
            sums[c] = Math.addExact(sums[c], (long) pending[c]);
            pending[c] = 0;
        }
        pendingRecords = 0;
    }

    void countNoSignal() {
        noSignal++;
    }

    void countQuarantined() {
        quarantined++;
    }

    boolean isFull() {
        return records >= MOST_RECORDS;
    }

    byte[] payload(Slot slot) {
        drain();
        return ShowingMerge.payload(slot, records, noSignal, quarantined, records == 0 ? new long[0] : sums);
    }
}
