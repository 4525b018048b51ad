package turnstone.trial;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import turnstone.plant.Duty;

/** Whole numbers of records by material of the infeed and bin: what a frontier is traced from, added and taken away exactly. */
final class FrontierSums {
    private record Material(String name, double massShare, boolean target) {}

    private final Duty.Stream stream;
    private final List<Material> materials;
    private final long[][] bins;
    private final long[] records;

    private FrontierSums(Duty.Stream stream, List<Material> materials) {
        this.stream = stream;
        this.materials = materials;
        this.bins = new long[materials.size()][ScoreBins.COUNT];
        this.records = new long[materials.size()];
    }

    static FrontierSums empty(Duty duty) {
        List<Material> materials = new ArrayList<>();
        for (Map.Entry<String, Double> entry : new TreeMap<>(duty.infeedMix()).entrySet()) {
            if (entry.getValue() > 0) {
                materials.add(new Material(
                        entry.getKey(), entry.getValue(), duty.targets().contains(entry.getKey())));
            }
        }
        return new FrontierSums(duty.productStream(), List.copyOf(materials));
    }

    /** Adds a row of a histogram; what is not in the infeed changes nothing. */
    void add(String truth, long[] row) {
        for (int m = 0; m < bins.length; m++) {
            if (materials.get(m).name().equals(truth)) {
                for (int bin = 0; bin < ScoreBins.COUNT; bin++) {
                    bins[m][bin] += row[bin];
                }
                records[m] += ScoreHistogram.sum(row);
            }
        }
    }

    void add(FrontierSums other) {
        combine(other, 1);
    }

    FrontierSums minus(FrontierSums other) {
        FrontierSums rest = new FrontierSums(stream, materials);
        rest.combine(this, 1);
        rest.combine(other, -1);
        return rest;
    }

    private void combine(FrontierSums other, int sign) {
        for (int m = 0; m < bins.length; m++) {
            records[m] += sign * other.records[m];
            for (int bin = 0; bin < ScoreBins.COUNT; bin++) {
                bins[m][bin] += sign * other.bins[m][bin];
            }
        }
    }

    boolean sameRecords(FrontierSums other) {
        return Arrays.equals(records, other.records);
    }

    /** The first material of the infeed without a record, or an empty text. */
    String notShown() {
        for (int m = 0; m < records.length; m++) {
            if (records[m] == 0) {
                return materials.get(m).name();
            }
        }
        return "";
    }

    /** Masses sent at every cut; a material without records makes it all NaN. */
    Frontier frontier() {
        double[] targetSent = new double[ScoreBins.COUNT + 1];
        double[] otherSent = new double[ScoreBins.COUNT + 1];
        double targetShare = 0;
        for (int m = 0; m < bins.length; m++) {
            Material material = materials.get(m);
            targetShare += material.target() ? material.massShare() : 0;
            double[] sent = material.target() ? targetSent : otherSent;
            long ejected = 0;
            for (int cut = ScoreBins.COUNT; cut >= 0; cut--) {
                ejected += cut < ScoreBins.COUNT ? bins[m][cut] : 0;
                long product = stream == Duty.Stream.EJECTED ? ejected : records[m] - ejected;
                sent[cut] += material.massShare() * product / records[m];
            }
        }
        return new Frontier(stream, targetSent, otherSent, targetShare);
    }
}
