package turnstone.decide;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import turnstone.fault.Fault;
import turnstone.fisher.Fit;
import turnstone.json.Json;
import turnstone.measure.CountScale;

/**
 * A model: axes, materials, decision rule and lineage, as {@code model.json} holds them. Immutable.
 *
 * <p>d channels behind the head, g materials, r axes. Axes and means are in the values that the head puts out; the tail is already in the
 * axes. The position of a value x is axes·(x − centre), of unit within variance on each axis.
 *
 * <p>The fingerprint is the SHA-256 of the canonical JSON of everything else, but for the names of input files; coarse or fine counts do
 * not enter it either. Keys that this version does not know are kept and covered.
 */
public final class Model {
    /** What stands under {@code format}. */
    public static final String FORMAT = "turnstone-model";
    /** What this version writes under {@code version}: major and minor. */
    public static final String VERSION = "1.0";

    private static final int MAJOR = 1;

    private final ObjectNode content;
    private final List<String> channels;
    private final CountScale countScale;
    private final MadeFrom madeFrom;
    private final List<ModelMaterial> materials;
    private final double[] fisherRatios;
    private final double[] fisherShares;
    private final double[] centre;
    private final double[][] axes;
    private final double[][] weights;
    private final double[] constants;
    private final OptionalDouble unfamiliarBeyond;
    private final Optional<ResidualTerm> residual;

    private Model(ObjectNode content) {
        this.content = content;
        channels = texts(content.required("channels"));
        countScale = CountScale.fromJson(content.required("countScale"));
        madeFrom = MadeFrom.fromJson(content.required("madeFrom"));
        int d = channels.size();
        if (countScale.channels() != d) {
            throw new IllegalArgumentException("countScale has " + countScale.channels() + " channels, not " + d);
        }
        int r = content.required("axes").size();
        axes = ModelNumbers.matrix(content.required("axes"), r, d, "axes");
        centre = ModelNumbers.vector(content.required("centre"), d, "centre");
        fisherRatios = ModelNumbers.vector(content.required("fisherRatios"), r, "fisherRatios");
        fisherShares = shares(content.required("fisherShares"), fisherRatios);
        List<ModelMaterial> list = new ArrayList<>();
        content.required("materials").forEach(node -> list.add(ModelMaterial.fromJson(node, d, r)));
        materials = List.copyOf(list);
        int g = materials.size();
        if (r < 1 || g < 2) {
            throw new IllegalArgumentException(r + " axes and " + g + " materials make no model");
        }
        JsonNode decision = content.required("decision");
        weights = ModelNumbers.matrix(decision.required("weights"), g, r, "decision.weights");
        constants = ModelNumbers.vector(decision.required("constants"), g, "decision.constants");
        JsonNode beyond = decision.required("unfamiliarBeyond");
        unfamiliarBeyond = beyond.isNull()
                ? OptionalDouble.empty()
                : OptionalDouble.of(ModelNumbers.number(beyond, "decision.unfamiliarBeyond"));
        JsonNode term = content.path("residual");
        residual = term.isObject() ? Optional.of(ResidualTerm.fromJson(term, d)) : Optional.empty();
    }

    /** The model that a fit and its context make. */
    public static Model of(Fit fit, ModelContext context) {
        return sealed(ModelContent.of(fit, context));
    }

    /** The model of complete content, given its fingerprint here. */
    static Model sealed(ObjectNode content) {
        content.put("fingerprint", fingerprint(content));
        return new Model(content);
    }

    /**
     * Reads a model file.
     *
     * @param place what is being read, for the message
     * @throws Fault of kind input where it is no model or one of a newer major version; of kind storage where it is not what was written
     */
    public static Model read(JsonNode node, String place) {
        if (!FORMAT.equals(node.path("format").textValue())) {
            throw Fault.input("not a model file")
                    .at(place)
                    .found("format " + node.path("format"))
                    .expected("format \"" + FORMAT + "\"")
                    .remedy("give the folder of a model, or its fingerprint on the shelf");
        }
        requireVersion(node.path("version"), place);
        String stated = node.path("fingerprint").asText();
        String actual = fingerprint(node);
        if (!actual.equals(stated)) {
            throw Fault.storage("the model is not what was written: its content has been altered")
                    .at(place)
                    .found("fingerprint " + actual)
                    .expected(stated.isEmpty() ? "the fingerprint it states, but it states none" : stated)
                    .remedy("take the model from the shelf again, or refit");
        }
        try {
            return new Model(node.deepCopy());
        } catch (IllegalArgumentException | NullPointerException e) {
            throw Fault.storage("the model is not complete: " + e.getMessage())
                    .at(place)
                    .remedy("take the model from the shelf again, or refit")
                    .because(e);
        }
    }

    /** None where every ratio is 0: shares of nothing are no numbers. */
    private static double[] shares(JsonNode node, double[] ratios) {
        boolean undefined = Arrays.stream(ratios).allMatch(ratio -> ratio == 0);
        return ModelNumbers.vector(node, undefined ? 0 : ratios.length, "fisherShares");
    }

    private static void requireVersion(JsonNode version, String place) {
        String text = version.asText();
        String major = text.split("\\.", 2)[0];
        boolean number =
                !major.isEmpty() && major.length() < 10 && major.chars().allMatch(c -> c >= '0' && c <= '9');
        if (!number || Integer.parseInt(major) > MAJOR) {
            throw Fault.input(number ? "the model file is of a newer version" : "the model file states no version")
                    .at(place)
                    .found("version " + version)
                    .expected("version " + MAJOR + ".x")
                    .remedy("read it with the version of the program that wrote it, or a later one");
        }
    }

    /** SHA-256 over the canonical content: without the fingerprint, names of inputs, and coarse or fine. */
    static String fingerprint(JsonNode node) {
        ObjectNode canonical = node.deepCopy();
        canonical.remove("fingerprint");
        if (canonical.path("madeFrom") instanceof ObjectNode lineage) {
            lineage.remove("inputs");
        }
        canonical.path("countScale").path("channels").forEach(channel -> {
            if (channel instanceof ObjectNode object) {
                object.remove("precision");
            }
        });
        return Json.fingerprint(canonical);
    }

    /** 64 hexadecimal digits over the canonical content. */
    public String fingerprint() {
        return content.required("fingerprint").textValue();
    }

    /** The content of {@code model.json}; a copy. */
    public ObjectNode json() {
        return content.deepCopy();
    }

    /** {@code fleet}, {@code group …}, {@code own …} or {@code table}. */
    public String scope() {
        return content.required("scope").textValue();
    }

    /** What it was made from. */
    public MadeFrom madeFrom() {
        return madeFrom;
    }

    /** Names of the d channels. */
    public List<String> channels() {
        return channels;
    }

    /** {@code {"head", "tail"}}, each in its own JSON form; a copy. */
    public JsonNode pretreatment() {
        return content.required("pretreatment").deepCopy();
    }

    /** What turns values into the counts that the model is defined on. */
    public CountScale countScale() {
        return countScale;
    }

    /** The amount added to the within scatter, as a share of its mean diagonal. */
    public double ridge() {
        return content.required("ridge").doubleValue();
    }

    /** Of the within scatter, equilibrated, ridge included. */
    public double reciprocalCondition() {
        return content.required("reciprocalCondition").doubleValue();
    }

    /** Records less materials. */
    public long withinDegreesOfFreedom() {
        return content.required("withinDegreesOfFreedom").longValue();
    }

    /** What weighted the scatter; a copy. */
    public JsonNode balance() {
        return content.required("balance").deepCopy();
    }

    /** All that the fit depended on but sums, head and count scale; empty for a model of a table. A copy. */
    public Optional<JsonNode> recipe() {
        return Optional.ofNullable(content.get("recipe")).map(JsonNode::deepCopy);
    }

    /** Number of axes. */
    public int rank() {
        return axes.length;
    }

    /** λ of each axis, descending. */
    public double[] fisherRatios() {
        return fisherRatios.clone();
    }

    /** λ/Σλ over all axes that there are, kept or not. */
    public double[] fisherShares() {
        return fisherShares.clone();
    }

    /** The value whose position is 0, d numbers. */
    public double[] centre() {
        return centre.clone();
    }

    /** r rows of d numbers. */
    public double[][] axes() {
        return ModelNumbers.copy(axes);
    }

    /** The materials, in the order that decides ties. */
    public List<ModelMaterial> materials() {
        return materials;
    }

    /** g rows of r numbers: the linear form of the decision rule. */
    public double[][] decisionWeights() {
        return ModelNumbers.copy(weights);
    }

    /** g numbers: its constants, the logarithm of the prior included. */
    public double[] decisionConstants() {
        return constants.clone();
    }

    /** Squared distance to the decided material beyond which a record is unfamiliar; empty where none is. */
    public OptionalDouble unfamiliarBeyond() {
        return unfamiliarBeyond;
    }

    /** What judges the energy outside the axes; empty where the axes span everything or nothing is flagged. */
    public Optional<ResidualTerm> residual() {
        return residual;
    }

    /** The fingerprint of the model that its signs or rotation follow. */
    public Optional<String> orientedTo() {
        return Optional.ofNullable(content.path("orientedTo").textValue());
    }

    /** Largest rounding distance of the count scale, in steps. */
    public OptionalDouble scaleLoss() {
        JsonNode node = content.path("scaleLoss");
        return node.isNumber() ? OptionalDouble.of(node.doubleValue()) : OptionalDouble.empty();
    }

    /** What the fit had to say. */
    public List<String> remarks() {
        return texts(content.path("remarks"));
    }

    private static List<String> texts(JsonNode array) {
        List<String> texts = new ArrayList<>();
        array.forEach(element -> texts.add(element.textValue()));
        return List.copyOf(texts);
    }
}
