package turnstone.spark;

import java.util.HashMap;
import java.util.Map;
import turnstone.measure.Head;
import turnstone.measure.HeadOutcome;
import turnstone.measure.HeadTrouble;
import turnstone.measure.Instrument;
import turnstone.measure.QuarantineReason;

/**
 * Takes records one by one: keys, head, counts. Shared by all jobs, so that posting, trial and projection accept alike. For one thread.
 */
final class Intake {
    private static final int MOST_SLOTS = 50_000;

    private final IntakeSpec spec;
    private final TableColumns columns;
    private final RecordCursor cursor;
    private final Map<RecordKeys, Slot> slots = new HashMap<>();
    private final Map<String, Head> heads = new HashMap<>();
    private final HeadTrouble trouble = new HeadTrouble();
    private final double[] output;
    private final double[] counts;
    private final int beltAt;
    private final int timeAt;
    private Slot slot;
    private QuarantineReason reason;
    private int channel;
    private String found;

    /** What became of a record. */
    enum Outcome {
        ACCEPTED,
        NO_SIGNAL,
        QUARANTINED,
        PASSED_OVER,
        LEFT_OUT
    }

    Intake(IntakeSpec spec, TableColumns columns, RecordCursor cursor) {
        this.spec = spec;
        this.columns = columns;
        this.cursor = cursor;
        this.output = new double[spec.head().outputs()];
        this.counts = new double[spec.head().outputs()];
        this.beltAt = columns.index(KeyColumn.BELT_COLUMN);
        this.timeAt = columns.index(KeyColumn.TIME);
    }

    /** Takes the cursor's current record. */
    Outcome take() {
        findSlot();
        reason = null;
        switch (slot.fate) {
            case PASSED_OVER -> {
                return Outcome.PASSED_OVER;
            }
            case LEFT_OUT -> {
                return Outcome.LEFT_OUT;
            }
            case REFUSED -> {
                return refuse(slot.reason, -1, slot.refusedText);
            }
            case TAKEN -> {}
        }
        if (cursor.defect() != null) {
            return refuse(cursor.defect(), cursor.defectChannel(), cursor.defectText());
        }
        Head head = slot.head;
        if (cursor.channelCount() != head.inputs()) {
            return refuse(
                    QuarantineReason.WRONG_CHANNEL_COUNT,
                    -1,
                    cursor.channelCount() + " channels instead of " + head.inputs());
        }
        return measure(head);
    }

    private Outcome measure(Head head) {
        int beltColumn = 0;
        long time_ms = 0;
        if (beltAt >= 0) {
            long belt = cursor.whole(beltAt);
            if (belt != (int) belt && spec.head().corrects()) {
                return refuse(QuarantineReason.MISSING_KEY, -1, KeyColumn.BELT_COLUMN.label());
            }
            beltColumn = (int) belt;
        }
        if (timeAt >= 0) {
            time_ms = cursor.whole(timeAt);
            if (time_ms == RecordCursor.NO_NUMBER && spec.head().corrects()) {
                return refuse(QuarantineReason.MISSING_KEY, -1, KeyColumn.TIME.label());
            }
        }
        HeadOutcome outcome = head.apply(cursor.channels(), 0, beltColumn, time_ms, output, 0, trouble);
        if (outcome == HeadOutcome.QUARANTINED) {
            return refuse(trouble.reason(), trouble.channel(), trouble.message());
        }
        if (outcome == HeadOutcome.NO_SIGNAL) {
            return Outcome.NO_SIGNAL;
        }
        int bad = spec.scale() == null ? -1 : spec.scale().toCounts(output, 0, counts, 0);
        if (bad >= 0) {
            spec.scale().explain(bad, output[bad], trouble);
            return refuse(trouble.reason(), trouble.channel(), trouble.message());
        }
        return Outcome.ACCEPTED;
    }

    private Outcome refuse(QuarantineReason why, int atChannel, String what) {
        reason = why;
        channel = atChannel;
        found = what;
        return Outcome.QUARANTINED;
    }

    private String key(KeyColumn column) {
        int at = columns.index(column);
        return at < 0 ? null : cursor.text(at);
    }

    private void findSlot() {
        String day = key(KeyColumn.DAY);
        String sorter = key(KeyColumn.SORTER);
        String showing = key(KeyColumn.SHOWING);
        String tray = key(KeyColumn.TRAY);
        String material = key(KeyColumn.MATERIAL);
        if (slot != null && slot.keys.isSame(day, sorter, showing, tray, material)) {
            return;
        }
        RecordKeys keys = new RecordKeys(day, sorter, showing, tray, material);
        slot = slots.get(keys);
        if (slot == null) {
            if (slots.size() >= MOST_SLOTS) {
                slots.clear();
            }
            slot = spec.isTable() ? tableSlot(keys) : plantSlot(keys);
            slots.put(keys, slot);
        }
    }

    private Slot tableSlot(RecordKeys keys) {
        if (columns.index(KeyColumn.MATERIAL) >= 0 && keys.material() == null) {
            return Slot.refused(keys, QuarantineReason.MISSING_KEY, "no label");
        }
        return Slot.taken(keys, IntakeSpec.TABLE, 0, head(IntakeSpec.TABLE));
    }

    private Slot plantSlot(RecordKeys keys) {
        String missing = missing(keys);
        if (missing != null) {
            return Slot.refused(keys, QuarantineReason.MISSING_KEY, missing);
        }
        Instrument instrument = spec.instrument(keys.sorter());
        if (instrument == null) {
            return Slot.refused(keys, QuarantineReason.UNKNOWN_SORTER, keys.sorter());
        }
        if (!spec.knowsMaterial(keys.material())) {
            return Slot.refused(keys, QuarantineReason.UNKNOWN_MATERIAL, keys.material());
        }
        int group = spec.trayGroup(keys.material(), keys.tray());
        if (!keys.day().equals(spec.day())) {
            Slot.Fate fate =
                    spec.otherDays() == IntakeSpec.OtherDays.PASS_OVER ? Slot.Fate.PASSED_OVER : Slot.Fate.REFUSED;
            return Slot.ofOtherDay(keys, fate, instrument.name(), group);
        }
        if (spec.leavesOut(keys.showing())) {
            return Slot.leftOut(keys, instrument.name(), group);
        }
        return Slot.taken(keys, instrument.name(), group, head(keys.sorter()));
    }

    private static String missing(RecordKeys keys) {
        if (keys.day() == null) {
            return KeyColumn.DAY.label();
        } else if (keys.sorter() == null) {
            return KeyColumn.SORTER.label();
        } else if (keys.showing() == null) {
            return KeyColumn.SHOWING.label();
        } else if (keys.tray() == null) {
            return KeyColumn.TRAY.label();
        }
        return keys.material() == null ? KeyColumn.MATERIAL.label() : null;
    }

    private Head head(String sorter) {
        return heads.computeIfAbsent(sorter, name -> Head.of(spec.head(), spec.instrument(name), spec.references()));
    }

    /** What the keys of the record say. */
    Slot slot() {
        return slot;
    }

    /** The counts of an accepted record; written over by the next. */
    double[] counts() {
        return counts;
    }

    /** The head's output for an accepted record, before it was counted; written over by the next. */
    double[] output() {
        return output;
    }

    /** The quarantined record, for the table of them. */
    QuarantinedRecord quarantined() {
        RecordKeys keys = slot.keys;
        return new QuarantinedRecord(
                cursor.file(),
                cursor.row(),
                reason.label(),
                channel + 1,
                found,
                text(keys.day()),
                text(keys.sorter()),
                text(keys.showing()),
                text(keys.tray()),
                text(keys.material()));
    }

    private static String text(String key) {
        return key == null ? "" : key;
    }

    /** Why the record was quarantined. */
    QuarantineReason reason() {
        return reason;
    }
}
