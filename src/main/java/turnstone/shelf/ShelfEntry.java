package turnstone.shelf;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.time.DateTimeException;
import java.time.Instant;
import java.util.Objects;
import java.util.Optional;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.store.JournalEntry;

/**
 * One change of what is in service.
 *
 * @param number from 1
 * @param at when, never before the entry before it
 * @param by who
 * @param action what it does
 * @param from fingerprint of the model in service before, or empty
 * @param to fingerprint of the model in service from then on
 * @param verdict what the change rests on, or empty where it was made by hand
 * @param reason why, in the words of who did it
 */
public record ShelfEntry(
        long number,
        Instant at,
        String by,
        Action action,
        Optional<String> from,
        String to,
        Optional<VerdictReference> verdict,
        String reason) {
    private static final String FORMAT = "turnstone-shelf-entry";
    private static final int VERSION = 1;

    public ShelfEntry {
        Objects.requireNonNull(at, "at");
        Objects.requireNonNull(action, "action");
        Objects.requireNonNull(verdict, "verdict");
        if (!Fingerprints.isWhole(to) || !from.map(Fingerprints::isWhole).orElse(true)) {
            throw new IllegalArgumentException("not fingerprints of models: " + from + ", " + to);
        }
        require("by", by, "who makes the change");
        require("reason", reason, "why the change is made");
    }

    /** As it goes into the journal, which adds the number. */
    ObjectNode json() {
        ObjectNode node = Json.object()
                .put("format", FORMAT)
                .put("version", VERSION)
                .put("at", at.toString())
                .put("by", by)
                .put("action", action.label())
                .put("from", from.orElse(null))
                .put("to", to);
        if (verdict.isPresent()) {
            node.putObject("verdict")
                    .put("path", verdict.get().path())
                    .put("fingerprint", verdict.get().fingerprint());
        } else {
            node.putNull("verdict");
        }
        return node.put("reason", reason);
    }

    static ShelfEntry read(JournalEntry entry, String place) {
        JsonNode node = entry.content();
        if (!FORMAT.equals(node.path("format").asText())) {
            throw Fault.storage("not an entry of a shelf")
                    .at(place)
                    .found(node.path("format"))
                    .expected(FORMAT);
        }
        if (node.path("version").asInt() > VERSION) {
            throw Fault.storage("written by a newer version of this program")
                    .at(place)
                    .found("version " + node.path("version"))
                    .expected("at most " + VERSION)
                    .remedy("use the newer program");
        }
        try {
            JsonNode verdict = node.path("verdict");
            return new ShelfEntry(
                    entry.number(),
                    Instant.parse(node.path("at").asText()),
                    node.path("by").asText(),
                    Action.of(node.path("action").asText()),
                    Optional.ofNullable(node.path("from").textValue()),
                    node.path("to").asText(),
                    verdict.isObject()
                            ? Optional.of(new VerdictReference(
                                    verdict.path("path").asText(),
                                    verdict.path("fingerprint").asText()))
                            : Optional.empty(),
                    node.path("reason").asText());
        } catch (IllegalArgumentException | DateTimeException | Fault e) {
            throw Fault.storage("not an entry of a shelf")
                    .at(place)
                    .found(e.getMessage())
                    .because(e);
        }
    }

    private static void require(String field, String text, String expected) {
        if (text == null || text.isBlank()) {
            throw Fault.usage("a change of what is in service needs \"" + field + "\"")
                    .expected(expected);
        }
    }
}
