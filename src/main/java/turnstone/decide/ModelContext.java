package turnstone.decide;

import com.fasterxml.jackson.databind.JsonNode;
import java.util.List;
import java.util.Objects;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.stream.DoubleStream;
import turnstone.json.Json;
import turnstone.measure.CountScale;

/**
 * What a model must say that a fit does not know. Made by {@link #of}, refined by the {@code with} methods; immutable but for the JSON
 * nodes, which nobody changes.
 *
 * @param scope {@code fleet}, {@code group …}, {@code own …} or {@code table}
 * @param channels names of the channels behind the head, d of them
 * @param countScale that counts are made with
 * @param pretreatment {@code {"head", "tail"}}, each in its own JSON form
 * @param balance what weighted the scatter, in the form of the recipe
 * @param recipe all that a fit depends on but sums, head and count scale; empty for a table, which is fitted once
 * @param madeFrom the lineage
 * @param decisionPriors of the materials in the fit's order, above 0, together 1; empty for equal ones
 * @param unfamiliarShare the share of good records that may be flagged, 0 (never flag) up to 1
 * @param orientedTo the fingerprint of the model that signs or rotation follow
 * @param scaleLoss largest rounding distance in steps; empty where it is not known
 */
public record ModelContext(
        String scope,
        List<String> channels,
        CountScale countScale,
        JsonNode pretreatment,
        JsonNode balance,
        Optional<JsonNode> recipe,
        MadeFrom madeFrom,
        List<Double> decisionPriors,
        double unfamiliarShare,
        Optional<String> orientedTo,
        OptionalDouble scaleLoss) {
    /** Checks shapes and shares. */
    public ModelContext {
        channels = List.copyOf(channels);
        decisionPriors = List.copyOf(decisionPriors);
        Objects.requireNonNull(scope);
        if (countScale.channels() != channels.size()) {
            throw new IllegalArgumentException(
                    "a count scale of " + countScale.channels() + " channels for " + channels.size());
        }
        if (!(unfamiliarShare >= 0 && unfamiliarShare < 1)) {
            throw new IllegalArgumentException("an unfamiliar share is 0 or more and below 1, not " + unfamiliarShare);
        }
    }

    /** A context with pretreatment and balance left plain, equal priors, one good record in a hundred flagged, no orientation. */
    public static ModelContext of(String scope, List<String> channels, CountScale countScale, MadeFrom madeFrom) {
        return new ModelContext(
                scope,
                channels,
                countScale,
                Json.object(),
                Json.object(),
                Optional.empty(),
                madeFrom,
                List.of(),
                0.01,
                Optional.empty(),
                OptionalDouble.empty());
    }

    /** The same with the pretreatment's JSON, {@code {"head", "tail"}}. */
    public ModelContext withPretreatment(JsonNode node) {
        return new ModelContext(
                scope,
                channels,
                countScale,
                node,
                balance,
                recipe,
                madeFrom,
                decisionPriors,
                unfamiliarShare,
                orientedTo,
                scaleLoss);
    }

    /** The same with the balance's JSON. */
    public ModelContext withBalance(JsonNode node) {
        return new ModelContext(
                scope,
                channels,
                countScale,
                pretreatment,
                node,
                recipe,
                madeFrom,
                decisionPriors,
                unfamiliarShare,
                orientedTo,
                scaleLoss);
    }

    /** The same with the JSON of the recipe that makes the model again from a ledger. */
    public ModelContext withRecipe(JsonNode node) {
        return new ModelContext(
                scope,
                channels,
                countScale,
                pretreatment,
                balance,
                Optional.of(node),
                madeFrom,
                decisionPriors,
                unfamiliarShare,
                orientedTo,
                scaleLoss);
    }

    /** The same with these decision priors, in the fit's order of materials. */
    public ModelContext withDecisionPriors(double[] priors) {
        return new ModelContext(
                scope,
                channels,
                countScale,
                pretreatment,
                balance,
                recipe,
                madeFrom,
                DoubleStream.of(priors).boxed().toList(),
                unfamiliarShare,
                orientedTo,
                scaleLoss);
    }

    /** The same with another share of good records that may be flagged. */
    public ModelContext withUnfamiliarShare(double share) {
        return new ModelContext(
                scope,
                channels,
                countScale,
                pretreatment,
                balance,
                recipe,
                madeFrom,
                decisionPriors,
                share,
                orientedTo,
                scaleLoss);
    }

    /** The same, oriented to the model of this fingerprint. */
    public ModelContext withOrientedTo(String fingerprint) {
        return new ModelContext(
                scope,
                channels,
                countScale,
                pretreatment,
                balance,
                recipe,
                madeFrom,
                decisionPriors,
                unfamiliarShare,
                Optional.of(fingerprint),
                scaleLoss);
    }

    /** The same with the loss of the count scale: the largest rounding distance, in steps. */
    public ModelContext withScaleLoss(double steps) {
        return new ModelContext(
                scope,
                channels,
                countScale,
                pretreatment,
                balance,
                recipe,
                madeFrom,
                decisionPriors,
                unfamiliarShare,
                orientedTo,
                OptionalDouble.of(steps));
    }
}
