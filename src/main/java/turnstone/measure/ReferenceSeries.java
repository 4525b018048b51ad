package turnstone.measure;

import java.io.Serializable;
import java.util.ArrayList;
import java.util.List;

/**
 * The references of one belt column in the order of time, as spans: from {@code start_ms[s]} on (until the next span) dark {@code darks[s]} of
 * {@code darkTimes_ms[s]} and white {@code whites[s]} of {@code whiteTimes_ms[s]} are the nearest earlier ones; null where there is none yet.
 */
final class ReferenceSeries implements Serializable {
    private final ArrayList<Entry> entries;
    private final long[] start_ms;
    private final double[][] darks;
    private final double[][] whites;
    private final long[] darkTimes_ms;
    private final long[] whiteTimes_ms;

    /** One reference. */
    static final class Entry implements Serializable {
        private final ReferenceKind kind;
        private final long time_ms;
        private final double[] values;

        Entry(ReferenceKind kind, long time_ms, double[] values) {
            this.kind = kind;
            this.time_ms = time_ms;
            this.values = values.clone();
        }

        ReferenceKind kind() {
            return kind;
        }

        long time_ms() {
            return time_ms;
        }
    }

    /** Entries ascending in time; of equal times one dark and one white at most. */
    ReferenceSeries(List<Entry> sorted) {
        entries = new ArrayList<>(sorted);
        int n = sorted.size();
        start_ms = new long[n];
        darks = new double[n][];
        whites = new double[n][];
        darkTimes_ms = new long[n];
        whiteTimes_ms = new long[n];
        for (int s = 0; s < n; s++) {
            if (s > 0) {
                darks[s] = darks[s - 1];
                whites[s] = whites[s - 1];
                darkTimes_ms[s] = darkTimes_ms[s - 1];
                whiteTimes_ms[s] = whiteTimes_ms[s - 1];
            }
            Entry entry = sorted.get(s);
            start_ms[s] = entry.time_ms;
            if (entry.kind == ReferenceKind.DARK) {
                darks[s] = entry.values;
                darkTimes_ms[s] = entry.time_ms;
            } else {
                whites[s] = entry.values;
                whiteTimes_ms[s] = entry.time_ms;
            }
        }
    }

    int size() {
        return entries.size();
    }

    ReferenceSeries within(long from_ms, long to_ms) {
        List<Entry> kept = new ArrayList<>();
        for (Entry entry : entries) {
            if (entry.time_ms >= from_ms && entry.time_ms < to_ms) {
                kept.add(entry);
            }
        }
        return new ReferenceSeries(kept);
    }

    /** The length of the first reference that has another number of channels, or −1. */
    int lengthOtherThan(int channels) {
        for (Entry entry : entries) {
            if (entry.values.length != channels) {
                return entry.values.length;
            }
        }
        return -1;
    }

    /** The last span that starts at or before the time, or −1. Where a dark and a white share a time the later span has both. */
    int span(long time_ms) {
        int low = 0;
        int high = start_ms.length;
        while (low < high) {
            int middle = (low + high) >>> 1;
            if (start_ms[middle] <= time_ms) {
                low = middle + 1;
            } else {
                high = middle;
            }
        }
        return low - 1;
    }

    double[] dark(int span) {
        return darks[span];
    }

    double[] white(int span) {
        return whites[span];
    }

    long darkTime_ms(int span) {
        return darkTimes_ms[span];
    }

    long whiteTime_ms(int span) {
        return whiteTimes_ms[span];
    }
}
