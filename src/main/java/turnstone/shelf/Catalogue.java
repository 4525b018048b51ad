package turnstone.shelf;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.store.Journal;
import turnstone.store.JournalEntry;
import turnstone.store.Outcome;
import turnstone.store.Store;
import turnstone.store.Written;

/**
 * The list of models that were put on the shelf: a journal of its own, {@code catalogue/00000001.json} …, with {@code format}
 * {@code turnstone-shelf-model}, {@code version} 1, {@code model} (the fingerprint), {@code bytes} and {@code sha256} of the model's file.
 * It lets a model be found by its first digits without listing a folder, and says nothing of what is in service.
 */
final class Catalogue {
    private static final String FORMAT = "turnstone-shelf-model";
    private static final int VERSION = 1;
    /** So many others would have to put a model in a row. */
    private static final int MOST_TRIES = 100;

    private final Store store;
    private final Journal journal;

    Catalogue(Store store) {
        this.store = store;
        this.journal = Journal.in(store, "catalogue");
    }

    Journal journal() {
        return journal;
    }

    /** The file of a model. */
    static String file(String fingerprint) {
        return "models/" + fingerprint + ".json";
    }

    /** What was written, by the model's fingerprint. */
    SortedMap<String, Written> models() {
        return models(journal.entries());
    }

    SortedMap<String, Written> models(List<JournalEntry> entries) {
        SortedMap<String, Written> models = new TreeMap<>();
        for (JournalEntry entry : entries) {
            Map.Entry<String, Written> model = read(entry);
            models.put(model.getKey(), model.getValue());
        }
        return models;
    }

    void add(String fingerprint, byte[] content) {
        List<JournalEntry> seen = journal.entries();
        for (int tries = 0; tries < MOST_TRIES; tries++) {
            if (models(seen).containsKey(fingerprint)) {
                return;
            }
            ObjectNode entry = Json.object()
                    .put("format", FORMAT)
                    .put("version", VERSION)
                    .put("model", fingerprint)
                    .put("bytes", content.length)
                    .put("sha256", Json.sha256(content));
            Optional<JournalEntry> newest = seen.isEmpty() ? Optional.empty() : Optional.of(seen.get(seen.size() - 1));
            if (journal.append(newest, entry) == Outcome.PUBLISHED) {
                return;
            }
            seen = journal.entriesAfter(seen);
        }
        throw Fault.busy("others put " + MOST_TRIES + " models on the shelf while this one was waiting")
                .remedy("run again");
    }

    private Map.Entry<String, Written> read(JournalEntry entry) {
        JsonNode node = entry.content();
        String place = store.place(journal.name(entry.number()));
        String fingerprint = node.path("model").asText();
        if (!FORMAT.equals(node.path("format").asText()) || !Fingerprints.isWhole(fingerprint)) {
            throw Fault.storage("not an entry of a shelf's catalogue")
                    .at(place)
                    .found(node)
                    .expected(FORMAT);
        }
        if (node.path("version").asInt() > VERSION) {
            throw Fault.storage("written by a newer version of this program")
                    .at(place)
                    .found("version " + node.path("version"))
                    .expected("at most " + VERSION)
                    .remedy("use the newer program");
        }
        return Map.entry(
                fingerprint,
                new Written(
                        file(fingerprint),
                        node.path("bytes").longValue(),
                        node.path("sha256").asText()));
    }
}
