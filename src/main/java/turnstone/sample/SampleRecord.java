package turnstone.sample;

import java.time.LocalDate;

/** One invented record: the keys and one raw detector count for each channel, 0 to 16383. Immutable. */
public final class SampleRecord {
    private final SampleShowing showing;
    private final String piece;
    private final int beltColumn;
    private final long time_ms;
    private final int[] counts;

    SampleRecord(SampleShowing showing, String piece, int beltColumn, long time_ms, int[] counts) {
        this.showing = showing;
        this.piece = piece;
        this.beltColumn = beltColumn;
        this.time_ms = time_ms;
        this.counts = counts;
    }

    /** The night. */
    public LocalDate day() {
        return showing.day();
    }

    /** The sorter. */
    public String sorter() {
        return showing.sorter();
    }

    /** The id of the showing. */
    public String showing() {
        return showing.id();
    }

    /** The tray as noted. */
    public String tray() {
        return showing.tray();
    }

    /** The material as noted. */
    public String material() {
        return showing.material();
    }

    /** What it is; no column of the records. */
    public String trueMaterial() {
        return showing.trueMaterial();
    }

    /** The piece on the tray. */
    public String piece() {
        return piece;
    }

    /** Pixel across the belt. */
    public int beltColumn() {
        return beltColumn;
    }

    /** Milliseconds since 1970-01-01T00:00Z. */
    public long time_ms() {
        return time_ms;
    }

    /** Raw counts by channel. */
    public int[] counts() {
        return counts.clone();
    }
}
