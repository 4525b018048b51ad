package turnstone.sample;

import turnstone.measure.ReferenceKind;

/** One dark or white reference: the mean of many lines, in raw counts, multiples of 1/16. Immutable. */
public final class SampleReference {
    private final ReferenceKind kind;
    private final String sorter;
    private final int beltColumn;
    private final long time_ms;
    private final double[] values;

    SampleReference(ReferenceKind kind, String sorter, int beltColumn, long time_ms, double[] values) {
        this.kind = kind;
        this.sorter = sorter;
        this.beltColumn = beltColumn;
        this.time_ms = time_ms;
        this.values = values;
    }

    /** Dark or white. */
    public ReferenceKind kind() {
        return kind;
    }

    /** The sorter. */
    public String sorter() {
        return sorter;
    }

    /** Pixel across the belt. */
    public int beltColumn() {
        return beltColumn;
    }

    /** Milliseconds since 1970-01-01T00:00Z. */
    public long time_ms() {
        return time_ms;
    }

    /** Mean counts by channel. */
    public double[] values() {
        return values.clone();
    }
}
