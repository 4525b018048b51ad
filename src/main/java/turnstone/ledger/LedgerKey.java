package turnstone.ledger;

import java.io.Serializable;
import java.util.Comparator;

/**
 * What moments are kept by, within a day.
 *
 * @param instrument name of the instrument: a sorter with the optics it has since a date
 * @param material name of the material
 * @param trayGroup number of the tray group, from 0
 */
public record LedgerKey(String instrument, String material, int trayGroup)
        implements Serializable, Comparable<LedgerKey> {
    private static final Comparator<LedgerKey> ORDER = Comparator.comparing(LedgerKey::instrument)
            .thenComparing(LedgerKey::material)
            .thenComparingInt(LedgerKey::trayGroup);

    public LedgerKey {
        Texts.check("instrument", instrument);
        Texts.check("material", material);
        if (trayGroup < 0) {
            throw new IllegalArgumentException("tray group is negative: " + trayGroup);
        }
    }

    @Override
    public int compareTo(LedgerKey other) {
        return ORDER.compare(this, other);
    }
}
