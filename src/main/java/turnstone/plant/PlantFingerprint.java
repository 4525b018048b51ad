package turnstone.plant;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import turnstone.json.Json;
import turnstone.measure.Instrument;

/** The part of a plant's content that changes numbers, as canonical JSON. */
final class PlantFingerprint {
    private PlantFingerprint() {}

    static String of(PlantContent content) {
        ObjectNode node = Json.object();
        ArrayNode materials = node.putArray("materials");
        for (Material material : content.materials()) {
            ObjectNode one = materials.addObject().put("name", material.name());
            material.grams_per_cm2().ifPresent(mass -> one.put("grams_per_cm2", mass));
        }
        content.sorters().forEach(node.putArray("sorters")::add);
        ArrayNode instruments = node.putArray("instruments");
        content.instruments().forEach(instrument -> put(instruments.addObject(), instrument));
        node.set("head", content.head().json());
        node.set("tail", content.tail().json());
        node.put("countScale", content.countScale().fingerprint());
        node.put("trayGroups", content.trayDeal().count());
        ObjectNode listed = node.putObject("trays");
        content.trayDeal().listed().forEach((material, trays) -> trays.forEach(listed.putObject(material)::put));
        put(node.putObject("refit"), content.refit());
        ArrayNode duties = node.putArray("duties");
        content.duties().forEach(duty -> put(duties.addObject(), duty));
        return Json.fingerprint(node);
    }

    private static void put(ObjectNode node, Instrument instrument) {
        node.put("name", instrument.name()).put("channels", instrument.channels());
        node.set("wavelength_nm", Json.array(instrument.wavelength_nm()));
        instrument.deadChannels().forEach(node.putArray("dead")::add);
        ArrayNode bands = node.putArray("bands");
        for (Instrument.Band band : instrument.bands()) {
            bands.addObject()
                    .put("firstColumn", band.firstColumn())
                    .put("lastColumn", band.lastColumn())
                    .set("wavelength_nm", Json.array(band.wavelength_nm()));
        }
    }

    private static void put(ObjectNode node, RefitRecipe refit) {
        node.put("window_days", refit.window_days())
                .put("instruments", Words.of(refit.balance().instruments()))
                .put("materials", Words.of(refit.balance().materials()))
                .put("rank", refit.rank())
                .put("unfamiliarShare", refit.unfamiliarShare());
        if (refit.ridge() instanceof RefitRecipe.Ridge.Ladder ladder) {
            ladder.rungs().forEach(node.putArray("ridge")::add);
        } else {
            node.put("ridge", "analytic");
        }
        if (refit.decisionPrior() instanceof RefitRecipe.Prior.Listed listed) {
            put(node.putObject("decisionPrior"), listed.shares());
        } else {
            node.put(
                    "decisionPrior", refit.decisionPrior() instanceof RefitRecipe.Prior.Equal ? "equal" : "as counted");
        }
    }

    private static void put(ObjectNode node, Map<String, Double> shares) {
        new TreeMap<>(shares).forEach(node::put);
    }

    private static void put(ObjectNode node, Duty duty) {
        node.put("name", duty.name()).put("productStream", Words.of(duty.productStream()));
        putAll(node.putArray("targets"), duty.targets());
        putAll(node.putArray("sorters"), duty.sorters());
        put(node.putObject("infeedMix"), duty.infeedMix());
        ArrayNode requirements = node.putArray("requirements");
        for (Requirement requirement : duty.requirements()) {
            requirements
                    .addObject()
                    .put("name", requirement.name())
                    .put("least", requirement.least())
                    .put("confidence", requirement.confidence());
        }
        put(node.putObject("terms"), duty.terms());
    }

    private static void put(ObjectNode node, DutyTerms terms) {
        put(node.putObject("infeedMixDeviation"), terms.mixDeviation());
        terms.costs()
                .ifPresent(costs -> node.putObject("costs")
                        .put("targetLost_perTonne", costs.targetLost_perTonne())
                        .put("otherSent_perTonne", costs.otherSent_perTonne()));
        terms.required()
                .ifPresent(required -> node.putObject("required")
                        .put("figure", Words.of(required.figure()))
                        .put("share", required.share()));
        node.put("cut", Words.of(terms.cut()));
        GainRule gain = terms.gain();
        node.putObject("gain")
                .put("above", gain.above())
                .put("confidence", gain.confidence())
                .put("days", gain.days())
                .put("sorters", gain.sorters())
                .put("showings", gain.showings());
        ArrayNode guards = node.putArray("guards");
        terms.guards()
                .forEach(guard -> guards.addObject()
                        .put("name", guard.name())
                        .put("limit", guard.limit())
                        .put("confidence", guard.confidence()));
        ArrayNode limits = node.putArray("limits");
        terms.limits()
                .forEach(limit -> limits.addObject()
                        .put("material", limit.material())
                        .put("most_ppm", limit.most_ppm())
                        .put("use", Words.of(limit.use()))
                        .put("confidence", limit.confidence()));
    }

    private static void putAll(ArrayNode array, List<String> texts) {
        texts.forEach(array::add);
    }
}
