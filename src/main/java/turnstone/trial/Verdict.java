package turnstone.trial;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.time.LocalDate;
import java.util.List;
import java.util.Optional;
import turnstone.json.Json;

/**
 * Release or hold, with reasons: the content of {@code verdict.json}, and the text that a person reads out.
 *
 * <p>A model serves every duty of the plant, so it is released only where each of them says release.
 *
 * @param decision release or hold
 * @param mainReason one sentence
 * @param duties in the plant's order
 * @param days judged, ascending
 * @param showings that the trial saw
 * @param candidate the fingerprint of the model that would be released: the tried recipe on the whole window
 * @param inService the fingerprint of the model in service; empty where there is none
 */
public record Verdict(
        Decision decision,
        String mainReason,
        List<DutyVerdict> duties,
        List<LocalDate> days,
        int showings,
        String candidate,
        Optional<String> inService) {
    /** Keeps copies. */
    public Verdict {
        duties = List.copyOf(duties);
        days = List.copyOf(days);
    }

    /** The verdict file: a function of tallies, plant file and the two fingerprints, and of nothing else. */
    public ObjectNode json() {
        ObjectNode node = Json.object();
        node.put("verdict", decision.label()).put("mainReason", mainReason);
        node.put("restsOn", restsOn());
        node.put("candidate", candidate);
        node.put("inService", inService.orElse(null));
        ArrayNode dayList = node.putArray("days");
        days.forEach(day -> dayList.add(day.toString()));
        node.put("showings", showings);
        ArrayNode list = node.putArray("duties");
        duties.forEach(duty -> list.add(duty.json()));
        return node;
    }

    /** For people: main reason first, at most 80 columns but for long names. */
    public String text() {
        return VerdictText.of(this);
    }

    String restsOn() {
        return inService.isPresent()
                ? "the plant's requirements, and the comparison with what is in service on the same showings"
                : "the plant's requirements alone: nothing is in service to compare with";
    }
}
