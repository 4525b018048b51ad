package turnstone.shelf;

import com.fasterxml.jackson.databind.JsonNode;
import java.time.Clock;
import java.time.Instant;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.function.Function;
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
    private final SigningRule rule;

    private Shelf(Store store, Clock clock, ModelReader reader, SigningRule rule) {
        this.store = store;
        this.clock = clock;
        this.reader = reader;
        this.rule = rule;
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
        return new Shelf(store, clock, reader, SigningRule.NONE);
    }

    /** The same shelf, where changes have to follow a rule about signatures. */
    public Shelf withRule(SigningRule signing) {
        return new Shelf(store, clock, reader, signing);
    }

    /** The rule about signatures. */
    public SigningRule rule() {
        return rule;
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

    /** The change that put the fleet's model in service, or empty where nothing ever was; single sorters may run another. */
    public Optional<ShelfEntry> inService() {
        return inService(history());
    }

    /** The change that put the model in service that this sorter runs, or empty where nothing ever was. */
    public Optional<ShelfEntry> inService(String sorter) {
        return since(history(), service -> service.on(sorter));
    }

    /** Which model runs where, or empty where nothing was ever in service. */
    public Optional<Service> running() {
        return running(history());
    }

    /** Which model ran where then, or empty where nothing did. */
    public Optional<Service> runningAsOf(Instant instant) {
        return running(until(instant));
    }

    /** The change that put into service what the fleet ran then, or empty where nothing was. */
    public Optional<ShelfEntry> asOf(Instant instant) {
        return inService(until(instant));
    }

    /** The withdrawn models by fingerprint, each with the change that withdrew it. */
    public Map<String, ShelfEntry> withdrawn() {
        return ServiceSteps.of(history()).withdrawn();
    }

    /** The signatures that a model was released with, in order. */
    public List<ModelSignature> signatures(String fingerprint) {
        return Signatures.of(history(), fingerprint);
    }

    /**
     * Puts a model in service.
     *
     * @throws Fault of kind input where there is no such model, it is in service already, was withdrawn, or is not signed where it must be;
     *     of kind busy where somebody else made a change at the same time
     */
    public ShelfEntry release(Release wish) {
        List<JournalEntry> seen = journal.entries();
        if (wish.lastEntry().isPresent()) {
            long last = wish.lastEntry().getAsLong();
            if (seen.size() < last) {
                throw new IllegalArgumentException("entry " + last + " of " + seen.size());
            }
            if (seen.size() > last) {
                throw lost(last + 1);
            }
        }
        String to = known(wish.model());
        read(to);
        return append(seen, changes(seen).release(wish, to));
    }

    /**
     * Puts a model in service on the whole fleet, unsigned.
     *
     * @param fingerprintPrefix first digits of a model on the shelf
     * @param verdict what the change rests on, or empty where it is made by hand
     * @throws Fault as {@link #release(Release)}
     */
    public ShelfEntry release(String fingerprintPrefix, Optional<VerdictReference> verdict, String reason, String by) {
        return release(Release.of(fingerprintPrefix, reason, by).withVerdict(verdict));
    }

    /**
     * Puts a model in service on the whole fleet, unsigned, if nothing has changed since the decision was prepared.
     *
     * @param lastEntry number of the newest entry that the decision rests on, 0 where there was none
     * @throws Fault as {@link #release(Release)}, and of kind busy where there is a newer entry
     */
    public ShelfEntry releaseAfter(
            long lastEntry, String fingerprintPrefix, Optional<VerdictReference> verdict, String reason, String by) {
        return release(
                Release.of(fingerprintPrefix, reason, by).withVerdict(verdict).withLastEntry(lastEntry));
    }

    /**
     * Puts back what was in service before the current step. A release goes one step on, a revert one step back: after releases of A, B, C
     * two reverts lead to A, and a third is refused. Withdrawn models are passed over.
     *
     * @throws Fault of kind input where there is nothing to go back to; of kind busy where somebody else made a change at the same time
     */
    public ShelfEntry revert(String reason, String by) {
        List<JournalEntry> seen = journal.entries();
        return append(seen, readable(changes(seen).revert(reason, by)));
    }

    /**
     * Withdraws a model: it can't be released again without saying so, and a revert passes over it. Wherever it is in service, the same
     * entry puts back what ran there before.
     *
     * @throws Fault of kind input where there is no such model, it is withdrawn already, or it is in service with nothing to put back; of
     *     kind busy where somebody else made a change at the same time
     */
    public ShelfEntry withdraw(String fingerprintPrefix, String reason, String by) {
        List<JournalEntry> seen = journal.entries();
        return append(seen, readable(changes(seen).withdraw(known(fingerprintPrefix), reason, by)));
    }

    /** Reads everything again and names each file that is missing or not what was written. */
    public List<Problem> verify() {
        return new ShelfCheck(store, journal, catalogue, reader).problems();
    }

    private ShelfChanges changes(List<JournalEntry> seen) {
        return new ShelfChanges(describe(), parsed(seen), rule, clock);
    }

    private String known(String fingerprintPrefix) {
        return fingerprint(fingerprintPrefix)
                .orElseThrow(() -> Fault.input("no such model on the shelf")
                        .at(describe())
                        .found(fingerprintPrefix)
                        .remedy("put the model on the shelf first"));
    }

    /** Makes sure that what is to be put back is what was written. */
    private ShelfEntry readable(ShelfEntry entry) {
        entry.after().models().forEach(this::read);
        return entry;
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

    private JsonNode read(String fingerprint) {
        return ShelfCheck.model(store, reader, fingerprint);
    }

    private List<ShelfEntry> parsed(List<JournalEntry> entries) {
        return entries.stream()
                .map(entry -> ShelfEntry.read(entry, store.place(journal.name(entry.number()))))
                .toList();
    }

    private List<ShelfEntry> until(Instant instant) {
        return history().stream().filter(entry -> !entry.at().isAfter(instant)).toList();
    }

    private static Optional<Service> running(List<ShelfEntry> entries) {
        return entries.isEmpty()
                ? Optional.empty()
                : Optional.of(entries.get(entries.size() - 1).after());
    }

    private static Optional<ShelfEntry> inService(List<ShelfEntry> entries) {
        return since(entries, Service::fleet);
    }

    /** Of the newest entries that leave the same model there, the oldest: the change that put it there. */
    private static Optional<ShelfEntry> since(List<ShelfEntry> entries, Function<Service, String> there) {
        ShelfEntry found = null;
        for (int i = entries.size() - 1; i >= 0; i--) {
            ShelfEntry entry = entries.get(i);
            if (found != null && !there.apply(entry.after()).equals(there.apply(found.after()))) {
                break;
            }
            found = entry;
        }
        return Optional.ofNullable(found);
    }
}
