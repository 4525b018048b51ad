package turnstone.refit;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.LinkedHashMap;
import java.util.Map;
import java.util.Objects;
import java.util.OptionalDouble;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.measure.TailSpec;
import turnstone.plant.RefitRecipe.Balance;
import turnstone.plant.RefitRecipe.Prior;
import turnstone.plant.RefitRecipe.Weighting;

/**
 * How coefficients are made from sums: all that a fit depends on but the sums, the head and the count scale. Part of every model made
 * from a ledger, so that the model can be made again, and made again without a tray group.
 *
 * @param window_days days of the ledger that go in
 * @param balance weights between instruments and between materials
 * @param ridge the amount added to the within scatter as a share of its mean diagonal; empty for analytic shrinkage
 * @param tail the linear steps that are applied to the sums
 * @param rank axes kept; 0 keeps all
 * @param prior what the decision rule assumes
 * @param unfamiliarShare the share of good records that may be flagged unfamiliar
 */
public record Recipe(
        int window_days,
        Balance balance,
        OptionalDouble ridge,
        TailSpec tail,
        int rank,
        Prior prior,
        double unfamiliarShare) {
    private static final String ANALYTIC = "analytic";
    private static final String EQUAL = "equal";
    private static final String AS_COUNTED = "as counted";

    public Recipe {
        Objects.requireNonNull(balance, "balance");
        Objects.requireNonNull(ridge, "ridge");
        Objects.requireNonNull(tail, "tail");
        Objects.requireNonNull(prior, "prior");
        if (window_days < 1) {
            throw new IllegalArgumentException("a window of at least one day: " + window_days);
        }
    }

    /** The same with another ridge; empty for analytic shrinkage. */
    public Recipe withRidge(OptionalDouble other) {
        return new Recipe(window_days, balance, other, tail, rank, prior, unfamiliarShare);
    }

    /** The same with another number of axes; 0 keeps all. */
    public Recipe withRank(int axes) {
        return new Recipe(window_days, balance, ridge, tail, axes, prior, unfamiliarShare);
    }

    /** The same with another tail. */
    public Recipe withTail(TailSpec other) {
        return new Recipe(window_days, balance, ridge, other, rank, prior, unfamiliarShare);
    }

    /** The same with other weights. */
    public Recipe withBalance(Balance other) {
        return new Recipe(window_days, other, ridge, tail, rank, prior, unfamiliarShare);
    }

    /** The form that the model file keeps. */
    public ObjectNode json() {
        ObjectNode node = Json.object().put("window_days", window_days);
        node.putObject("balance")
                .put("instruments", word(balance.instruments()))
                .put("materials", word(balance.materials()));
        if (ridge.isPresent()) {
            node.put("ridge", ridge.getAsDouble());
        } else {
            node.put("ridge", ANALYTIC);
        }
        node.set("tail", tail.json());
        node.put("rank", rank);
        if (prior instanceof Prior.Listed listed) {
            ObjectNode shares = node.putObject("decisionPrior");
            listed.shares().entrySet().stream()
                    .sorted(Map.Entry.comparingByKey())
                    .forEach(share -> shares.put(share.getKey(), share.getValue()));
        } else {
            node.put("decisionPrior", prior instanceof Prior.Equal ? EQUAL : AS_COUNTED);
        }
        return node.put("unfamiliarShare", unfamiliarShare);
    }

    /**
     * Reads what {@link #json} wrote.
     *
     * @throws Fault of kind input where the model was not made by a recipe
     */
    public static Recipe fromJson(JsonNode node, String place) {
        if (!node.isObject()) {
            throw Fault.input("this model holds no recipe, so it can't be made again from a ledger")
                    .at(place)
                    .remedy("use a model that refit or nightly made");
        }
        JsonNode ridge = node.path("ridge");
        return new Recipe(
                node.path("window_days").intValue(),
                new Balance(
                        weighting(node.path("balance").path("instruments"), place),
                        weighting(node.path("balance").path("materials"), place)),
                ridge.isNumber() ? OptionalDouble.of(ridge.doubleValue()) : OptionalDouble.empty(),
                TailSpec.fromJson(node.path("tail")),
                node.path("rank").intValue(),
                prior(node.path("decisionPrior"), place),
                node.path("unfamiliarShare").doubleValue());
    }

    private static String word(Weighting weighting) {
        return weighting == Weighting.EQUAL ? EQUAL : AS_COUNTED;
    }

    private static Weighting weighting(JsonNode word, String place) {
        return switch (word.asText()) {
            case EQUAL -> Weighting.EQUAL;
            case AS_COUNTED -> Weighting.AS_COUNTED;
            default -> throw unknown("balance", word, place);
        };
    }

    private static Prior prior(JsonNode node, String place) {
        if (node.isObject()) {
            Map<String, Double> shares = new LinkedHashMap<>();
            node.properties()
                    .forEach(
                            share -> shares.put(share.getKey(), share.getValue().doubleValue()));
            return new Prior.Listed(shares);
        }
        return switch (node.asText()) {
            case EQUAL -> new Prior.Equal();
            case AS_COUNTED -> new Prior.AsCounted();
            default -> throw unknown("decisionPrior", node, place);
        };
    }

    private static Fault unknown(String key, JsonNode found, String place) {
        return Fault.input("the recipe's `" + key + "` has no known value")
                .at(place)
                .found(found.asText())
                .expected(EQUAL + " or " + AS_COUNTED);
    }
}
