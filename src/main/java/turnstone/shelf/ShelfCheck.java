package turnstone.shelf;

import com.fasterxml.jackson.databind.JsonNode;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.store.Content;
import turnstone.store.Journal;
import turnstone.store.JournalEntry;
import turnstone.store.JournalScan;
import turnstone.store.Problem;
import turnstone.store.Store;
import turnstone.store.Written;

/** Reads a shelf's files again, as far as what is damaged lets one see. */
final class ShelfCheck {
    private final Store store;
    private final Journal journal;
    private final Catalogue catalogue;
    private final ModelReader reader;
    private final List<Problem> problems = new ArrayList<>();

    ShelfCheck(Store store, Journal journal, Catalogue catalogue, ModelReader reader) {
        this.store = store;
        this.journal = journal;
        this.catalogue = catalogue;
        this.reader = reader;
    }

    List<Problem> problems() {
        JournalScan changes = journal.scan();
        JournalScan listed = catalogue.journal().scan();
        problems.addAll(changes.problems());
        problems.addAll(listed.problems());
        // A model that a change names and the catalogue doesn't (its entry is damaged) is still held against its name.
        SortedMap<String, Optional<Written>> models = new TreeMap<>();
        changes.entries()
                .forEach(entry -> parsed(entry).ifPresent(change -> {
                    change.models().forEach(model -> models.put(model, Optional.empty()));
                    forged(entry, change).ifPresent(problems::add);
                }));
        catalogue.models(listed.entries()).forEach((model, written) -> models.put(model, Optional.of(written)));
        models.forEach((model, written) -> flaw(model, written).ifPresent(problems::add));
        return List.copyOf(problems);
    }

    /** A model's file, checked against its name. */
    static JsonNode model(Store store, ModelReader reader, String fingerprint) {
        String place = store.place(Catalogue.file(fingerprint));
        byte[] content = content(store, fingerprint);
        JsonNode model = Json.read(content, place);
        String found = reader.fingerprint(model, place);
        if (!found.equals(fingerprint)) {
            throw Fault.storage("not what was written: altered")
                    .at(place)
                    .found("model " + found)
                    .expected("model " + fingerprint)
                    .remedy("restore the file from a copy, then run verify");
        }
        return model;
    }

    static byte[] content(Store store, String fingerprint) {
        String name = Catalogue.file(fingerprint);
        return store.read(name)
                .orElseThrow(() -> Fault.storage("a model that is on the shelf is missing")
                        .at(store.place(name))
                        .remedy("restore the file from a copy, then run verify"));
    }

    private Optional<ShelfEntry> parsed(JournalEntry entry) {
        String name = journal.name(entry.number());
        try {
            return Optional.of(ShelfEntry.read(entry, name));
        } catch (Fault fault) {
            problems.add(new Problem(name, Problem.Trouble.ALTERED, "an entry of this shelf", fault.getMessage()));
            return Optional.empty();
        }
    }

    private Optional<Problem> forged(JournalEntry entry, ShelfEntry change) {
        return change.signature()
                .filter(signature -> !signature.holdsFor(change.to()))
                .map(signature -> new Problem(
                        journal.name(entry.number()),
                        Problem.Trouble.ALTERED,
                        "a signature of model " + change.to() + " by " + signature.key(),
                        "one that does not hold"));
    }

    private Optional<Problem> flaw(String fingerprint, Optional<Written> written) {
        Optional<Problem> damaged = written.flatMap(file -> Content.check(store, file));
        if (damaged.isPresent()) {
            return damaged;
        }
        String name = Catalogue.file(fingerprint);
        if (store.size(name).isEmpty()) {
            return Optional.of(new Problem(name, Problem.Trouble.MISSING, "model " + fingerprint, "nothing"));
        }
        try {
            model(store, reader, fingerprint);
            return Optional.empty();
        } catch (Fault fault) {
            return Optional.of(new Problem(name, Problem.Trouble.ALTERED, "model " + fingerprint, fault.getMessage()));
        }
    }
}
