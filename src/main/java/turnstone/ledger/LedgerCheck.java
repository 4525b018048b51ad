package turnstone.ledger;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import turnstone.fault.Fault;
import turnstone.store.Content;
import turnstone.store.Journal;
import turnstone.store.JournalEntry;
import turnstone.store.JournalScan;
import turnstone.store.Problem;
import turnstone.store.Store;
import turnstone.store.Written;

/** Reads a ledger's files again, as far as what is damaged lets one see. */
final class LedgerCheck {
    private final Store store;
    private final Journal journal;
    private final List<Problem> problems = new ArrayList<>();

    private LedgerCheck(Store store) {
        this.store = store;
        this.journal = Journal.in(store, Ledger.JOURNAL);
    }

    static List<Problem> of(Store store) {
        LedgerCheck check = new LedgerCheck(store);
        check.run();
        return List.copyOf(check.problems);
    }

    private void run() {
        JournalScan scan = journal.scan();
        List<DayEntry> days = new ArrayList<>();
        for (JournalEntry entry : scan.entries()) {
            parsed(entry).ifPresent(days::add);
        }
        boolean posted = !scan.entries().isEmpty() || !scan.problems().isEmpty();
        checkDescription(posted, days);
        problems.addAll(scan.problems());
        for (DayEntry day : days) {
            for (Written part : day.parts()) {
                Content.check(store, part).ifPresent(problems::add);
            }
        }
    }

    private Optional<DayEntry> parsed(JournalEntry entry) {
        try {
            return Optional.of(Ledger.parse(store, journal, entry));
        } catch (Fault fault) {
            alteredFile(journal.name(entry.number()), "an entry of this ledger", fault.getMessage());
            return Optional.empty();
        }
    }

    private void checkDescription(boolean posted, List<DayEntry> days) {
        Optional<byte[]> content = store.read(Terms.FILE);
        if (content.isEmpty()) {
            if (posted) {
                problems.add(new Problem(
                        Terms.FILE, Problem.Trouble.MISSING, "the description of a ledger with days in it", "nothing"));
            }
            return;
        }
        try {
            Terms terms = Terms.read(content.get(), store.place(Terms.FILE));
            String found = terms.scale().fingerprint() + " and " + terms.head().fingerprint();
            for (DayEntry day : days) {
                String expected = day.scaleFingerprint() + " and " + day.headFingerprint();
                if (!expected.equals(found)) {
                    alteredFile(Terms.FILE, "count scale and head " + expected, found);
                    return;
                }
            }
        } catch (Fault fault) {
            alteredFile(Terms.FILE, "the description that was written", fault.getMessage());
        }
    }

    private void alteredFile(String name, String expected, String found) {
        problems.add(new Problem(name, Problem.Trouble.ALTERED, expected, found));
    }
}
