package turnstone.ledger;

import java.time.LocalDate;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.store.Store;

/** The small invented days of {@link Days}, for tests of what is built on a ledger. */
public final class LedgerFixture {
    private LedgerFixture() {}

    /** A ledger of three channels in this store. */
    public static Ledger ledger(Store store) {
        return Days.ledger(store);
    }

    /** A ledger in this store, kept with other terms but as many channels. */
    public static Ledger ledger(Store store, CountScale scale, HeadSpec head) {
        return Ledger.open(store, scale, head);
    }

    /** A day of two instruments, two materials and two tray groups, whose records come from the seed. */
    public static DayDraft draft(LocalDate day, String prefix, long seed) {
        return Days.draft(day, prefix, seed);
    }
}
