package turnstone.decide;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.Arrays;
import java.util.Optional;
import turnstone.fisher.Fit;
import turnstone.fisher.ResidualNorm;
import turnstone.json.Json;

/** Writes a fit and its context as the content of a model file, fingerprint excepted. */
final class ModelContent {
    private ModelContent() {}

    static ObjectNode of(Fit fit, ModelContext context) {
        double[] priors = priors(fit, context);
        ObjectNode node = Json.object();
        node.put("format", Model.FORMAT).put("version", Model.VERSION).put("fingerprint", "");
        node.put("scope", context.scope());
        node.set("madeFrom", context.madeFrom().json());
        ArrayNode channels = node.putArray("channels");
        context.channels().forEach(channels::add);
        node.set("pretreatment", context.pretreatment().deepCopy());
        node.set("countScale", context.countScale().json());
        context.scaleLoss().ifPresent(loss -> node.put("scaleLoss", loss));
        node.put("ridge", fit.ridge()).put("reciprocalCondition", fit.reciprocalCondition());
        node.put("withinDegreesOfFreedom", fit.withinDegreesOfFreedom());
        node.set("balance", context.balance().deepCopy());
        context.recipe().ifPresent(recipe -> node.set("recipe", recipe.deepCopy()));
        node.set("fisherRatios", Json.array(fit.fisherRatios()));
        node.set("fisherShares", Json.array(fit.fisherShares()));
        node.put("wilks", fit.wilks());
        node.set("centre", Json.array(fit.centre()));
        node.set("axes", ModelNumbers.json(fit.axes()));
        node.set("materials", materials(fit, priors));
        addDecision(node, fit, priors, context.unfamiliarShare());
        node.put("orientedTo", context.orientedTo().orElse(null));
        ArrayNode remarks = node.putArray("remarks");
        fit.remarks().forEach(remarks::add);
        return node;
    }

    private static double[] priors(Fit fit, ModelContext context) {
        int g = fit.materials().size();
        double[] priors = new double[g];
        if (context.decisionPriors().isEmpty()) {
            Arrays.fill(priors, 1.0 / g);
            return priors;
        }
        if (context.decisionPriors().size() != g) {
            throw new IllegalArgumentException(context.decisionPriors().size() + " priors for " + g + " materials");
        }
        Arrays.setAll(priors, context.decisionPriors()::get);
        return priors;
    }

    private static ArrayNode materials(Fit fit, double[] priors) {
        ArrayNode node = Json.array();
        for (int k = 0; k < priors.length; k++) {
            node.add(new ModelMaterial(
                            fit.materials().get(k),
                            fit.recordsPerMaterial()[k],
                            fit.means()[k],
                            fit.positions()[k],
                            priors[k])
                    .json());
        }
        return node;
    }

    /** The two limits share the flags between them: each takes half of the share of good records that may be flagged. */
    private static void addDecision(ObjectNode node, Fit fit, double[] priors, double unfamiliarShare) {
        ObjectNode decision = node.putObject("decision");
        decision.set("weights", ModelNumbers.json(DecisionRule.weights(fit.positions())));
        decision.set("constants", Json.array(DecisionRule.constants(fit.positions(), priors)));
        node.put("unfamiliarShare", unfamiliarShare);
        if (unfamiliarShare == 0) {
            decision.putNull("unfamiliarBeyond");
            return;
        }
        ResidualNorm norm = fit.residual();
        Optional<ResidualTerm> term = norm.expectedEnergy() > 0 && norm.effectiveDegreesOfFreedom() > 0
                ? Optional.of(ResidualTerm.of(
                        norm.basis(), norm.expectedEnergy(), norm.effectiveDegreesOfFreedom(), unfamiliarShare / 2))
                : Optional.empty();
        double share = term.isPresent() ? unfamiliarShare / 2 : unfamiliarShare;
        decision.put("unfamiliarBeyond", Quantiles.chiSquare(1 - share, fit.rank()));
        term.ifPresent(present -> node.set("residual", present.json()));
    }
}
