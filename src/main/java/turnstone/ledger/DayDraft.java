package turnstone.ledger;

import java.time.LocalDate;
import java.util.List;
import java.util.Objects;
import java.util.TreeSet;

/**
 * A day as it was folded, before it is posted.
 *
 * @param day the day
 * @param inputs the files it was read from
 * @param counts what became of its records
 * @param moments its sums
 * @param without ids of showings left out on purpose (mislabelled, for instance); kept sorted
 */
public record DayDraft(
        LocalDate day, List<InputFile> inputs, DayCounts counts, DayMoments moments, List<String> without) {
    /**
     * Checks that the parts belong together.
     *
     * @throws IllegalArgumentException where counts and sums don't agree, or a showing is both in and left out
     */
    public DayDraft {
        Objects.requireNonNull(day, "day");
        Objects.requireNonNull(counts, "counts");
        inputs = List.copyOf(inputs);
        without = List.copyOf(new TreeSet<>(without));
        if (moments.records() != counts.accepted()) {
            throw new IllegalArgumentException(
                    "moments of " + moments.records() + " records, but " + counts.accepted() + " accepted");
        }
        long noSignal = 0;
        long quarantined = 0;
        for (ShowingSums showing : moments.showings().values()) {
            noSignal = Math.addExact(noSignal, showing.noSignal());
            quarantined = Math.addExact(quarantined, showing.quarantined());
        }
        // A record in quarantine may lack the very key that names its showing.
        if (noSignal != counts.noSignal() || quarantined > counts.quarantinedTotal()) {
            throw new IllegalArgumentException("showings with " + noSignal + " records of no signal and " + quarantined
                    + " in quarantine, but " + counts.noSignal() + " and " + counts.quarantinedTotal() + " counted");
        }
        for (String showing : without) {
            if (moments.showings().containsKey(showing)) {
                throw new IllegalArgumentException("showing " + showing + " is left out and there all the same");
            }
        }
    }
}
