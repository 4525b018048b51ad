package turnstone.cli;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;
import turnstone.decide.LineagePage;
import turnstone.decide.MadeFrom;
import turnstone.decide.Model;
import turnstone.json.Json;
import turnstone.ledger.DayEntry;
import turnstone.ledger.Ledger;
import turnstone.night.Places;
import turnstone.plant.Plant;
import turnstone.shelf.ShelfEntry;

/** {@code show --lineage}: the page, the ledger's word on each day, and what the shelf's journal says of the model. */
final class Lineage {
    private Lineage() {}

    static void print(Console console, CommonOptions common, Model model, Optional<Plant> plant) {
        Map<String, String> notes =
                plant.map(file -> notes(Places.ledger(file), model)).orElse(Map.of());
        List<ShelfEntry> entries = plant.map(file -> entries(file, model)).orElse(List.of());
        if (common.json) {
            console.json(json(model, notes, entries));
            return;
        }
        LineagePage.of(model, notes).forEach(console::say);
        if (plant.isPresent()) {
            console.say("");
            console.say(entries.isEmpty() ? "Never in service" : "In the shelf's journal");
            entries.forEach(entry -> ShelfLines.lines(entry).forEach(console::say));
        }
    }

    private static Map<String, String> notes(Ledger ledger, Model model) {
        Map<String, String> notes = new TreeMap<>();
        for (MadeFrom.Day day : model.madeFrom().days()) {
            List<DayEntry> revisions = ledger.revisions(LocalDate.parse(day.day()));
            boolean held =
                    revisions.stream().anyMatch(entry -> entry.fingerprint().equals(day.fingerprint()));
            int newest = revisions.stream().mapToInt(DayEntry::revision).max().orElse(0);
            String note = "the same";
            if (!held) {
                note = revisions.isEmpty() ? "not posted" : "other sums";
            } else if (newest > day.revision()) {
                note = "revision " + newest + " since";
            }
            notes.put(day.day(), note);
        }
        return notes;
    }

    private static List<ShelfEntry> entries(Plant plant, Model model) {
        String fingerprint = model.fingerprint();
        List<ShelfEntry> found = new ArrayList<>();
        for (ShelfEntry entry : Places.shelf(plant).history()) {
            if (entry.to().equals(fingerprint)
                    || entry.from().equals(Optional.of(fingerprint))
                    || entry.withdrawn().equals(Optional.of(fingerprint))) {
                found.add(entry);
            }
        }
        return found;
    }

    private static ObjectNode json(Model model, Map<String, String> notes, List<ShelfEntry> entries) {
        ObjectNode node = Json.object().put("model", model.fingerprint());
        node.set("madeFrom", model.json().path("madeFrom"));
        ObjectNode ledger = node.putObject("ledger");
        notes.forEach(ledger::put);
        ArrayNode journal = node.putArray("journal");
        entries.forEach(entry -> journal.add(ShelfLines.json(entry)));
        return node;
    }
}
