package turnstone.ledger;

import java.time.LocalDate;
import java.util.List;
import java.util.Objects;
import turnstone.store.Written;

/**
 * One posted revision of a day, as the journal holds it.
 *
 * @param number number of the journal entry
 * @param day the day
 * @param revision 1 for the first, one more for each replacement
 * @param inputs the files it was read from
 * @param counts what became of its records
 * @param scaleFingerprint of the count scale
 * @param headFingerprint of the pretreatment head
 * @param momentsFingerprint over keys and moments
 * @param fingerprint over the whole canonical content: moments, showings and counts
 * @param momentsPart the file of moments by key
 * @param showingsPart the file of showings
 * @param showings ids of the showings in it, sorted
 * @param without ids of the showings left out on purpose, sorted
 */
public record DayEntry(
        long number,
        LocalDate day,
        int revision,
        List<InputFile> inputs,
        DayCounts counts,
        String scaleFingerprint,
        String headFingerprint,
        String momentsFingerprint,
        String fingerprint,
        Written momentsPart,
        Written showingsPart,
        List<String> showings,
        List<String> without) {
    public DayEntry {
        Objects.requireNonNull(day, "day");
        Objects.requireNonNull(counts, "counts");
        Objects.requireNonNull(momentsPart, "momentsPart");
        Objects.requireNonNull(showingsPart, "showingsPart");
        inputs = List.copyOf(inputs);
        showings = List.copyOf(showings);
        without = List.copyOf(without);
        if (revision < 1) {
            throw new IllegalArgumentException("revision must be 1 or more: " + revision);
        }
    }

    /** The files that this entry commits. */
    public List<Written> parts() {
        return List.of(momentsPart, showingsPart);
    }
}
