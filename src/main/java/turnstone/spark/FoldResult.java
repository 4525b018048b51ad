package turnstone.spark;

import java.util.Collections;
import java.util.List;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.ledger.LedgerKey;
import turnstone.ledger.ShowingSums;
import turnstone.moments.Moments;

/** What a fold brought back: sums by key, showings, counts, and how it went. Immutable. */
public final class FoldResult {
    private final SortedMap<LedgerKey, Moments> moments;
    private final SortedMap<String, ShowingSums> showings;
    private final FoldSummary summary;
    private final List<SourceFile> files;
    private final ReadPath readPath;

    FoldResult(
            SortedMap<LedgerKey, Moments> moments,
            SortedMap<String, ShowingSums> showings,
            FoldSummary summary,
            List<SourceFile> files,
            ReadPath readPath) {
        this.moments = Collections.unmodifiableSortedMap(new TreeMap<>(moments));
        this.showings = Collections.unmodifiableSortedMap(new TreeMap<>(showings));
        this.summary = summary;
        this.files = List.copyOf(files);
        this.readPath = readPath;
    }

    /** Moments by instrument, material and tray group; of a plain table the instrument is {@link IntakeSpec#TABLE} and the group 0. */
    public SortedMap<LedgerKey, Moments> moments() {
        return moments;
    }

    /** Moments by material, or by the label of a plain table. */
    public SortedMap<String, Moments> byMaterial() {
        TreeMap<String, Moments> sums = new TreeMap<>();
        moments.forEach((key, value) -> sums.merge(key.material(), value, Moments::plus));
        return sums;
    }

    /** The day's showings by id; none for a plain table. */
    public SortedMap<String, ShowingSums> showings() {
        return showings;
    }

    /** Records by outcome, and the quarantined ones that were kept. */
    public RecordCounts counts() {
        return summary.counts();
    }

    /** The input files with their independent counts; none for a frame. */
    public List<SourceFile> files() {
        return files;
    }

    /** By which way the records came in. */
    public ReadPath readPath() {
        return readPath;
    }

    /** The most that the buffers of one task held. */
    public long mostTask_bytes() {
        return summary.most_bytes();
    }

    /** Partial sums that went through the shuffle. */
    public long sumsHanded() {
        return summary.sumsHanded();
    }

    /** Packs of rows that went through the shuffle because they were smaller than sums. */
    public long rowsHanded() {
        return summary.rowsHanded();
    }

    /** Partitions of records. */
    public int partitions() {
        return summary.partitions();
    }
}
