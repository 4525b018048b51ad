package turnstone.shelf;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.time.DateTimeException;
import java.time.Instant;
import java.util.Collections;
import java.util.Objects;
import java.util.Optional;
import java.util.Set;
import java.util.SortedSet;
import java.util.TreeSet;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.store.JournalEntry;

/**
 * One change of what is in service.
 *
 * <p>Version 1 of its file has no {@code sorters}, {@code after}, {@code withdrawn} and {@code signature}: every change was of the whole
 * fleet. A change that needs none of them is still written so.
 *
 * @param number from 1
 * @param at when, never before the entry before it
 * @param by who
 * @param action what it does
 * @param from fingerprint of the model in service before on those sorters (the fleet's where they ran several), or empty
 * @param to fingerprint of the model in service on them from then on
 * @param verdict what the change rests on, or empty where it was made by hand
 * @param reason why, in the words of who did it
 * @param sorters the sorters that the change is about; none for the whole fleet
 * @param after which model runs where from then on
 * @param withdrawn fingerprint of the model that a withdrawal is about
 * @param signature of the model {@code to}, where the change brought one
 */
public record ShelfEntry(
        long number,
        Instant at,
        String by,
        Action action,
        Optional<String> from,
        String to,
        Optional<VerdictReference> verdict,
        String reason,
        SortedSet<String> sorters,
        Service after,
        Optional<String> withdrawn,
        Optional<ModelSignature> signature) {
    private static final String FORMAT = "turnstone-shelf-entry";
    private static final int VERSION = 2;
    private static final int WHOLE_FLEET_VERSION = 1;

    public ShelfEntry {
        Objects.requireNonNull(at, "at");
        Objects.requireNonNull(action, "action");
        Objects.requireNonNull(verdict, "verdict");
        Objects.requireNonNull(after, "after");
        Objects.requireNonNull(signature, "signature");
        sorters = Collections.unmodifiableSortedSet(new TreeSet<>(sorters));
        if (!Fingerprints.isWhole(to)
                || !from.map(Fingerprints::isWhole).orElse(true)
                || !withdrawn.map(Fingerprints::isWhole).orElse(true)) {
            throw new IllegalArgumentException("not fingerprints of models: " + from + ", " + to + ", " + withdrawn);
        }
        if (withdrawn.isPresent() != (action == Action.WITHDRAW)) {
            throw new IllegalArgumentException(action.label() + " of withdrawn " + withdrawn);
        }
        require("by", by, "who makes the change");
        require("reason", reason, "why the change is made");
    }

    /** A change of the whole fleet that brings no signature. */
    public ShelfEntry(
            long number,
            Instant at,
            String by,
            Action action,
            Optional<String> from,
            String to,
            Optional<VerdictReference> verdict,
            String reason) {
        this(
                number,
                at,
                by,
                action,
                from,
                to,
                verdict,
                reason,
                Collections.emptySortedSet(),
                Service.whole(to),
                Optional.empty(),
                Optional.empty());
    }

    /** The models that the entry names. */
    Set<String> models() {
        Set<String> models = new TreeSet<>(after.models());
        models.add(to);
        from.ifPresent(models::add);
        withdrawn.ifPresent(models::add);
        return models;
    }

    private boolean isPlain() {
        return sorters.isEmpty() && after.equals(Service.whole(to)) && withdrawn.isEmpty() && signature.isEmpty();
    }

    /** As it goes into the journal, which adds the number. */
    ObjectNode json() {
        ObjectNode node = Json.object()
                .put("format", FORMAT)
                .put("version", isPlain() ? WHOLE_FLEET_VERSION : VERSION)
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
        if (!isPlain()) {
            sorters.forEach(node.putArray("sorters")::add);
            node.set("after", after.json());
            withdrawn.ifPresent(model -> node.put("withdrawn", model));
            signature.ifPresent(by -> node.set("signature", by.json()));
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
            return read(entry.number(), node);
        } catch (IllegalArgumentException | DateTimeException | Fault e) {
            throw Fault.storage("not an entry of a shelf")
                    .at(place)
                    .found(e.getMessage())
                    .because(e);
        }
    }

    private static ShelfEntry read(long number, JsonNode node) {
        JsonNode verdict = node.path("verdict");
        String to = node.path("to").asText();
        SortedSet<String> sorters = new TreeSet<>();
        node.path("sorters").forEach(sorter -> sorters.add(sorter.asText()));
        JsonNode signature = node.path("signature");
        return new ShelfEntry(
                number,
                Instant.parse(node.path("at").asText()),
                node.path("by").asText(),
                Action.of(node.path("action").asText()),
                Optional.ofNullable(node.path("from").textValue()),
                to,
                verdict.isObject()
                        ? Optional.of(new VerdictReference(
                                verdict.path("path").asText(),
                                verdict.path("fingerprint").asText()))
                        : Optional.empty(),
                node.path("reason").asText(),
                sorters,
                node.path("after").isObject() ? Service.fromJson(node.path("after")) : Service.whole(to),
                Optional.ofNullable(node.path("withdrawn").textValue()),
                signature.isObject() ? Optional.of(ModelSignature.fromJson(signature)) : Optional.empty());
    }

    private static void require(String field, String text, String expected) {
        if (text == null || text.isBlank()) {
            throw Fault.usage("a change of what is in service needs \"" + field + "\"")
                    .expected(expected);
        }
    }
}
