package turnstone.measure;

import java.io.Serializable;
import java.util.Arrays;
import java.util.Map;
import java.util.TreeMap;
import turnstone.fault.Fault;

/** The references of one instrument, ready for use: belt columns ascending, and per span of time the first channel whose white is at or below its dark. */
final class HeadColumns implements Serializable {
    private final int[] beltColumns;
    private final ReferenceSeries[] series;
    private final int[][] badChannels;

    HeadColumns(Map<Integer, ReferenceSeries> byColumn, HeadMaps maps) {
        TreeMap<Integer, ReferenceSeries> sorted = new TreeMap<>(byColumn);
        beltColumns = sorted.keySet().stream().mapToInt(Integer::intValue).toArray();
        series = sorted.values().toArray(new ReferenceSeries[0]);
        badChannels = new int[series.length][];
        for (int i = 0; i < series.length; i++) {
            badChannels[i] = badChannels(series[i], maps.of(beltColumns[i]).used);
        }
    }

    /** The references of the instrument's sorter, checked against its number of channels. */
    static Map<Integer, ReferenceSeries> series(Instrument instrument, ReferenceTable references, int channels) {
        if (instrument == null || references == null || !references.holds(instrument.sorter())) {
            throw HeadSpecChecks.refusal("dark and white correction without references")
                    .found(instrument == null ? "no instrument" : "none of sorter " + instrument.sorter())
                    .remedy("give the references, or leave the correction out");
        }
        Map<Integer, ReferenceSeries> byColumn = references.of(instrument.sorter());
        byColumn.forEach((column, entries) -> {
            int other = entries.lengthOtherThan(channels);
            if (other >= 0) {
                throw Fault.input("a reference with another number of channels than the instrument")
                        .at("instrument " + instrument.name() + " belt column " + column)
                        .found(other)
                        .expected(channels);
            }
        });
        return byColumn;
    }

    private static int[] badChannels(ReferenceSeries series, int[] used) {
        int[] bad = new int[series.size()];
        for (int s = 0; s < bad.length; s++) {
            bad[s] = -1;
            double[] dark = series.dark(s);
            double[] white = series.white(s);
            if (dark != null && white != null) {
                bad[s] = firstBad(dark, white, used);
            }
        }
        return bad;
    }

    private static int firstBad(double[] dark, double[] white, int[] used) {
        for (int channel : used) {
            if (white[channel] <= dark[channel]) {
                return channel;
            }
        }
        return -1;
    }

    /** Index of a belt column, negative where it has no references. */
    int index(int beltColumn) {
        return Arrays.binarySearch(beltColumns, beltColumn);
    }

    ReferenceSeries series(int index) {
        return series[index];
    }

    int badChannel(int index, int span) {
        return badChannels[index][span];
    }
}
