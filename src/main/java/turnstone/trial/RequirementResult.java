package turnstone.trial;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.Locale;
import java.util.OptionalDouble;
import turnstone.json.Json;

/**
 * One requirement held against the trial.
 *
 * @param name the requirement, in words
 * @param found the value held against it; empty where it could not be judged
 * @param required the limit
 * @param demand on which side of the limit the value must lie
 * @param unit what both are counted in
 * @param bound {@code point}, or {@code lower end of the 90 % interval}
 * @param outcome met, not met, or not judged
 * @param why what keeps it from being judged and what would let it be, or what else a reader must know; may be empty
 */
public record RequirementResult(
        String name,
        OptionalDouble found,
        double required,
        Demand demand,
        Unit unit,
        String bound,
        Outcome outcome,
        String why) {
    /** How it came out. */
    public enum Outcome {
        /** Found is on the right side of what is required. */
        MET("met"),
        /** It is not. */
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

    /** On which side of the limit a value must lie. */
    public enum Demand {
        /** At it or above. */
        AT_LEAST("at least "),
        /** Above it. */
        ABOVE("above "),
        /** At it or below. */
        AT_MOST("at most ");

        private final String words;

        Demand(String words) {
            this.words = words;
        }

        boolean met(double found, double required) {
            return switch (this) {
                case AT_LEAST -> found >= required;
                case ABOVE -> found > required;
                case AT_MOST -> found <= required;
            };
        }
    }

    /** What a value is counted in. */
    public enum Unit {
        /** A share, written in per cent. */
        SHARE,
        /** A difference of shares, written in points. */
        DIFFERENCE,
        /** Parts per million. */
        PPM,
        /** Degrees of arc. */
        DEGREES,
        /** Days. */
        DAYS,
        /** A plain number. */
        NUMBER
    }

    static RequirementResult judged(
            String name, double found, double required, Demand demand, Unit unit, String bound, String why) {
        Outcome outcome = demand.met(found, required) ? Outcome.MET : Outcome.NOT_MET;
        return new RequirementResult(name, OptionalDouble.of(found), required, demand, unit, bound, outcome, why);
    }

    static RequirementResult notJudged(
            String name, double required, Demand demand, Unit unit, String bound, String why) {
        return new RequirementResult(
                name, OptionalDouble.empty(), required, demand, unit, bound, Outcome.NOT_JUDGED, why);
    }

    /** How far what was found lies on the right side of the limit; empty where it could not be judged. */
    public OptionalDouble margin() {
        if (found.isEmpty()) {
            return OptionalDouble.empty();
        }
        double above = found.getAsDouble() - required;
        return OptionalDouble.of(demand == Demand.AT_MOST ? 0 - above : above);
    }

    /** The margin on a scale on which units can be compared: shares as they are, others against their limit. */
    OptionalDouble closeness() {
        boolean share = unit == Unit.SHARE || unit == Unit.DIFFERENCE;
        return margin().isEmpty() || share || required == 0
                ? margin()
                : OptionalDouble.of(margin().getAsDouble() / Math.abs(required));
    }

    boolean met() {
        return outcome == Outcome.MET;
    }

    /** {@code at least 95.00 %}. */
    String limit() {
        return (demand == Demand.AT_LEAST ? "" : demand.words) + amount(required);
    }

    /** A value of this requirement for people. */
    String amount(double value) {
        return switch (unit) {
            case SHARE -> VerdictText.share(value);
            case DIFFERENCE -> VerdictText.points(value);
            case PPM -> String.format(Locale.ROOT, "%.0f ppm", value);
            case DEGREES -> String.format(Locale.ROOT, "%.1f degrees", value);
            case DAYS -> String.format(Locale.ROOT, "%.0f days", value);
            case NUMBER ->
                value == Math.rint(value) && Math.abs(value) < 1e9
                        ? String.format(Locale.ROOT, "%.0f", value)
                        : String.format(Locale.ROOT, "%.1e", value);
        };
    }

    /** The margin for people. */
    String marginAmount() {
        double value = margin().orElseThrow();
        return unit == Unit.SHARE ? VerdictText.points(value) : amount(value);
    }

    /** One sentence without a full stop. */
    String sentence() {
        if (outcome == Outcome.NOT_JUDGED) {
            return name + " could not be judged: " + why;
        }
        String numbers = name + " is " + amount(found.orElseThrow()) + ", required " + limit();
        return met() || why.isEmpty() ? numbers : numbers + "; " + why;
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
