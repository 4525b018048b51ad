package turnstone.spark;

import turnstone.measure.Head;
import turnstone.measure.QuarantineReason;

/** What the key columns of a record say; one object for all records of a partition with the same keys. Not for sharing. */
final class Slot {
    /** What becomes of the records before their channels are looked at. */
    enum Fate {
        /** They go on to the head. */
        TAKEN,
        /** They are quarantined for {@link Slot#reason}. */
        REFUSED,
        /** They are of another day, and the files hold many. */
        PASSED_OVER,
        /** Their showing is left out on purpose. */
        LEFT_OUT
    }

    final RecordKeys keys;
    final Fate fate;
    final QuarantineReason reason;
    final String refusedText;
    final String instrument;
    final int trayGroup;
    final Head head;
    /** For the job that uses the slot. */
    Object attachment;

    private Slot(
            RecordKeys keys,
            Fate fate,
            QuarantineReason reason,
            String refusedText,
            String instrument,
            int trayGroup,
            Head head) {
        this.keys = keys;
        this.fate = fate;
        this.reason = reason;
        this.refusedText = refusedText;
        this.instrument = instrument;
        this.trayGroup = trayGroup;
        this.head = head;
    }

    static Slot taken(RecordKeys keys, String instrument, int trayGroup, Head head) {
        return new Slot(keys, Fate.TAKEN, null, "", instrument, trayGroup, head);
    }

    static Slot leftOut(RecordKeys keys, String instrument, int trayGroup) {
        return new Slot(keys, Fate.LEFT_OUT, null, "", instrument, trayGroup, null);
    }

    static Slot refused(RecordKeys keys, QuarantineReason reason, String text) {
        return new Slot(keys, Fate.REFUSED, reason, text, "", -1, null);
    }

    /** Known in all but the day. */
    static Slot ofOtherDay(RecordKeys keys, Fate fate, String instrument, int trayGroup) {
        return new Slot(keys, fate, QuarantineReason.WRONG_DAY, keys.day(), instrument, trayGroup, null);
    }

    /** Whether sorter, material, tray and showing are known, so that the showing's identity can be held against others. */
    boolean isIdentified() {
        return trayGroup >= 0;
    }
}
