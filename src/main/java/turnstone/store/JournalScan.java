package turnstone.store;

import java.util.List;

/**
 * A journal as it was found.
 *
 * @param entries those that are what was written, in order of their numbers
 * @param problems those that are missing or not what was written
 */
public record JournalScan(List<JournalEntry> entries, List<Problem> problems) {
    public JournalScan {
        entries = List.copyOf(entries);
        problems = List.copyOf(problems);
    }
}
