package turnstone.spark;

import turnstone.ledger.LedgerKey;

/** Keys of the shuffle, as text: its hash is the same on every JVM. */
final class FoldKeys {
    /** The counts of a partition. */
    static final String SUMMARY = "q";

    private static final char MOMENTS = 'm';
    private static final char SHOWING = 's';
    private static final char SEPARATOR = '\u0000';

    private FoldKeys() {}

    static String ofMoments(Slot slot) {
        String material = slot.keys.material() == null ? "" : slot.keys.material();
        return MOMENTS + slot.instrument + SEPARATOR + slot.trayGroup + SEPARATOR + material;
    }

    static String ofShowing(Slot slot) {
        return SHOWING + slot.keys.showing();
    }

    static boolean isMoments(String key) {
        return key.charAt(0) == MOMENTS;
    }

    static boolean isShowing(String key) {
        return key.charAt(0) == SHOWING;
    }

    static String showing(String key) {
        return key.substring(1);
    }

    static LedgerKey ledgerKey(String key) {
        String[] parts = key.substring(1).split(String.valueOf(SEPARATOR), 3);
        return new LedgerKey(parts[0], parts[2], Integer.parseInt(parts[1]));
    }
}
