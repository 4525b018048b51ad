package turnstone.spark;

import java.io.Serializable;
import java.util.Collections;
import java.util.SortedMap;
import java.util.TreeMap;

/** Records by truth and decision, whatever the unfamiliar flag; whole numbers. Not thread-safe. */
public final class ProjectTally implements Serializable {
    /** The first line of its table. */
    public static final String CSV_HEADER = "truth,decided,count";

    /** What stands for the decision of a record without signal. */
    public static final String NO_SIGNAL = "no signal";

    private static final long serialVersionUID = 1L;

    private final TreeMap<String, TreeMap<String, Long>> counts = new TreeMap<>();
    private long unfamiliar;

    void add(String truth, String decided, long records) {
        counts.computeIfAbsent(truth, key -> new TreeMap<>()).merge(decided, records, Math::addExact);
    }

    void addUnfamiliar(long records) {
        unfamiliar = Math.addExact(unfamiliar, records);
    }

    void merge(ProjectTally other) {
        other.counts.forEach((truth, row) -> row.forEach((decided, records) -> add(truth, decided, records)));
        unfamiliar += other.unfamiliar;
    }

    /** Records of a truth by decision. */
    public SortedMap<String, Long> of(String truth) {
        return Collections.unmodifiableSortedMap(counts.getOrDefault(truth, new TreeMap<>()));
    }

    /** The truths met; the empty text stands for all records where there is no label. */
    public Iterable<String> truths() {
        return Collections.unmodifiableSet(counts.navigableKeySet());
    }

    /** How many records were decided as this by this truth. */
    public long count(String truth, String decided) {
        return of(truth).getOrDefault(decided, 0L);
    }

    /** Records with a signal that were decided otherwise than their truth. */
    public long wrong() {
        return counts.entrySet().stream()
                .flatMapToLong(row -> row.getValue().entrySet().stream()
                        .filter(cell -> !cell.getKey().equals(row.getKey())
                                && !cell.getKey().equals(NO_SIGNAL))
                        .mapToLong(cell -> cell.getValue()))
                .sum();
    }

    /** Records flagged as unfamiliar. */
    public long unfamiliar() {
        return unfamiliar;
    }

    /** The table: header, then a line for each pair that was met, in code-point order. */
    public String csv() {
        StringBuilder text = new StringBuilder(CSV_HEADER).append('\n');
        counts.forEach((truth, row) -> row.forEach((decided, records) -> text.append(CsvLine.field(truth))
                .append(',')
                .append(CsvLine.field(decided))
                .append(',')
                .append(records)
                .append('\n')));
        return text.toString();
    }
}
