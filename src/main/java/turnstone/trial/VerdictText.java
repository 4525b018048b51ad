package turnstone.trial;

import java.time.LocalDate;
import java.util.List;
import java.util.Locale;
import java.util.stream.Collectors;

/** The verdict as a page of text, 80 columns wide. */
final class VerdictText {
    private static final int WIDTH = 80;
    private static final int SHORT = 12;

    private VerdictText() {}

    static String of(Verdict verdict) {
        StringBuilder page = new StringBuilder();
        page.append(verdict.decision().label().toUpperCase(Locale.ROOT)).append("\n\n");
        wrap(page, "", verdict.mainReason() + ".");
        page.append('\n');
        page.append("candidate   ").append(brief(verdict.candidate())).append('\n');
        page.append("in service  ")
                .append(verdict.inService().map(VerdictText::brief).orElse("nothing"))
                .append('\n');
        wrap(
                page,
                "",
                "Judged on " + showings(verdict.showings()) + " of " + days(verdict.days())
                        + ". Every record was judged by the recipe re-made without the record's own tray group.");
        wrap(page, "", "The verdict rests on " + verdict.restsOn() + ".");
        for (DutyVerdict duty : verdict.duties()) {
            page.append('\n');
            append(page, duty, verdict.mainReason());
        }
        page.append('\n');
        cautions(page);
        return page.toString();
    }

    private static void append(StringBuilder page, DutyVerdict duty, String said) {
        page.append(duty.name()).append(": ").append(duty.decision().label()).append('\n');
        // The main reason of the whole verdict opens the page already.
        if (!said.equals(duty.name() + ": " + duty.mainReason())) {
            wrap(page, "  ", duty.mainReason() + ".");
        }
        duty.notes().forEach(note -> wrap(page, "  ", note + "."));
        for (RequirementResult requirement : duty.requirements()) {
            append(page, requirement);
        }
        String heading = "";
        for (FigureLine line : duty.figures()) {
            String wanted = line.form().label() + ", " + line.side().label();
            if (!wanted.equals(heading)) {
                page.append("  ").append(wanted).append('\n');
                heading = wanted;
            }
            wrap(page, "    ", line.reach().label() + ": " + line.figureName() + " " + estimate(line.estimate()));
        }
        for (CostLine line : duty.costs()) {
            wrap(
                    page,
                    "  ",
                    String.format(
                            Locale.ROOT,
                            "astray, %s: %.2f per tonne of infeed",
                            line.side().label(),
                            line.perTonne()));
        }
        for (PpmBound bound : duty.bounds()) {
            wrap(page, "  ", bound.text());
        }
    }

    private static void append(StringBuilder page, RequirementResult requirement) {
        page.append("  - ").append(requirement.name()).append(": ");
        page.append(requirement.outcome().label()).append('\n');
        String numbers = requirement.found().isPresent()
                ? "found " + requirement.amount(requirement.found().getAsDouble()) + ", required "
                        + requirement.limit() + ", margin " + requirement.marginAmount() + " (" + requirement.bound()
                        + ")" + (requirement.why().isEmpty() ? "" : "; " + requirement.why())
                : "required " + requirement.limit() + " (" + requirement.bound() + "); " + requirement.why();
        wrap(page, "    ", numbers);
    }

    private static String estimate(Estimate estimate) {
        if (estimate.point().isEmpty()) {
            return "not given: " + estimate.note();
        }
        String text = share(estimate.point().getAsDouble());
        if (estimate.lower().isPresent()) {
            text += String.format(
                    Locale.ROOT,
                    ", %s to %s (%.0f %% interval)",
                    share(estimate.lower().getAsDouble()),
                    share(estimate.upper().getAsDouble()),
                    100 * estimate.confidence());
        }
        return estimate.note().isEmpty() ? text : text + "; " + estimate.note();
    }

    private static void cautions(StringBuilder page) {
        wrap(
                page,
                "",
                "These are figures of decisions on trays, not on the belt and not of bales. Verify a release with a"
                        + " sampled bale or a hand sort before relying on it.");
        wrap(
                page,
                "",
                "Materials that may be hazardous (flame-retarded plastics, PVC in thermal processes, batteries in"
                        + " the infeed) are subject to local rules: these figures replace no prescribed test, and a qualified"
                        + " person decides.");
        wrap(
                page,
                "",
                "Changing coefficients on a running sorter moves air valves: follow the machine maker's lock-out"
                        + " procedure.");
    }

    /** {@code 97.25 %}. */
    static String share(double share) {
        return String.format(Locale.ROOT, "%.2f %%", 100 * share);
    }

    /** {@code +1.20 points}. */
    static String points(double difference) {
        return difference == 0 ? "0.00 points" : String.format(Locale.ROOT, "%+.2f points", 100 * difference);
    }

    private static String brief(String fingerprint) {
        return fingerprint.length() > SHORT ? fingerprint.substring(0, SHORT) : fingerprint;
    }

    private static String showings(int count) {
        return count == 1 ? "1 showing" : count + " showings";
    }

    private static String days(List<LocalDate> days) {
        return days.isEmpty()
                ? "no day"
                : days.stream().map(LocalDate::toString).collect(Collectors.joining(", "));
    }

    private static void wrap(StringBuilder page, String indent, String text) {
        StringBuilder line = new StringBuilder(indent);
        for (String word : text.split(" ", -1)) {
            if (line.length() > indent.length() && line.length() + 1 + word.length() > WIDTH) {
                page.append(line).append('\n');
                line = new StringBuilder(indent);
            }
            line.append(line.length() > indent.length() ? " " : "").append(word);
        }
        page.append(line).append('\n');
    }
}
