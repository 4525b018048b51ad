package turnstone.trial;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import turnstone.json.Json;

/**
 * The verdict for one duty.
 *
 * @param name the duty
 * @param decision release where every requirement is met, hold otherwise
 * @param mainReason one sentence: the widest miss, else what could not be judged, else the closest of those that are met
 * @param requirements as judged: the plant's in their order, the gain, guards, limits
 * @param figures what was found, for each form and side
 * @param bounds on single materials in the product
 * @param costs of what goes astray, for each side; empty where the duty names none
 * @param notes what a reader must know of the showings
 */
public record DutyVerdict(
        String name,
        Decision decision,
        String mainReason,
        List<RequirementResult> requirements,
        List<FigureLine> figures,
        List<PpmBound> bounds,
        List<CostLine> costs,
        List<String> notes) {
    /** Keeps copies. */
    public DutyVerdict {
        requirements = List.copyOf(requirements);
        figures = List.copyOf(figures);
        bounds = List.copyOf(bounds);
        costs = List.copyOf(costs);
        notes = List.copyOf(notes);
    }

    static DutyVerdict of(
            String name,
            List<RequirementResult> requirements,
            List<FigureLine> figures,
            List<PpmBound> bounds,
            List<CostLine> costs,
            List<String> notes) {
        boolean release = !requirements.isEmpty() && requirements.stream().allMatch(RequirementResult::met);
        return new DutyVerdict(
                name,
                release ? Decision.RELEASE : Decision.HOLD,
                mainReason(requirements),
                requirements,
                figures,
                bounds,
                costs,
                notes);
    }

    private static String mainReason(List<RequirementResult> requirements) {
        if (requirements.isEmpty()) {
            return "the plant file gives this duty no requirement, and nothing is in service to compare with;"
                    + " write one to have it judged";
        }
        Optional<RequirementResult> worst = closest(requirements, RequirementResult.Outcome.NOT_MET);
        if (worst.isPresent()) {
            return worst.get().sentence();
        }
        for (RequirementResult requirement : requirements) {
            if (requirement.outcome() == RequirementResult.Outcome.NOT_JUDGED) {
                return requirement.sentence();
            }
        }
        String comparison = closest(requirements, RequirementResult.Outcome.MET)
                .orElseThrow()
                .sentence();
        return requirements.size() == 1
                ? comparison
                : String.format(
                        Locale.ROOT, "all %d requirements are met; closest: %s", requirements.size(), comparison);
    }

    private static Optional<RequirementResult> closest(
            List<RequirementResult> requirements, RequirementResult.Outcome outcome) {
        return requirements.stream()
                .filter(requirement -> requirement.outcome() == outcome)
                .min(Comparator.comparingDouble(
                        requirement -> requirement.closeness().orElseThrow()));
    }

    ObjectNode json() {
        ObjectNode node = Json.object();
        node.put("name", name).put("verdict", decision.label()).put("mainReason", mainReason);
        ArrayNode list = node.putArray("requirements");
        requirements.forEach(requirement -> list.add(requirement.json()));
        ArrayNode found = node.putArray("figures");
        figures.forEach(line -> found.add(VerdictJson.figure(line)));
        ArrayNode limits = node.putArray("limits");
        bounds.forEach(bound -> limits.add(bound.json()));
        ObjectNode money = node.putObject("costs_perTonne");
        costs.forEach(line -> money.put(line.side() == Side.CANDIDATE ? "candidate" : "inService", line.perTonne()));
        ArrayNode remarks = node.putArray("notes");
        notes.forEach(remarks::add);
        return node;
    }
}
