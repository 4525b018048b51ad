package turnstone.fisher;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import turnstone.fault.Fault;
import turnstone.moments.Moments;

/**
 * The cells of a request, merged exactly by material and weight: the order of cells leaves no trace.
 *
 * <p>All of one weight is "as counted", whatever the weight.
 */
final class Parts {
    private final List<List<Part>> byMaterial;
    private final long[] records;
    private final double[] weightedRecords;
    private final Totals total;

    private Parts(List<List<Part>> byMaterial, Totals total) {
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
    static Parts of(FitRequest request, ScatterMemo memo) {
        if (request.materials().size() < 2) {
            throw Fault.input("nothing to tell apart")
                    .found(request.materials().size() + " material")
                    .expected("at least two");
        }
        List<Map<Double, Moments>> merged = new ArrayList<>();
        for (int k = 0; k < request.materials().size(); k++) {
            merged.add(byWeight(request, k, memo));
        }
        int channels = request.scale().channels();
        Totals total = new Totals(channels);
        double weighted = 0;
        for (Map<Double, Moments> ofMaterial : merged) {
            for (Map.Entry<Double, Moments> entry : ofMaterial.entrySet()) {
                total.add(entry.getValue());
                weighted += entry.getKey() * entry.getValue().records();
            }
        }
        boolean asCounted =
                merged.stream().flatMap(m -> m.keySet().stream()).distinct().count() == 1;
        double factor = total.records() / weighted;
        List<List<Part>> parts = new ArrayList<>();
        for (Map<Double, Moments> ofMaterial : merged) {
            List<Part> list = new ArrayList<>();
            ofMaterial.forEach((weight, sums) -> list.add(new Part(sums, asCounted ? 1 : weight * factor)));
            parts.add(list);
        }
        return new Parts(parts, total);
    }

    private static Map<Double, Moments> byWeight(FitRequest request, int material, ScatterMemo memo) {
        Map<Double, Moments> sums = new TreeMap<>();
        for (Cell cell : request.cells().get(material)) {
            if (cell.moments().records() > 0) {
                sums.merge(cell.weight(), cell.moments(), memo::plus);
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
    Totals total() {
        return total;
    }
}
