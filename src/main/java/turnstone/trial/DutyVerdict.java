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
 * @param requirements as judged, the plant's in their order, then the comparison
 * @param figures what was found, for each form and side
 */
public record DutyVerdict(
        String name,
        Decision decision,
        String mainReason,
        List<RequirementResult> requirements,
        List<FigureLine> figures) {
    /** Keeps copies. */
    public DutyVerdict {
        requirements = List.copyOf(requirements);
        figures = List.copyOf(figures);
    }

    static DutyVerdict of(String name, List<RequirementResult> requirements, List<FigureLine> figures) {
        boolean release = !requirements.isEmpty() && requirements.stream().allMatch(RequirementResult::met);
        return new DutyVerdict(
                name, release ? Decision.RELEASE : Decision.HOLD, mainReason(requirements), requirements, figures);
    }

    private static String mainReason(List<RequirementResult> requirements) {
        if (requirements.isEmpty()) {
            return "the plant file gives this duty no requirement, and nothing is in service to compare with;"
                    + " write one to have it judged";
        }
        Optional<RequirementResult> closest = requirements.stream()
                .filter(requirement -> requirement.margin().isPresent())
                .min(Comparator.comparingDouble(
                        requirement -> requirement.margin().orElseThrow()));
        if (closest.isPresent() && !closest.get().met()) {
            return comparison(closest.get());
        }
        for (RequirementResult requirement : requirements) {
            if (requirement.outcome() == RequirementResult.Outcome.NOT_JUDGED) {
                return requirement.name() + " could not be judged: " + requirement.why();
            }
        }
        String comparison = comparison(closest.orElseThrow());
        return requirements.size() == 1
                ? comparison
                : String.format(
                        Locale.ROOT, "all %d requirements are met; closest: %s", requirements.size(), comparison);
    }

    private static String comparison(RequirementResult requirement) {
        return requirement.name() + " is "
                + requirement.amount(requirement.found().orElseThrow()) + ", required "
                + requirement.amount(requirement.required());
    }

    ObjectNode json() {
        ObjectNode node = Json.object();
        node.put("name", name).put("verdict", decision.label()).put("mainReason", mainReason);
        ArrayNode list = node.putArray("requirements");
        requirements.forEach(requirement -> list.add(requirement.json()));
        ArrayNode found = node.putArray("figures");
        figures.forEach(line -> found.add(VerdictJson.figure(line)));
        return node;
    }
}
