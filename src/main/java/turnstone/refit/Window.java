package turnstone.refit;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;
import turnstone.decide.MadeFrom;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.ledger.DayEntry;
import turnstone.ledger.Ledger;

/** Chooses the days of the ledger that enter a fit. */
public final class Window {
    private Window() {}

    /** The newest posted days up to and with this one, at most so many, in order of days. */
    public static List<DayEntry> upTo(Ledger ledger, LocalDate last, int days) {
        List<DayEntry> chosen = ledger.days().stream()
                .filter(entry -> !entry.day().isAfter(last))
                .toList();
        return chosen.subList(Math.max(0, chosen.size() - days), chosen.size());
    }

    /** The newest posted days before this one, at most so many, in order of days. */
    public static List<DayEntry> before(Ledger ledger, LocalDate day, int days) {
        return upTo(ledger, day.minusDays(1), days);
    }

    /** The posted days from the first to the last, both included. */
    public static List<DayEntry> between(Ledger ledger, LocalDate first, LocalDate last) {
        return ledger.days().stream()
                .filter(entry -> !entry.day().isBefore(first) && !entry.day().isAfter(last))
                .toList();
    }

    /**
     * The days that a model was made from, in the revisions that it was made from.
     *
     * @throws Fault of kind input where the ledger does not hold one of them
     */
    public static List<DayEntry> of(Ledger ledger, Model model) {
        List<DayEntry> days = new ArrayList<>();
        for (MadeFrom.Day day : model.madeFrom().days()) {
            LocalDate date = LocalDate.parse(day.day());
            DayEntry entry = ledger.revisions(date).stream()
                    .filter(revision -> revision.fingerprint().equals(day.fingerprint()))
                    .findFirst()
                    .orElseThrow(
                            () -> Fault.input("the ledger does not hold a day that the model was made from")
                                    .at(ledger.describe())
                                    .found("no revision of " + day.day() + " with fingerprint " + day.fingerprint())
                                    .remedy(
                                            "open the ledger that the model was made from, or release a model made from this one"));
            days.add(entry);
        }
        return days;
    }
}
