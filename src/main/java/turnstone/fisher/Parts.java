package turnstone.fisher;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import turnstone.fault.Fault;
import turnstone.moments.Moments;
import turnstone.moments.MomentsAccumulator;

/**
 * The cells of a request, merged exactly by material and weight: the order of cells leaves no trace.
 *
 * <p>All of one weight is "as counted", whatever the weight.
 */
final class Parts {
    private final List<List<Part>> byMaterial;
    private final long[] records;
    private final double[] weightedRecords;
    private final Moments total;

    private Parts(List<List<Part>> byMaterial, Moments total) {
        this.byMaterial = byMaterial;
        this.total = total;
        int g = byMaterial.size();
        records = new long[g];
        weightedRecords = new double[g];
        for (int k = 0; k < g; k++) {
            for (Part part : byMaterial.get(k)) {
                records[k] += part.moments().records();
                weightedRecords[k] += part.weightedRecords();
            }
        }
    }

    /**
     * Merges the cells.
     *
     * @throws Fault of kind input where there are fewer than two materials, or one has no records
     */
    static Parts of(FitRequest request) {
        if (request.materials().size() < 2) {
            throw Fault.input("nothing to tell apart")
                    .found(request.materials().size() + " material")
                    .expected("at least two");
        }
        List<Map<Double, MomentsAccumulator>> merged = new ArrayList<>();
        for (int k = 0; k < request.materials().size(); k++) {
            merged.add(byWeight(request, k));
        }
        int channels = request.scale().channels();
        MomentsAccumulator total = MomentsAccumulator.empty(channels);
        double weighted = 0;
        for (Map<Double, MomentsAccumulator> ofMaterial : merged) {
            for (Map.Entry<Double, MomentsAccumulator> entry : ofMaterial.entrySet()) {
                total.merge(entry.getValue().snapshot());
                weighted += entry.getKey() * entry.getValue().records();
            }
        }
        boolean asCounted =
                merged.stream().flatMap(m -> m.keySet().stream()).distinct().count() == 1;
        double factor = total.records() / weighted;
        List<List<Part>> parts = new ArrayList<>();
        for (Map<Double, MomentsAccumulator> ofMaterial : merged) {
            List<Part> list = new ArrayList<>();
            ofMaterial.forEach((weight, sums) -> list.add(new Part(sums.snapshot(), asCounted ? 1 : weight * factor)));
            parts.add(list);
        }
        return new Parts(parts, total.snapshot());
    }

    private static Map<Double, MomentsAccumulator> byWeight(FitRequest request, int material) {
        Map<Double, MomentsAccumulator> sums = new TreeMap<>();
        for (Cell cell : request.cells().get(material)) {
            if (cell.moments().records() > 0) {
                sums.computeIfAbsent(
                                cell.weight(),
                                weight ->
                                        MomentsAccumulator.empty(request.scale().channels()))
                        .merge(cell.moments());
            }
        }
        if (sums.isEmpty()) {
            throw Fault.input("a material has no records")
                    .at("material " + request.materials().get(material))
                    .remedy("show it, or leave the material out");
        }
        return sums;
    }

    int materials() {
        return byMaterial.size();
    }

    List<Part> of(int material) {
        return byMaterial.get(material);
    }

    long records(int material) {
        return records[material];
    }

    /** Weighted number of records; the number of records where all count alike. */
    double weightedRecords(int material) {
        return weightedRecords[material];
    }

    /** Unweighted sums over everything. */
    Moments total() {
        return total;
    }
}
