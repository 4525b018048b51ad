package turnstone.decide;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.math.BigDecimal;
import java.util.List;
import java.util.Optional;
import java.util.stream.IntStream;
import turnstone.json.Json;
import turnstone.measure.ChannelScale;
import turnstone.measure.CountScale;
import turnstone.measure.Precision;

/** Small models written by hand, all numbers chosen so that a person can work out what they decide. */
public final class ModelFixture {
    private ModelFixture() {}

    /** Two channels, two axes along them, materials at (−2, 0), (2, 0) and (0, 6), equal priors of the first two. */
    public static ObjectNode content(double... priors) {
        double[][] positions = {{-2, 0}, {2, 0}, {0, 6}};
        double[][] means = {{8, 20}, {12, 20}, {10, 26}};
        ObjectNode node = head(List.of("nm1000", "nm1010"), new double[] {10, 20}, new double[][] {{1, 0}, {0, 1}});
        addMaterials(node, List.of("PET bottle", "PP", "PVC"), means, positions, priors);
        ((ObjectNode) node.path("decision")).put("unfamiliarBeyond", 16.0);
        return node;
    }

    /** The model of {@link #content} with priors 0.4, 0.4 and 0.2. */
    public static Model plain() {
        return Model.sealed(content(0.4, 0.4, 0.2));
    }

    /** The same on another count scale. */
    public static Model onAnotherScale() {
        ObjectNode node = content(0.4, 0.4, 0.2);
        node.set(
                "countScale",
                CountScale.uniform(2, new BigDecimal("0"), new BigDecimal("1"), Precision.COARSE)
                        .json());
        return Model.sealed(node);
    }

    /** Three channels, one axis along the first, and a limit of 2·(χ² of 2 degrees of freedom)/2 at 0.005 for the energy in the others. */
    public static Model withResidual() {
        double[][] axes = {{1, 0, 0}};
        ObjectNode node = head(List.of("c1", "c2", "c3"), new double[] {0, 0, 0}, axes);
        addMaterials(
                node,
                List.of("PA", "PS"),
                new double[][] {{-3, 0, 0}, {3, 0, 0}},
                new double[][] {{-3}, {3}},
                0.5,
                0.5);
        ((ObjectNode) node.path("decision")).putNull("unfamiliarBeyond");
        node.set("residual", ResidualTerm.of(axes, 2, 2, 0.005).json());
        return Model.sealed(node);
    }

    private static ObjectNode head(List<String> channels, double[] centre, double[][] axes) {
        ObjectNode node = Json.object();
        node.put("format", Model.FORMAT).put("version", Model.VERSION).put("scope", "fleet");
        MadeFrom from = new MadeFrom(
                List.of(new MadeFrom.Day("2026-03-01", 1, "aa"), new MadeFrom.Day("2026-03-02", 2, "bb")),
                List.of(
                        new MadeFrom.Part("avocet@2026-01-01", "PP", 1200, 4),
                        new MadeFrom.Part("curlew@2026-01-01", "PVC", 800, 4)),
                Optional.of("cc"),
                List.of("records/2026-03-01.parquet"));
        node.set("madeFrom", from.json());
        ArrayNode names = node.putArray("channels");
        channels.forEach(names::add);
        node.putObject("pretreatment").putObject("head").put("snv", "on");
        List<ChannelScale> scales = IntStream.range(0, channels.size())
                .mapToObj(c -> new ChannelScale(
                        new BigDecimal(channels.size() == 2 ? (c == 0 ? "10" : "16") : "0"),
                        new BigDecimal(c == 0 ? "0.5" : "0.25"),
                        c == 0 ? Precision.COARSE : Precision.FINE))
                .toList();
        node.set("countScale", CountScale.of(scales).json());
        node.put("scaleLoss", 0.5).put("ridge", 0.001).put("reciprocalCondition", 1.0e-9);
        node.put("withinDegreesOfFreedom", 1997).putObject("balance").put("materials", "equal");
        double[] ratios = axes.length == 1 ? new double[] {9} : new double[] {9, 3};
        node.set("fisherRatios", Json.array(ratios));
        node.set("fisherShares", Json.array(axes.length == 1 ? new double[] {1} : new double[] {0.75, 0.25}));
        node.set("centre", Json.array(centre));
        node.set("axes", ModelNumbers.json(axes));
        node.putNull("orientedTo");
        node.putArray("remarks").add("channel nm1010 hardly varies");
        return node;
    }

    private static void addMaterials(
            ObjectNode node, List<String> names, double[][] means, double[][] positions, double... priors) {
        ArrayNode materials = node.putArray("materials");
        for (int k = 0; k < priors.length; k++) {
            materials.add(new ModelMaterial(names.get(k), 1000L * (k + 1), means[k], positions[k], priors[k]).json());
        }
        ObjectNode decision = node.putObject("decision");
        decision.set("weights", ModelNumbers.json(DecisionRule.weights(positions)));
        decision.set("constants", Json.array(DecisionRule.constants(positions, priors)));
    }
}
