package turnstone.ledger;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import turnstone.fault.Fault;
import turnstone.store.Content;
import turnstone.store.Journal;
import turnstone.store.JournalEntry;
import turnstone.store.Outcome;
import turnstone.store.RunNames;
import turnstone.store.Store;
import turnstone.store.Written;

/** One attempt to post a day, against everybody else who posts at the same time. */
final class Posting {
    /** So many others would have to win in a row, each about another day. */
    private static final int MOST_TRIES = 100;

    private final Store store;
    private final Journal journal;
    private final DayDraft draft;
    private final Terms terms;
    private final String fingerprint;

    Posting(Store store, Journal journal, DayDraft draft, Terms terms) {
        this.store = store;
        this.journal = journal;
        this.draft = draft;
        this.terms = terms;
        this.fingerprint = DayFingerprints.day(
                draft.day(),
                draft.moments(),
                draft.counts(),
                terms.scale().fingerprint(),
                terms.head().fingerprint());
    }

    PostOutcome post(Replace replace) {
        List<JournalEntry> seen = journal.entries();
        List<DayEntry> days = Ledger.newest(parsed(seen));
        Optional<DayEntry> before =
                days.stream().filter(entry -> entry.day().equals(draft.day())).findFirst();
        if (before.isPresent() && before.get().fingerprint().equals(fingerprint)) {
            return PostOutcome.SAME_RECORDS;
        }
        if (before.isPresent() && replace == Replace.NO) {
            throw Fault.input("this day is posted with other records")
                    .at("day " + draft.day())
                    .found(summary(draft.counts(), fingerprint))
                    .expected(summary(before.get().counts(), before.get().fingerprint()))
                    .remedy("give --replace to post these as revision "
                            + (before.get().revision() + 1));
        }
        refuseKnownShowings(days);
        int revision = before.map(DayEntry::revision).orElse(0) + 1;
        List<Written> written = new ArrayList<>();
        try {
            writeParts(written);
            commit(seen, revision, written);
        } catch (Refused refused) {
            discard(written, refused.fault);
            throw refused.fault;
        }
        return PostOutcome.POSTED;
    }

    /** Writes the parts under a name that no other run uses and reads them back; nothing names them yet. */
    private void writeParts(List<Written> written) throws Refused {
        String folder = "days/" + draft.day() + "/" + RunNames.fresh();
        try {
            written.add(store.write(folder + "/moments", out -> MomentsPart.write(draft.moments(), out)));
            written.add(store.write(folder + "/showings", out -> ShowingsPart.write(draft.moments(), out)));
            written.forEach(part -> Content.readBack(store, part));
        } catch (Fault fault) {
            throw new Refused(fault);
        }
    }

    private void commit(List<JournalEntry> seenAtFirst, int revision, List<Written> parts) throws Refused {
        List<JournalEntry> seen = seenAtFirst;
        for (int tries = 0; tries < MOST_TRIES; tries++) {
            DayEntry entry = entry(seen.size() + 1L, revision, parts);
            // A storage fault here is not caught: the entry may be there, so the parts that it names have to stay.
            if (journal.append(last(seen), DayEntryJson.write(entry)) == Outcome.PUBLISHED) {
                return;
            }
            List<JournalEntry> now = journal.entriesAfter(seen);
            try {
                for (DayEntry other : parsed(now.subList(seen.size(), now.size()))) {
                    if (other.day().equals(draft.day())) {
                        throw Fault.busy("somebody else posted this day at the same time")
                                .at("day " + draft.day())
                                .found("revision " + other.revision() + ", entry " + other.number())
                                .remedy(
                                        "nothing of this run was posted; run again to see whether the records are the same");
                    }
                }
                refuseKnownShowings(Ledger.newest(parsed(now)));
            } catch (Fault fault) {
                throw new Refused(fault);
            }
            seen = now;
        }
        throw new Refused(Fault.busy("others posted " + MOST_TRIES + " days while this one was waiting")
                .at("day " + draft.day())
                .remedy("run again"));
    }

    private DayEntry entry(long number, int revision, List<Written> parts) {
        return new DayEntry(
                number,
                draft.day(),
                revision,
                draft.inputs(),
                draft.counts(),
                terms.scale().fingerprint(),
                terms.head().fingerprint(),
                DayFingerprints.moments(draft.moments()),
                fingerprint,
                parts.get(0),
                parts.get(1),
                List.copyOf(draft.moments().showings().keySet()),
                draft.without());
    }

    private void refuseKnownShowings(List<DayEntry> days) {
        Map<String, DayEntry> known = new HashMap<>();
        for (DayEntry other : days) {
            if (!other.day().equals(draft.day())) {
                other.showings().forEach(showing -> known.put(showing, other));
            }
        }
        for (String showing : draft.moments().showings().keySet()) {
            DayEntry other = known.get(showing);
            if (other != null) {
                throw Fault.input("showing " + showing + " is posted on another day")
                        .at("day " + draft.day())
                        .found("showing " + showing + " on " + draft.day() + " and on " + other.day())
                        .expected("an id that is unique in the fleet")
                        .remedy("correct the showing's id or day in the records");
            }
        }
    }

    private List<DayEntry> parsed(List<JournalEntry> entries) {
        return entries.stream()
                .map(entry -> Ledger.parse(store, journal, entry))
                .toList();
    }

    private static Optional<JournalEntry> last(List<JournalEntry> entries) {
        return entries.isEmpty() ? Optional.empty() : Optional.of(entries.get(entries.size() - 1));
    }

    private static String summary(DayCounts counts, String fingerprint) {
        return counts.accepted() + " accepted records, fingerprint " + fingerprint.substring(0, 12);
    }

    private void discard(List<Written> parts, Fault reason) {
        for (Written part : parts) {
            try {
                store.discard(part.name());
            } catch (Fault debris) {
                reason.addSuppressed(debris);
            }
        }
    }

    /** A failure after which it is certain that no entry names the parts. */
    private static final class Refused extends Exception {
        private static final long serialVersionUID = 1L;

        private final transient Fault fault;

        Refused(Fault fault) {
            super(fault);
            this.fault = fault;
        }
    }
}
