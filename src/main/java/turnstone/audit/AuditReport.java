package turnstone.audit;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Collection;
import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.stream.Collectors;

/** Predicted against found for one duty, as lines of text. */
public final class AuditReport {
    private static final int LISTED = 5;
    private static final int DIGITS = 12;

    private final List<Audit> audits;
    private final Collection<String> targets;
    private final List<String> lines = new ArrayList<>();

    private AuditReport(String duty, Collection<String> targets, List<Audit> standing) {
        this.audits = standing.stream()
                .filter(audit -> audit.found().duty().equals(duty))
                .sorted(Comparator.comparing((Audit audit) -> audit.found().date())
                        .thenComparing(Audit::number))
                .toList();
        this.targets = targets;
    }

    /**
     * The lines for a duty; each is one sentence or one row, not wrapped.
     *
     * @param duty the duty's name
     * @param targets its materials
     * @param predicted what the trial said of each side, by the side's name; empty where it gave no figures
     * @param standing the audits that count, of all duties
     */
    public static List<String> of(
            String duty, Collection<String> targets, Map<String, Predicted> predicted, List<Audit> standing) {
        AuditReport report = new AuditReport(duty, targets, standing);
        report.predicted(predicted);
        report.found();
        report.bale(predicted);
        return List.copyOf(report.lines);
    }

    /** The valves as all standing audits of a duty together found them, or empty where none checked them. */
    static Optional<Valves> valves(List<Audit> audits) {
        return audits.stream().flatMap(audit -> audit.found().valves().stream()).reduce(Valves::plus);
    }

    private void predicted(Map<String, Predicted> predicted) {
        if (predicted.isEmpty()) {
            lines.add("predicted: nothing, for the trial gave no figures");
        }
        predicted.forEach((side, figures) -> lines.add("predicted of " + side + ": decision purity "
                + share(figures.purity()) + ", decision recovery " + share(figures.recovery()) + " (on trays)"));
    }

    private void found() {
        List<Found> product = weighed(Found.Stream.PRODUCT);
        if (product.isEmpty()) {
            lines.add("found: no product of this duty was audited");
            return;
        }
        double total_kg = product.stream().mapToDouble(Found::total_kg).sum();
        double target_kg =
                product.stream().mapToDouble(found -> found.of_kg(targets)).sum();
        lines.add("found: purity " + share(target_kg / total_kg) + " over " + count(product.size()) + ", "
                + mass(total_kg) + ", " + span(product));
        recovery(product).ifPresent(lines::add);
        for (Found one : product.subList(Math.max(0, product.size() - LISTED), product.size())) {
            lines.add(String.format(
                    Locale.ROOT,
                    "  %s  %-9s  %9s  %s%s",
                    one.date(),
                    one.method().label(),
                    share(one.of_kg(targets) / one.total_kg()),
                    mass(one.total_kg()),
                    one.models().isEmpty() ? "" : "  model " + models(one)));
        }
    }

    /** Only dates on which both streams were weighed tell what share of the targets arrived. */
    private Optional<String> recovery(List<Found> product) {
        List<Found> rest = weighed(Found.Stream.REST);
        List<LocalDate> both = product.stream()
                .map(Found::date)
                .filter(date -> rest.stream().anyMatch(other -> other.date().equals(date)))
                .distinct()
                .toList();
        double arrived_kg = target_kg(product, both);
        double lost_kg = target_kg(rest, both);
        if (!(arrived_kg + lost_kg > 0)) {
            return Optional.empty();
        }
        return Optional.of("found: recovery " + share(arrived_kg / (arrived_kg + lost_kg)) + " on "
                + (both.size() == 1 ? "1 date" : both.size() + " dates")
                + " with both streams weighed, if each was weighed whole");
    }

    private double target_kg(List<Found> founds, List<LocalDate> dates) {
        return founds.stream()
                .filter(found -> dates.contains(found.date()))
                .mapToDouble(found -> found.of_kg(targets))
                .sum();
    }

    private void bale(Map<String, Predicted> predicted) {
        Optional<Valves> valves = valves(audits);
        if (valves.isEmpty()) {
            lines.add(
                    "A bale figure is not given: ejection efficiency and co-ejection have not been measured for this duty"
                            + " (audit add --valves).");
            return;
        }
        String measured = "ejection efficiency " + share(valves.get().ejectionEfficiency()) + " of "
                + mass(valves.get().decided_kg()) + ", co-ejection "
                + share(valves.get().coEjection()) + " of " + mass(valves.get().left_kg());
        if (predicted.isEmpty()) {
            lines.add("A bale figure is not given: the trial gave no figures. Measured: " + measured + ".");
            return;
        }
        predicted.forEach((side, figures) -> lines.add("bale purity to expect of " + side + ": "
                + share(figures.balePurity(valves.get())) + ", with " + measured
                + " as audited, and the duty's mix in the infeed; a point without an interval."));
    }

    private List<Found> weighed(Found.Stream stream) {
        return audits.stream()
                .map(Audit::found)
                .filter(found -> found.stream() == stream && !found.mass_kg().isEmpty())
                .collect(Collectors.toList());
    }

    private static String models(Found found) {
        return found.models().stream().map(model -> model.substring(0, DIGITS)).collect(Collectors.joining(", "));
    }

    private static String count(int audits) {
        return audits == 1 ? "1 audit" : audits + " audits";
    }

    private static String span(List<Found> founds) {
        LocalDate first = founds.get(0).date();
        LocalDate last = founds.get(founds.size() - 1).date();
        return first.equals(last) ? first.toString() : first + " to " + last;
    }

    private static String share(double share) {
        return String.format(Locale.ROOT, "%.2f %%", 100 * share);
    }

    private static String mass(double mass_kg) {
        return String.format(Locale.ROOT, "%,.1f kg", mass_kg).replace(',', ' ');
    }
}
