package turnstone.ledger;

import java.io.Serializable;
import java.math.BigInteger;
import java.util.List;

/**
 * What is known of one showing: whose it was, how many records of each outcome, and the exact sums of the accepted ones.
 *
 * @param showing its id, unique in the fleet
 * @param sorter the machine
 * @param instrument the machine's optics at that time
 * @param tray the tray shown
 * @param trayGroup number of the tray group, from 0
 * @param material what the tray holds
 * @param records accepted records
 * @param noSignal records too dark to tell
 * @param quarantined records of this showing that are in quarantine
 * @param sums per channel the sum of counts over the accepted records
 */
public record ShowingSums(
        String showing,
        String sorter,
        String instrument,
        String tray,
        int trayGroup,
        String material,
        long records,
        long noSignal,
        long quarantined,
        List<BigInteger> sums)
        implements Serializable {
    /** Sums are kept in 16 bytes of two's complement each. */
    private static final int MOST_BITS = 127;

    public ShowingSums {
        Texts.check("showing", showing);
        Texts.check("sorter", sorter);
        Texts.check("instrument", instrument);
        Texts.check("tray", tray);
        Texts.check("material", material);
        sums = List.copyOf(sums);
        if (trayGroup < 0 || records < 0 || noSignal < 0 || quarantined < 0) {
            throw new IllegalArgumentException("a number of showing " + showing + " is negative");
        }
        for (BigInteger sum : sums) {
            if (sum.bitLength() > MOST_BITS) {
                throw new IllegalArgumentException("a sum of showing " + showing + " passes 128 bits");
            }
            if (records == 0 && sum.signum() != 0) {
                throw new IllegalArgumentException("showing " + showing + " has sums and no records");
            }
        }
    }

    /** The key under which this showing's records are in the day's moments. */
    public LedgerKey key() {
        return new LedgerKey(instrument, material, trayGroup);
    }
}
