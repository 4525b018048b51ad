package turnstone.trial;

import java.time.LocalDate;
import java.util.Objects;

/**
 * What the trial must know of a showing: one tray on one sorter, once.
 *
 * @param showing the id, unique in the fleet
 * @param day when it was shown
 * @param sorter the machine
 * @param instrument the machine's optics, as the ledger names them
 * @param tray the physical set of pieces
 * @param trayGroup the group that is held out together with it
 * @param material what lies on the tray
 */
public record TrialShowing(
        String showing, LocalDate day, String sorter, String instrument, String tray, int trayGroup, String material) {
    /** Checks that nothing is missing. */
    public TrialShowing {
        Objects.requireNonNull(showing);
        Objects.requireNonNull(day);
        Objects.requireNonNull(sorter);
        Objects.requireNonNull(instrument);
        Objects.requireNonNull(tray);
        Objects.requireNonNull(material);
    }
}
