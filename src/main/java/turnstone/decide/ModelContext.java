package turnstone.decide;

import com.fasterxml.jackson.databind.JsonNode;
import java.util.List;
import java.util.Objects;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.function.Consumer;
import java.util.stream.DoubleStream;
import turnstone.json.Json;
import turnstone.measure.CountScale;

/**
 * What a model must say that a fit does not know. Made by {@link #of}, refined by the {@code with} methods, each of which returns another;
 * immutable but for the JSON nodes, which nobody changes.
 */
public final class ModelContext implements Cloneable {
    private static final double USUAL_UNFAMILIAR_SHARE = 0.01;

    private final String scope;
    private final List<String> channels;
    private final CountScale countScale;
    private final MadeFrom madeFrom;
    private JsonNode pretreatment = Json.object();
    private JsonNode balance = Json.object();
    private Optional<JsonNode> recipe = Optional.empty();
    private List<Double> decisionPriors = List.of();
    private double unfamiliarShare = USUAL_UNFAMILIAR_SHARE;
    private Optional<String> orientedTo = Optional.empty();
    private OptionalDouble scaleLoss = OptionalDouble.empty();

    private ModelContext(String scope, List<String> channels, CountScale countScale, MadeFrom madeFrom) {
        this.scope = Objects.requireNonNull(scope);
        this.channels = List.copyOf(channels);
        this.countScale = countScale;
        this.madeFrom = madeFrom;
        if (countScale.channels() != channels.size()) {
            throw new IllegalArgumentException(
                    "a count scale of " + countScale.channels() + " channels for " + channels.size());
        }
    }

    /**
     * A context with pretreatment and balance left plain, equal priors, one good record in a hundred flagged, no orientation.
     *
     * @param scope {@code fleet}, {@code group …}, {@code own …} or {@code table}
     * @param channels names of the channels behind the head, d of them
     * @param countScale that counts are made with
     * @param madeFrom the lineage
     */
    public static ModelContext of(String scope, List<String> channels, CountScale countScale, MadeFrom madeFrom) {
        return new ModelContext(scope, channels, countScale, madeFrom);
    }

    private ModelContext with(Consumer<ModelContext> change) {
        try {
            ModelContext changed = (ModelContext) clone();
            change.accept(changed);
            return changed;
        } catch (CloneNotSupportedException e) {
            throw new IllegalStateException(e);
        }
    }

    /** The same with the pretreatment's JSON, {@code {"head", "tail"}}, each in its own form. */
    public ModelContext withPretreatment(JsonNode node) {
        return with(changed -> changed.pretreatment = node);
    }

    /** The same with the JSON of what weighted the scatter. */
    public ModelContext withBalance(JsonNode node) {
        return with(changed -> changed.balance = node);
    }

    /** The same with the JSON of the recipe that makes the model again from a ledger. */
    public ModelContext withRecipe(JsonNode node) {
        return with(changed -> changed.recipe = Optional.of(node));
    }

    /** The same with these decision priors, in the fit's order of materials, above 0 and together 1. */
    public ModelContext withDecisionPriors(double[] priors) {
        return with(changed ->
                changed.decisionPriors = DoubleStream.of(priors).boxed().toList());
    }

    /** The same with another share of good records that may be flagged, 0 (never flag) up to 1. */
    public ModelContext withUnfamiliarShare(double share) {
        if (!(share >= 0 && share < 1)) {
            throw new IllegalArgumentException("an unfamiliar share is 0 or more and below 1, not " + share);
        }
        return with(changed -> changed.unfamiliarShare = share);
    }

    /** The same, its signs or rotation following the model of this fingerprint. */
    public ModelContext withOrientedTo(String fingerprint) {
        return with(changed -> changed.orientedTo = Optional.of(fingerprint));
    }

    /** The same with the loss of the count scale: the largest rounding distance, in steps. */
    public ModelContext withScaleLoss(double steps) {
        return with(changed -> changed.scaleLoss = OptionalDouble.of(steps));
    }

    String scope() {
        return scope;
    }

    List<String> channels() {
        return channels;
    }

    CountScale countScale() {
        return countScale;
    }

    MadeFrom madeFrom() {
        return madeFrom;
    }

    JsonNode pretreatment() {
        return pretreatment;
    }

    JsonNode balance() {
        return balance;
    }

    Optional<JsonNode> recipe() {
        return recipe;
    }

    /** Empty for equal ones. */
    List<Double> decisionPriors() {
        return decisionPriors;
    }

    double unfamiliarShare() {
        return unfamiliarShare;
    }

    Optional<String> orientedTo() {
        return orientedTo;
    }

    /** Empty where it is not known, or nothing was lost. */
    OptionalDouble scaleLoss() {
        return scaleLoss;
    }
}
