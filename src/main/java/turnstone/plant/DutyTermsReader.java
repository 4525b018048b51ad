package turnstone.plant;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;

/** Reads what a duty says beyond its targets, stream, sorters, mix and absolute requirements. */
final class DutyTermsReader {
    private static final double USUAL_CONFIDENCE = 0.95;

    private final List<String> materials;
    private final List<String> targets;
    private final Map<String, Double> mix;

    DutyTermsReader(List<String> materials, List<String> targets, Map<String, Double> mix) {
        this.materials = materials;
        this.targets = targets;
        this.mix = mix;
    }

    DutyTerms terms(Entry duty) {
        return new DutyTerms(
                duty.optional("infeedMixDeviation").map(this::deviations).orElse(Map.of()),
                duty.optional("costs")
                        .map(costs -> new DutyTerms.Costs(
                                costs.at("targetLost_perTonne").number(),
                                costs.at("otherSent_perTonne").number())),
                duty.optional("required")
                        .map(required -> new Required(
                                Requirement.Figure.of(required.at("figure").text()),
                                required.at("share").number())),
                cut(duty),
                duty.optional("gain").map(DutyTermsReader::gain).orElse(GainRule.standard()),
                duty.optional("guards").map(DutyTermsReader::guards).orElse(List.of()),
                duty.optional("limits").map(this::limits).orElse(List.of()));
    }

    private static DutyTerms.CutRule cut(Entry duty) {
        if (duty.has("cut") && !duty.has("required")) {
            throw duty.at("cut")
                    .fault("a cut needs a figure to be set by")
                    .expected("the key `required` beside it, with figure and share");
        }
        return duty.text("cut").map(DutyTerms.CutRule::of).orElse(DutyTerms.CutRule.POINT);
    }

    private Map<String, Double> deviations(Entry entry) {
        Map<String, Double> deviations = new LinkedHashMap<>();
        for (String material : entry.keys()) {
            Known.name(entry, material, List.copyOf(mix.keySet()), "material of the infeed");
            deviations.put(material, entry.at(material).number());
        }
        return deviations;
    }

    private static GainRule gain(Entry entry) {
        GainRule usual = GainRule.standard();
        return new GainRule(
                entry.number("above", usual.above()),
                entry.number("confidence", usual.confidence()),
                entry.whole("days", usual.days()),
                entry.whole("sorters", usual.sorters()),
                entry.whole("showings", usual.showings()));
    }

    private static List<Guard> guards(Entry list) {
        List<Guard> guards = new ArrayList<>();
        for (Entry entry : list.items()) {
            Guard.Kind kind = Guard.Kind.of(Known.name(entry.at("name"), Guard.Kind.labels(), "guard"));
            if (guards.stream().anyMatch(earlier -> earlier.kind() == kind)) {
                throw entry.fault("guard `" + kind.label() + "` is given twice");
            }
            String key = entry.oneOf("most", "least");
            if (!key.equals(kind.side().key())) {
                throw entry.fault("guard `" + kind.label() + "` takes a limit from the other side")
                        .found("key `" + key + "`")
                        .expected("key `" + kind.side().key() + "`");
            }
            if (!kind.hasInterval() && (entry.has("bound") || entry.has("confidence"))) {
                throw entry.fault("guard `" + kind.label() + "` has no interval")
                        .found(entry.has("bound") ? "key `bound`" : "key `confidence`")
                        .expected("the limit alone");
            }
            guards.add(new Guard(
                    kind,
                    entry.at(key).number(),
                    entry.text("bound", "upper").equals("upper") && kind.hasInterval()
                            ? Requirement.Bound.LOWER
                            : Requirement.Bound.POINT,
                    entry.number("confidence", USUAL_CONFIDENCE)));
        }
        return guards;
    }

    private List<PpmLimit> limits(Entry list) {
        List<PpmLimit> limits = new ArrayList<>();
        for (Entry entry : list.items()) {
            String material = Known.name(entry.at("material"), materials, "material");
            if (targets.contains(material) || mix.getOrDefault(material, 0.0) == 0) {
                throw entry.at("material")
                        .fault("a limit is on a material of the infeed that is not a target")
                        .found(material);
            }
            if (limits.stream().anyMatch(earlier -> earlier.material().equals(material))) {
                throw entry.fault("a limit on `" + material + "` is given twice");
            }
            limits.add(new PpmLimit(
                    material,
                    entry.at("most_ppm").number(),
                    PpmLimit.Use.of(entry.text("use", "report")),
                    entry.number("confidence", USUAL_CONFIDENCE)));
        }
        return limits;
    }
}
