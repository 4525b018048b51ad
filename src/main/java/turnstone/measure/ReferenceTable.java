package turnstone.measure;

import java.io.Serializable;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import turnstone.fault.Fault;

/**
 * Dark and white references by (sorter, belt column, time). Immutable.
 *
 * <p>Times are milliseconds on the clock of the records; a reference serves records from its own time on, until a later one of its kind. Values are raw
 * counts, one per channel of the instrument.
 */
public final class ReferenceTable implements Serializable {
    private final TreeMap<String, Map<Integer, ReferenceSeries>> bySorter;

    private ReferenceTable(Map<String, Map<Integer, ReferenceSeries>> bySorter) {
        this.bySorter = new TreeMap<>(bySorter);
    }

    /** Collects references in any order. */
    public static Builder builder() {
        return new Builder();
    }

    /** Whether a sorter has any reference. */
    public boolean holds(String sorter) {
        return bySorter.containsKey(sorter);
    }

    /** The references taken from one time (included) to another (not included): those of one instrument, where a sorter's optics changed. */
    public ReferenceTable within(long from_ms, long to_ms) {
        TreeMap<String, Map<Integer, ReferenceSeries>> kept = new TreeMap<>();
        bySorter.forEach((sorter, columns) -> columns.forEach((column, series) -> {
            ReferenceSeries part = series.within(from_ms, to_ms);
            if (part.size() > 0) {
                kept.computeIfAbsent(sorter, s -> new TreeMap<>()).put(column, part);
            }
        }));
        return new ReferenceTable(kept);
    }

    /** The series of a sorter by belt column; empty where it has none. */
    Map<Integer, ReferenceSeries> of(String sorter) {
        return bySorter.getOrDefault(sorter, new TreeMap<>());
    }

    /** Collects references, then checks them as a whole. */
    public static final class Builder {
        private final TreeMap<String, TreeMap<Integer, List<ReferenceSeries.Entry>>> entries = new TreeMap<>();

        private Builder() {}

        /**
         * Adds one reference.
         *
         * @throws Fault of kind input where a value is not finite
         */
        public Builder add(ReferenceKind kind, String sorter, int beltColumn, long time_ms, double[] values) {
            for (int c = 0; c < values.length; c++) {
                if (!(Math.abs(values[c]) <= Double.MAX_VALUE)) {
                    throw Fault.input("a reference value that is not a finite number")
                            .at(place(kind, sorter, beltColumn, time_ms) + " channel " + (c + 1))
                            .found(DecimalText.shortest(values[c]));
                }
            }
            entries.computeIfAbsent(sorter, s -> new TreeMap<>())
                    .computeIfAbsent(beltColumn, c -> new ArrayList<>())
                    .add(new ReferenceSeries.Entry(kind, time_ms, values));
            return this;
        }

        /**
         * The table.
         *
         * @throws Fault of kind input where two references have the same kind, sorter, belt column and time
         */
        public ReferenceTable build() {
            TreeMap<String, Map<Integer, ReferenceSeries>> table = new TreeMap<>();
            for (Map.Entry<String, TreeMap<Integer, List<ReferenceSeries.Entry>>> sorter : entries.entrySet()) {
                TreeMap<Integer, ReferenceSeries> columns = new TreeMap<>();
                for (Map.Entry<Integer, List<ReferenceSeries.Entry>> column :
                        sorter.getValue().entrySet()) {
                    columns.put(column.getKey(), series(sorter.getKey(), column.getKey(), column.getValue()));
                }
                table.put(sorter.getKey(), columns);
            }
            return new ReferenceTable(table);
        }

        private static ReferenceSeries series(String sorter, int beltColumn, List<ReferenceSeries.Entry> unsorted) {
            List<ReferenceSeries.Entry> sorted = new ArrayList<>(unsorted);
            sorted.sort(Comparator.comparingLong(ReferenceSeries.Entry::time_ms)
                    .thenComparing(ReferenceSeries.Entry::kind));
            for (int i = 1; i < sorted.size(); i++) {
                ReferenceSeries.Entry entry = sorted.get(i);
                ReferenceSeries.Entry before = sorted.get(i - 1);
                if (entry.time_ms() == before.time_ms() && entry.kind() == before.kind()) {
                    throw Fault.input("two references for the same belt column and time")
                            .at(place(entry.kind(), sorter, beltColumn, entry.time_ms()))
                            .remedy("give each reference once");
                }
            }
            return new ReferenceSeries(sorted);
        }

        private static String place(ReferenceKind kind, String sorter, int beltColumn, long time_ms) {
            return kind.label() + " of " + sorter + " belt column " + beltColumn + " at " + time_ms + " ms";
        }
    }
}
