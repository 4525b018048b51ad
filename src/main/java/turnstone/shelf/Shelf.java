package turnstone.shelf;

import com.fasterxml.jackson.databind.JsonNode;
import java.time.Clock;
import java.time.Instant;
import java.time.temporal.ChronoUnit;
import java.util.ArrayDeque;
import java.util.Deque;
import java.util.List;
import java.util.Optional;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.store.Journal;
import turnstone.store.JournalEntry;
import turnstone.store.Outcome;
import turnstone.store.Problem;
import turnstone.store.Store;

/**
 * Models, and the journal of what is in service.
 *
 * <p>In its store: {@code models/FINGERPRINT.json}, published once each; {@code catalogue/}, the list of them; {@code journal/00000001.json}
 * … Entry n+1 <em>is</em> the change of what is in service: there is no other pointer, so a crash leaves the old model or the new one in
 * service, and of two changes at once one is lost and says so.
 */
public final class Shelf {
    private static final String JOURNAL = "journal";

    private final Store store;
    private final Clock clock;
    private final ModelReader reader;
    private final Journal journal;
    private final Catalogue catalogue;

    private Shelf(Store store, Clock clock, ModelReader reader) {
        this.store = store;
        this.clock = clock;
        this.reader = reader;
        this.journal = Journal.in(store, JOURNAL);
        this.catalogue = new Catalogue(store);
    }

    /**
     * The shelf in a store, there or to come; nothing is written yet.
     *
     * @param clock what tells when a change is made
     * @param reader what knows the form of models
     */
    public static Shelf open(Store store, Clock clock, ModelReader reader) {
        return new Shelf(store, clock, reader);
    }

    /** Where it is, for messages. */
    public String describe() {
        return store.describe();
    }

    /**
     * Puts a model on the shelf; the same model twice is fine, and the first one stays.
     *
     * @param model the content of a model file
     * @return its fingerprint
     * @throws Fault where it is not a model or its content is not what its fingerprint says
     */
    public String put(JsonNode model) {
        String fingerprint = reader.fingerprint(model, "the model to be put on the shelf");
        if (!Fingerprints.isWhole(fingerprint)) {
            throw new IllegalArgumentException("not a fingerprint: " + fingerprint);
        }
        byte[] content = Json.pretty(model);
        if (store.publish(Catalogue.file(fingerprint), content) == Outcome.LOST) {
            content = ShelfCheck.content(store, fingerprint);
            read(fingerprint);
        }
        catalogue.add(fingerprint, content);
        return fingerprint;
    }

    /**
     * The model whose fingerprint starts so, or empty where the shelf has none.
     *
     * @param fingerprintPrefix its first 8 or more hexadecimal digits
     * @throws Fault of kind usage where several start so, or that is no start of a fingerprint; of kind storage where the file is not what
     *     was written
     */
    public Optional<JsonNode> model(String fingerprintPrefix) {
        return fingerprint(fingerprintPrefix).map(this::read);
    }

    /** The whole fingerprint of the model that {@link #model} finds. */
    public Optional<String> fingerprint(String fingerprintPrefix) {
        Fingerprints.checkPrefix(fingerprintPrefix);
        List<String> found = catalogue.models().keySet().stream()
                .filter(fingerprint -> fingerprint.startsWith(fingerprintPrefix))
                .toList();
        if (found.size() > 1) {
            throw Fault.usage("more than one model on the shelf starts so")
                    .at(fingerprintPrefix)
                    .found(String.join(", ", found))
                    .remedy("give more digits");
        }
        return found.stream().findFirst();
    }

    /** Every change so far, in order. */
    public List<ShelfEntry> history() {
        return parsed(journal.entries());
    }

    /** The change that put into service what is in service now, or empty where nothing ever was. */
    public Optional<ShelfEntry> inService() {
        return last(history());
    }

    /** The change that put into service what was in service then, or empty where nothing was. */
    public Optional<ShelfEntry> asOf(Instant instant) {
        return last(
                history().stream().filter(entry -> !entry.at().isAfter(instant)).toList());
    }

    /**
     * Puts a model in service.
     *
     * @param fingerprintPrefix first digits of a model on the shelf
     * @param verdict what the change rests on, or empty where it is made by hand
     * @throws Fault of kind input where there is no such model or it is in service already; of kind busy where somebody else made a change
     *     at the same time
     */
    public ShelfEntry release(String fingerprintPrefix, Optional<VerdictReference> verdict, String reason, String by) {
        return release(fingerprintPrefix, verdict, reason, by, journal.entries());
    }

    /**
     * Puts a model in service if nothing has changed since the decision was prepared.
     *
     * @param lastEntry number of the newest entry that the decision rests on, 0 where there was none
     * @throws Fault as {@link #release(String, Optional, String, String)}, and of kind busy where there is a newer entry
     */
    public ShelfEntry releaseAfter(
            long lastEntry, String fingerprintPrefix, Optional<VerdictReference> verdict, String reason, String by) {
        List<JournalEntry> seen = journal.entries();
        if (seen.size() < lastEntry) {
            throw new IllegalArgumentException("entry " + lastEntry + " of " + seen.size());
        }
        if (seen.size() > lastEntry) {
            throw lost(lastEntry + 1);
        }
        return release(fingerprintPrefix, verdict, reason, by, seen);
    }

    /**
     * Puts back the model that was in service before the current one. A release goes one step on, a revert one step back: after releases of
     * A, B, C two reverts lead to A, and a third is refused.
     *
     * @throws Fault of kind input where there is nothing to go back to; of kind busy where somebody else made a change at the same time
     */
    public ShelfEntry revert(String reason, String by) {
        List<JournalEntry> seen = journal.entries();
        List<ShelfEntry> history = parsed(seen);
        Deque<String> steps = steps(history);
        if (steps.size() < 2) {
            throw Fault.input("there is no earlier model to go back to")
                    .at(describe())
                    .found(steps.isEmpty() ? "nothing in service" : "only model " + steps.peek())
                    .remedy("release another model");
        }
        String from = steps.pop();
        String to = steps.peek();
        read(to);
        return append(
                seen,
                new ShelfEntry(
                        seen.size() + 1L,
                        now(history),
                        by,
                        Action.REVERT,
                        Optional.of(from),
                        to,
                        Optional.empty(),
                        reason));
    }

    /** Reads everything again and names each file that is missing or not what was written. */
    public List<Problem> verify() {
        return new ShelfCheck(store, journal, catalogue, reader).problems();
    }

    private ShelfEntry release(
            String fingerprintPrefix,
            Optional<VerdictReference> verdict,
            String reason,
            String by,
            List<JournalEntry> seen) {
        String to = fingerprint(fingerprintPrefix)
                .orElseThrow(() -> Fault.input("no such model on the shelf")
                        .at(describe())
                        .found(fingerprintPrefix)
                        .remedy("put the model on the shelf first"));
        read(to);
        List<ShelfEntry> history = parsed(seen);
        Optional<String> from = last(history).map(ShelfEntry::to);
        if (from.isPresent() && from.get().equals(to)) {
            throw Fault.input("this model is in service already").at(describe()).found(to);
        }
        return append(
                seen, new ShelfEntry(seen.size() + 1L, now(history), by, Action.RELEASE, from, to, verdict, reason));
    }

    private ShelfEntry append(List<JournalEntry> seen, ShelfEntry entry) {
        Optional<JournalEntry> newest = seen.isEmpty() ? Optional.empty() : Optional.of(seen.get(seen.size() - 1));
        if (journal.append(newest, entry.json()) == Outcome.LOST) {
            throw lost(entry.number());
        }
        return entry;
    }

    private Fault lost(long number) {
        ShelfEntry winner = history().get((int) number - 1);
        return Fault.busy("somebody else changed what is in service at the same time; this change was not made")
                .at(describe())
                .found("entry " + number + ": " + winner.action().label() + " of " + winner.to() + " by " + winner.by())
                .remedy("look at what is in service now, then decide again");
    }

    /** Models in service one after the other, reverts taken back: the newest on top. */
    private static Deque<String> steps(List<ShelfEntry> history) {
        Deque<String> steps = new ArrayDeque<>();
        for (ShelfEntry entry : history) {
            if (entry.action() == Action.REVERT) {
                steps.pop();
            } else {
                steps.push(entry.to());
            }
        }
        return steps;
    }

    /** Clocks of two machines may disagree: no entry is older than the one before it. */
    private Instant now(List<ShelfEntry> history) {
        Instant now = clock.instant().truncatedTo(ChronoUnit.MILLIS);
        return last(history)
                .map(ShelfEntry::at)
                .filter(before -> before.isAfter(now))
                .orElse(now);
    }

    private JsonNode read(String fingerprint) {
        return ShelfCheck.model(store, reader, fingerprint);
    }

    private List<ShelfEntry> parsed(List<JournalEntry> entries) {
        return entries.stream()
                .map(entry -> ShelfEntry.read(entry, store.place(journal.name(entry.number()))))
                .toList();
    }

    private static Optional<ShelfEntry> last(List<ShelfEntry> entries) {
        return entries.isEmpty() ? Optional.empty() : Optional.of(entries.get(entries.size() - 1));
    }
}
