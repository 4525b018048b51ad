package turnstone.decide;

import com.fasterxml.jackson.databind.JsonNode;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.TreeSet;
import turnstone.json.Json;

/** What a model was made from, as a page of text, at most 80 columns wide but for long names. */
public final class LineagePage {
    private static final int WIDTH = 80;

    private final Model model;
    private final MadeFrom from;
    private final List<String> lines = new ArrayList<>();

    private LineagePage(Model model) {
        this.model = model;
        this.from = model.madeFrom();
    }

    /**
     * The lines of the page.
     *
     * @param ledgerNotes by day, how the ledger has it now; empty where no ledger was looked at
     */
    public static List<String> of(Model model, Map<String, String> ledgerNotes) {
        LineagePage page = new LineagePage(model);
        page.lines.add("Lineage of model " + model.fingerprint().substring(0, 12) + " (" + model.scope() + ")");
        page.days(ledgerNotes);
        page.fingerprints();
        page.recipe();
        page.cells();
        return List.copyOf(page.lines);
    }

    private void days(Map<String, String> notes) {
        lines.add("");
        lines.add("Made from " + grouped(from.records()) + " records"
                + (from.showings() > 0 ? " in " + grouped(from.showings()) + " showings" : "")
                + (from.days().isEmpty()
                        ? ""
                        : " of " + from.days().size() + (from.days().size() == 1 ? " ledger day" : " ledger days")));
        from.inputs().forEach(input -> lines.add("  " + input));
        if (from.days().isEmpty()) {
            return;
        }
        lines.add("  day         revision  fingerprint" + (notes.isEmpty() ? "" : "       in the ledger"));
        for (MadeFrom.Day day : from.days()) {
            lines.add(String.format(
                            Locale.ROOT,
                            "  %-10s  %8d  %-16s  %s",
                            day.day(),
                            day.revision(),
                            shortened(day.fingerprint()),
                            notes.getOrDefault(day.day(), ""))
                    .stripTrailing());
        }
    }

    private void fingerprints() {
        lines.add("");
        lines.add("Fingerprints");
        put("model", model.fingerprint());
        put("count scale", model.countScale().fingerprint());
        put("head", Json.fingerprint(model.pretreatment().path("head")));
        put("tail", Json.fingerprint(model.pretreatment().path("tail")));
        model.recipe().ifPresent(recipe -> put("recipe", Json.fingerprint(recipe)));
        from.momentsFingerprint().ifPresent(sums -> put("sums", sums));
        model.orientedTo().ifPresent(other -> put("oriented to", other));
        put("file", Model.FORMAT + " " + model.json().path("version").asText());
    }

    private void put(String name, String value) {
        lines.add(String.format(Locale.ROOT, "  %-12s  %s", name, value));
    }

    private void recipe() {
        JsonNode without = model.recipe().map(recipe -> recipe.path("without")).orElse(Json.object());
        if (!without.isObject() || without.isEmpty()) {
            return;
        }
        lines.add("");
        lines.add("Left out");
        List<String> parts = new ArrayList<>();
        without.path("trayGroups").forEach(group -> parts.add("tray group " + (group.intValue() + 1)));
        without.path("instruments").forEach(instrument -> parts.add(instrument.asText()));
        parts.forEach(part -> lines.add("  " + part));
    }

    /** Records, and showings in brackets, by instrument and material: as many materials side by side as fit. */
    private void cells() {
        Map<String, Map<String, String>> cells = new HashMap<>();
        TreeSet<String> instruments = new TreeSet<>();
        for (MadeFrom.Part part : from.parts()) {
            instruments.add(part.instrument());
            cells.computeIfAbsent(part.material(), material -> new HashMap<>())
                    .put(
                            part.instrument(),
                            grouped(part.records()) + (part.showings() > 0 ? " (" + part.showings() + ")" : ""));
        }
        List<String> materials = model.materials().stream()
                .map(ModelMaterial::name)
                .filter(cells::containsKey)
                .toList();
        int first = instruments.stream().mapToInt(String::length).max().orElse(0);
        lines.add("");
        lines.add(from.showings() > 0 ? "Records (showings)" : "Records");
        int begin = 0;
        while (begin < materials.size()) {
            int end = begin + 1;
            while (end < materials.size() && width(first, materials.subList(begin, end + 1), cells) <= WIDTH) {
                end++;
            }
            block(first, materials.subList(begin, end), instruments, cells);
            begin = end;
            if (begin < materials.size()) {
                lines.add("");
            }
        }
    }

    private static int width(int first, List<String> materials, Map<String, Map<String, String>> cells) {
        return 2
                + first
                + materials.stream()
                        .mapToInt(material -> 2 + column(material, cells))
                        .sum();
    }

    private static int column(String material, Map<String, Map<String, String>> cells) {
        return Math.max(
                material.length(),
                cells.get(material).values().stream()
                        .mapToInt(String::length)
                        .max()
                        .orElse(0));
    }

    private void block(
            int first, List<String> materials, Set<String> instruments, Map<String, Map<String, String>> cells) {
        StringBuilder heading = new StringBuilder(" ".repeat(2 + first));
        materials.forEach(material -> heading.append(right(material, 2 + column(material, cells))));
        lines.add(heading.toString());
        for (String instrument : instruments) {
            StringBuilder row = new StringBuilder("  " + instrument + " ".repeat(first - instrument.length()));
            for (String material : materials) {
                String cell =
                        Optional.ofNullable(cells.get(material).get(instrument)).orElse("-");
                row.append(right(cell, 2 + column(material, cells)));
            }
            lines.add(row.toString());
        }
    }

    private static String right(String text, int width) {
        return " ".repeat(Math.max(0, width - text.length())) + text;
    }

    private static String shortened(String fingerprint) {
        return fingerprint.substring(0, Math.min(16, fingerprint.length()));
    }

    private static String grouped(long value) {
        return String.format(Locale.ROOT, "%,d", value).replace(',', ' ');
    }
}
