package turnstone.trial;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.OptionalDouble;
import turnstone.json.Json;

/**
 * One requirement held against the trial.
 *
 * @param name the requirement, in words
 * @param found the value held against it; empty where it could not be judged
 * @param required the least value that meets it
 * @param bound {@code point}, or {@code lower end of the 90 % interval}
 * @param outcome met, not met, or not judged
 * @param why what keeps it from being judged and what would let it be; empty otherwise
 */
public record RequirementResult(
        String name, OptionalDouble found, double required, String bound, Outcome outcome, String why) {
    /** How it came out. */
    public enum Outcome {
        /** Found is at least what is required. */
        MET("met"),
        /** It is less. */
        NOT_MET("not met"),
        /** There is nothing that could be held against it; counts as not met. */
        NOT_JUDGED("not judged");

        private final String label;

        Outcome(String label) {
            this.label = label;
        }

        /** For people. */
        public String label() {
            return label;
        }
    }

    static RequirementResult judged(String name, double found, double required, String bound) {
        Outcome outcome = found >= required ? Outcome.MET : Outcome.NOT_MET;
        return new RequirementResult(name, OptionalDouble.of(found), required, bound, outcome, "");
    }

    static RequirementResult notJudged(String name, double required, String bound, String why) {
        return new RequirementResult(name, OptionalDouble.empty(), required, bound, Outcome.NOT_JUDGED, why);
    }

    /** Found minus required; empty where it could not be judged. */
    public OptionalDouble margin() {
        return found.isPresent() ? OptionalDouble.of(found.getAsDouble() - required) : OptionalDouble.empty();
    }

    boolean met() {
        return outcome == Outcome.MET;
    }

    /** A value of this requirement for people: a share, or points where it is a difference. */
    String amount(double value) {
        return name.equals(ComparisonRule.NAME) ? VerdictText.points(value) : VerdictText.share(value);
    }

    ObjectNode json() {
        ObjectNode node = Json.object().put("name", name);
        VerdictJson.put(node, "found", found);
        node.put("required", required).put("bound", bound);
        VerdictJson.put(node, "margin", margin());
        node.put("met", met());
        if (!why.isEmpty()) {
            node.put("why", why);
        }
        return node;
    }
}
