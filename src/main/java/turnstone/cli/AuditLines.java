package turnstone.cli;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.stream.Collectors;
import turnstone.audit.Audit;
import turnstone.audit.Found;
import turnstone.json.Json;

/** How an audit is printed. */
final class AuditLines {
    private AuditLines() {}

    static List<String> lines(Audit audit, List<String> targets) {
        Found found = audit.found();
        List<String> lines = new ArrayList<>();
        lines.add(String.format(
                "%4d  %s  %s, %s of %s, by %s",
                audit.number(),
                found.date(),
                found.method().label(),
                found.mass_kg().isEmpty() ? "valves" : found.stream().label(),
                found.duty(),
                audit.by()));
        if (!found.mass_kg().isEmpty()) {
            String masses = found.mass_kg().entrySet().stream()
                    .map(mass -> mass.getKey() + " " + kilograms(mass.getValue()))
                    .collect(Collectors.joining(", "));
            lines.add("      " + masses + ": " + percent(found.of_kg(targets) / found.total_kg()) + " target");
        }
        found.valves()
                .ifPresent(valves -> lines.add("      ejection efficiency " + percent(valves.ejectionEfficiency())
                        + " of "
                        + kilograms(valves.decided_kg()) + ", co-ejection " + percent(valves.coEjection()) + " of "
                        + kilograms(valves.left_kg())));
        found.insteadOf().ifPresent(number -> lines.add("      instead of entry " + number));
        if (!found.note().isEmpty()) {
            lines.add("      " + found.note());
        }
        return lines;
    }

    static ObjectNode json(Audit audit) {
        ObjectNode node = Json.object()
                .put("number", audit.number())
                .put("at", audit.at().toString())
                .put("by", audit.by());
        node.setAll(audit.found().json());
        return node;
    }

    private static String kilograms(double mass_kg) {
        return Figures.shortest(mass_kg) + " kg";
    }

    private static String percent(double share) {
        return String.format(Locale.ROOT, "%.2f %%", 100 * share);
    }
}
