package turnstone.night;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.audit.Audit;
import turnstone.audit.AuditReport;
import turnstone.audit.Predicted;
import turnstone.plant.Duty;
import turnstone.plant.Plant;
import turnstone.plant.Requirement;
import turnstone.shelf.Service;
import turnstone.trial.DutyVerdict;
import turnstone.trial.FigureLine;
import turnstone.trial.Side;
import turnstone.trial.TrialForm;
import turnstone.trial.Verdict;

/**
 * What is said below a verdict's text and is no part of the verdict: that single sorters run another model than the one that the candidate
 * was compared with, and what audits found against what was predicted.
 */
public final class VerdictRemarks {
    private static final int WIDTH = 80;

    private VerdictRemarks() {}

    /** The lines, at most 80 columns wide but for long names; looks at the plant's shelf and audits. */
    public static List<String> of(Plant plant, Verdict verdict) {
        return of(plant, Places.shelf(plant).running(), Places.audits(plant).standing(), verdict);
    }

    /** As the page of a verdict, with these lines below its text. */
    public static String page(Plant plant, Verdict verdict) {
        return verdict.text() + String.join("\n", of(plant, verdict)) + "\n";
    }

    static List<String> of(Plant plant, Optional<Service> running, List<Audit> audits, Verdict verdict) {
        List<String> lines = new ArrayList<>();
        running.filter(service -> !service.isWhole()).ifPresent(service -> split(lines, service));
        lines.add("");
        lines.add("Bales and hand sorts");
        if (audits.isEmpty()) {
            wrap(
                    lines,
                    "  ",
                    "No bale figure is given: no bale and no hand sort has been entered, and neither ejection efficiency nor"
                            + " co-ejection has been measured (audit add).");
            return lines;
        }
        for (Duty duty : plant.duties()) {
            lines.add("  " + duty.name());
            AuditReport.of(duty.name(), duty.targets(), predicted(duty, verdict), audits)
                    .forEach(line -> wrap(lines, "    ", line));
        }
        return lines;
    }

    private static void split(List<String> lines, Service service) {
        SortedMap<String, List<String>> sorters = new TreeMap<>();
        service.sorters()
                .forEach((sorter, model) ->
                        sorters.computeIfAbsent(model, key -> new ArrayList<>()).add(sorter));
        lines.add("");
        lines.add("Sorters with a model of their own");
        sorters.forEach(
                (model, named) -> wrap(lines, "  ", String.join(", ", named) + ": model " + Words.shortened(model)));
        wrap(
                lines,
                "  ",
                "The candidate was compared with the fleet's model " + Words.shortened(service.fleet())
                        + " on every sorter, also on these. The night releases nothing while sorters differ: end it with a"
                        + " release to the whole fleet, or with revert.");
    }

    private static Map<String, Predicted> predicted(Duty duty, Verdict verdict) {
        Map<String, Predicted> predicted = new LinkedHashMap<>();
        for (Side side : List.of(Side.IN_SERVICE, Side.CANDIDATE)) {
            OptionalDouble purity = figure(duty, verdict, side, Requirement.Figure.DECISION_PURITY);
            OptionalDouble recovery = figure(duty, verdict, side, Requirement.Figure.DECISION_RECOVERY);
            if (purity.isPresent() && recovery.isPresent()) {
                predicted.put(
                        side.label(),
                        new Predicted(
                                purity.getAsDouble(),
                                recovery.getAsDouble(),
                                duty.targets().stream()
                                        .mapToDouble(target -> duty.infeedMix().getOrDefault(target, 0.0))
                                        .sum(),
                                duty.productStream() == Duty.Stream.EJECTED
                                        ? Predicted.Product.EJECTED
                                        : Predicted.Product.PASSED));
            }
        }
        return predicted;
    }

    private static OptionalDouble figure(Duty duty, Verdict verdict, Side side, Requirement.Figure figure) {
        for (DutyVerdict judged : verdict.duties()) {
            for (FigureLine line : judged.figures()) {
                if (judged.name().equals(duty.name())
                        && line.form() == TrialForm.THIS_FLEET
                        && line.reach() == Requirement.Reach.THIS_FLEET_TONIGHT
                        && line.side() == side
                        && line.figure() == figure
                        && line.estimate().point().isPresent()) {
                    return line.estimate().point();
                }
            }
        }
        return OptionalDouble.empty();
    }

    private static void wrap(List<String> lines, String indent, String text) {
        StringBuilder line = new StringBuilder(indent);
        if (text.length() + indent.length() <= WIDTH) {
            // Rows of a table keep their blanks.
            lines.add(indent + text);
            return;
        }
        for (String word : text.split(" ", -1)) {
            if (line.length() > indent.length() && line.length() + 1 + word.length() > WIDTH) {
                lines.add(line.toString());
                line = new StringBuilder(indent);
            }
            line.append(line.length() > indent.length() ? " " : "").append(word);
        }
        lines.add(line.toString());
    }
}
