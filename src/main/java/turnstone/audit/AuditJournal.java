package turnstone.audit;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.time.Clock;
import java.time.DateTimeException;
import java.time.Instant;
import java.time.temporal.ChronoUnit;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.stream.Collectors;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.store.Journal;
import turnstone.store.JournalEntry;
import turnstone.store.Outcome;
import turnstone.store.Problem;
import turnstone.store.Store;

/**
 * The numbered journal of audits: {@code journal/00000001.json} …, with {@code format} {@code turnstone-audit}, {@code version} 1, {@code at},
 * {@code by} and the fields of {@link Found}. A correction is an entry that names the one it stands instead of; nothing is taken away.
 */
public final class AuditJournal {
    private static final String FORMAT = "turnstone-audit";
    private static final int VERSION = 1;

    private final Store store;
    private final Journal journal;
    private final Clock clock;

    private AuditJournal(Store store, Clock clock) {
        this.store = store;
        this.journal = Journal.in(store, "journal");
        this.clock = clock;
    }

    /** The journal in a store, there or to come; nothing is written yet. */
    public static AuditJournal in(Store store, Clock clock) {
        return new AuditJournal(store, clock);
    }

    /** Where it is, for messages. */
    public String describe() {
        return store.describe();
    }

    /** Every entry, corrected ones too, in order. */
    public List<Audit> all() {
        return parsed(journal.entries());
    }

    /** The entries that count: those that no later one stands instead of. */
    public List<Audit> standing() {
        return standing(all());
    }

    private static List<Audit> standing(List<Audit> all) {
        Set<Long> corrected = all.stream()
                .flatMapToLong(audit -> audit.found().insteadOf().stream())
                .boxed()
                .collect(Collectors.toSet());
        return all.stream().filter(audit -> !corrected.contains(audit.number())).toList();
    }

    /**
     * Enters a result.
     *
     * @throws Fault of kind input where the same result stands already, or there is no entry to correct; of kind busy where somebody else
     *     entered one at the same time
     */
    public Audit add(Found found, String by) {
        List<JournalEntry> seen = journal.entries();
        List<Audit> standing = standing(parsed(seen));
        if (found.insteadOf().isPresent()
                && standing.stream()
                        .noneMatch(audit -> audit.number() == found.insteadOf().getAsLong())) {
            throw Fault.input("there is no such entry to correct, or it is corrected already")
                    .at(describe())
                    .found(found.insteadOf().getAsLong());
        }
        standing.stream()
                .filter(audit -> audit.found().equals(found))
                .findFirst()
                .ifPresent(same -> {
                    throw Fault.input("this result is entered already, and would count twice")
                            .at(describe())
                            .found("entry " + same.number() + " by " + same.by())
                            .remedy("if it is another run, tell it apart with --note");
                });
        Instant at = clock.instant().truncatedTo(ChronoUnit.MILLIS);
        ObjectNode entry = Json.object()
                .put("format", FORMAT)
                .put("version", VERSION)
                .put("at", at.toString())
                .put("by", by);
        entry.setAll(found.json());
        Optional<JournalEntry> newest = seen.isEmpty() ? Optional.empty() : Optional.of(seen.get(seen.size() - 1));
        if (journal.append(newest, entry) == Outcome.LOST) {
            throw Fault.busy("somebody else entered an audit at the same time; this one was not entered")
                    .at(describe())
                    .remedy("run it again");
        }
        return new Audit(seen.size() + 1L, at, by, found);
    }

    /** Reads everything again and names each file that is missing or not what was written. */
    public List<Problem> verify() {
        return journal.scan().problems();
    }

    private List<Audit> parsed(List<JournalEntry> entries) {
        return entries.stream().map(this::parsed).toList();
    }

    private Audit parsed(JournalEntry entry) {
        JsonNode node = entry.content();
        String place = store.place(journal.name(entry.number()));
        if (!FORMAT.equals(node.path("format").asText())) {
            throw Fault.storage("not an audit")
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
            return new Audit(
                    entry.number(),
                    Instant.parse(node.path("at").asText()),
                    node.path("by").asText(),
                    Found.fromJson(node));
        } catch (IllegalArgumentException | DateTimeException | Fault e) {
            throw Fault.storage("not an audit").at(place).found(e.getMessage()).because(e);
        }
    }
}
