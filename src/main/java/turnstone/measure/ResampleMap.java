package turnstone.measure;

import java.io.Serializable;
import java.util.Set;
import java.util.TreeSet;
import turnstone.fault.Fault;

/**
 * Which raw channels make which output channels: out[j] = a + weight[j]·(b − a) with a = in[left[j]], b = in[right[j]]. Linear between the two nearest live
 * channels; weight 0 (then exactly a) where an output needs one channel only.
 */
final class ResampleMap implements Serializable {
    /** An axis may pass the first or last live channel by this much and takes that channel's value: the rounding of printed tables. */
    static final double EDGE_nm = 1e-3;

    final int[] left;
    final int[] right;
    final double[] weight;
    /** The raw channels that any output needs, ascending. */
    final int[] used;

    private ResampleMap(int[] left, int[] right, double[] weight) {
        this.left = left;
        this.right = right;
        this.weight = weight;
        TreeSet<Integer> needed = new TreeSet<>();
        for (int j = 0; j < left.length; j++) {
            needed.add(left[j]);
            needed.add(right[j]);
        }
        used = needed.stream().mapToInt(Integer::intValue).toArray();
    }

    /** Output j is raw channel kept[j]. */
    static ResampleMap selection(int[] kept) {
        return new ResampleMap(kept.clone(), kept.clone(), new double[kept.length]);
    }

    /**
     * Linear interpolation.
     *
     * @param table wavelengths of the raw channels, ascending
     * @param dead raw channels to bridge
     * @param axis_nm the plant's axis
     * @param kept the axis positions wanted
     */
    static ResampleMap linear(double[] table, Set<Integer> dead, double[] axis_nm, int[] kept, String place) {
        int[] live = live(table.length, dead, place);
        int[] left = new int[kept.length];
        int[] right = new int[kept.length];
        double[] weight = new double[kept.length];
        for (int j = 0; j < kept.length; j++) {
            double wanted = axis_nm[kept[j]];
            double first = table[live[0]];
            double last = table[live[live.length - 1]];
            if (wanted < first - EDGE_nm || wanted > last + EDGE_nm) {
                throw Fault.usage("the axis leaves the range of the instrument")
                        .at(place)
                        .found(DecimalText.shortest(wanted) + " nm")
                        .expected(DecimalText.shortest(first) + " to " + DecimalText.shortest(last) + " nm")
                        .remedy("shorten the axis or mask its ends");
            }
            int i = lastAtOrBelow(table, live, wanted);
            left[j] = live[Math.max(i, 0)];
            boolean between = i >= 0 && i < live.length - 1 && wanted > table[live[i]];
            right[j] = between ? live[i + 1] : left[j];
            weight[j] = between ? (wanted - table[left[j]]) / (table[right[j]] - table[left[j]]) : 0;
        }
        return new ResampleMap(left, right, weight);
    }

    private static int[] live(int channels, Set<Integer> dead, String place) {
        int[] live = new int[channels - dead.size()];
        int count = 0;
        for (int c = 0; c < channels; c++) {
            if (!dead.contains(c)) {
                live[count++] = c;
            }
        }
        if (count == 0) {
            throw Fault.usage("every channel is dead").at(place);
        }
        return live;
    }

    private static int lastAtOrBelow(double[] table, int[] live, double wanted) {
        int i = -1;
        while (i + 1 < live.length && table[live[i + 1]] <= wanted) {
            i++;
        }
        return i;
    }

    /** Whether this only copies a run of neighbouring channels. */
    boolean copiesRun() {
        for (int j = 0; j < left.length; j++) {
            if (weight[j] != 0 || left[j] != left[0] + j) {
                return false;
            }
        }
        return true;
    }

    void apply(double[] in, int from, double[] out, int to) {
        for (int j = 0; j < left.length; j++) {
            double a = in[from + left[j]];
            double b = in[from + right[j]];
            out[to + j] = a + weight[j] * (b - a);
        }
    }

    void copy(double[] in, int from, double[] out, int to) {
        for (int j = 0; j < left.length; j++) {
            out[to + j] = in[from + left[j]];
        }
    }
}
