package turnstone.decide;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import turnstone.json.Json;

/** One material of a model: its records, its mean [d] in pretreated units, its position [r], and its decision prior. Immutable. */
public final class ModelMaterial {
    private final String name;
    private final long records;
    private final double[] mean;
    private final double[] position;
    private final double decisionPrior;

    ModelMaterial(String name, long records, double[] mean, double[] position, double decisionPrior) {
        if (!(decisionPrior > 0 && decisionPrior <= 1)) {
            throw new IllegalArgumentException(
                    "the decision prior of " + name + " lies above 0 and at most at 1, not at " + decisionPrior);
        }
        this.name = name;
        this.records = records;
        this.mean = mean.clone();
        this.position = position.clone();
        this.decisionPrior = decisionPrior;
    }

    /** As it stands in the records. */
    public String name() {
        return name;
    }

    /** Records that were fitted. */
    public long records() {
        return records;
    }

    /** d values in pretreated units. */
    public double[] mean() {
        return mean.clone();
    }

    /** r coordinates on the axes. */
    public double[] position() {
        return position.clone();
    }

    /** What the decision rule assumes about how common it is. */
    public double decisionPrior() {
        return decisionPrior;
    }

    ObjectNode json() {
        ObjectNode node = Json.object().put("name", name).put("records", records);
        node.set("mean", Json.array(mean));
        node.set("position", Json.array(position));
        return node.put("decisionPrior", decisionPrior);
    }

    static ModelMaterial fromJson(JsonNode node, int channels, int rank) {
        return new ModelMaterial(
                node.required("name").textValue(),
                node.required("records").longValue(),
                ModelNumbers.vector(node.required("mean"), channels, "mean"),
                ModelNumbers.vector(node.required("position"), rank, "position"),
                ModelNumbers.number(node.required("decisionPrior"), "decisionPrior"));
    }
}
