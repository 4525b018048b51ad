package turnstone.spark;

import java.util.ArrayDeque;
import java.util.HashMap;
import java.util.Iterator;
import java.util.Map;
import java.util.NoSuchElementException;
import java.util.function.Supplier;
import scala.Tuple2;

/**
 * Folds the records of one partition; what it hands on is pulled, one key at a time.
 *
 * <p>When the buffers would pass the bound, everything held is handed on and the task begins anew. Counts go with the sums: the last
 * thing handed on is the partition's {@link RecordCounts}.
 */
final class FoldTask implements Iterator<Tuple2<String, byte[]>> {
    private final RecordCursor cursor;
    private final Intake intake;
    private final FoldShape shape;
    private final FoldSettings settings;
    private final boolean isTable;
    private final RecordCounts counts;
    private final Map<String, KeyFold> folds = new HashMap<>();
    private final Map<RecordKeys, SlotFold> showings = new HashMap<>();
    private final ArrayDeque<Supplier<Tuple2<String, byte[]>>> ready = new ArrayDeque<>();
    private long held_bytes;
    private long most_bytes;
    private long sumsHanded;
    private long rowsHanded;
    private int round;
    private Intake.Outcome waiting;
    private Stage stage = Stage.FOLDING;

    private enum Stage {
        FOLDING,
        LAST,
        DONE
    }

    /** What a slot's records go into; forgotten when handed on. */
    private static final class SlotFold {
        final Slot slot;
        final KeyFold fold;
        final ShowingFold showing;
        /** The hand-on after which it was made. */
        final int round;

        SlotFold(Slot slot, KeyFold fold, ShowingFold showing, int round) {
            this.slot = slot;
            this.fold = fold;
            this.showing = showing;
            this.round = round;
        }
    }

    FoldTask(RecordCursor cursor, TableColumns columns, IntakeSpec spec, FoldSettings settings) {
        this.cursor = cursor;
        this.intake = new Intake(spec, columns, cursor);
        this.shape = new FoldShape(spec.scale(), settings);
        this.settings = settings;
        this.isTable = spec.isTable();
        this.counts = new RecordCounts(settings.quarantineKept());
    }

    @Override
    public boolean hasNext() {
        while (ready.isEmpty() && stage != Stage.DONE) {
            if (stage == Stage.FOLDING) {
                foldOn();
            } else {
                stage = Stage.DONE;
                FoldSummary summary = new FoldSummary(counts, most_bytes, sumsHanded, rowsHanded, 1);
                ready.add(() -> new Tuple2<>(FoldKeys.SUMMARY, Payloads.bytes(summary::write)));
            }
        }
        return !ready.isEmpty();
    }

    @Override
    public Tuple2<String, byte[]> next() {
        if (!hasNext()) {
            throw new NoSuchElementException();
        }
        return ready.remove().get();
    }

    private void foldOn() {
        if (waiting != null) {
            Intake.Outcome again = waiting;
            waiting = null;
            place(again);
        }
        while (cursor.next()) {
            Intake.Outcome outcome = intake.take();
            counts.count(outcome, intake);
            if (!place(outcome)) {
                waiting = outcome;
                handOn();
                return;
            }
        }
        handOn();
        stage = Stage.LAST;
    }

    /** Puts the record where it belongs; false where that would pass the bound. */
    private boolean place(Intake.Outcome outcome) {
        Slot slot = intake.slot();
        if (!slot.isIdentified()) {
            return true;
        }
        SlotFold into = slotFold(slot);
        if (into == null) {
            return false;
        }
        if (outcome == Intake.Outcome.ACCEPTED) {
            return accept(into);
        }
        if (into.showing != null) {
            if (outcome == Intake.Outcome.NO_SIGNAL) {
                into.showing.countNoSignal();
            } else if (outcome == Intake.Outcome.QUARANTINED) {
                into.showing.countQuarantined();
            }
        }
        return true;
    }

    private boolean accept(SlotFold into) {
        long growth = into.fold.growth_bytes();
        if (growth > 0) {
            if (held_bytes + growth > settings.task_bytes() && held_bytes > 0) {
                return false;
            }
            most_bytes = Math.max(most_bytes, held_bytes + growth);
        }
        long before = into.fold.bytes();
        into.fold.add(intake.counts());
        held_bytes += into.fold.bytes() - before;
        if (into.showing != null) {
            into.showing.accept(intake.counts());
            if (into.showing.isFull()) {
                handOn();
            }
        }
        return true;
    }

    private SlotFold slotFold(Slot slot) {
        if (slot.attachment instanceof SlotFold known && known.round == round) {
            return known;
        }
        SlotFold known = showings.get(slot.keys);
        if (known == null) {
            long bytes = isTable ? 0 : ShowingFold.bytes(shape.channels());
            if (held_bytes + bytes > settings.task_bytes() && held_bytes > 0) {
                return null;
            }
            held_bytes += bytes;
            most_bytes = Math.max(most_bytes, held_bytes);
            KeyFold fold = folds.computeIfAbsent(FoldKeys.ofMoments(slot), key -> new KeyFold(shape));
            known = new SlotFold(slot, fold, isTable ? null : new ShowingFold(shape), round);
            showings.put(slot.keys, known);
        }
        slot.attachment = known;
        return known;
    }

    /** Queues all that is held, to be turned into bytes one by one as it is pulled, and begins anew. */
    private void handOn() {
        for (Map.Entry<String, KeyFold> entry : folds.entrySet()) {
            KeyFold fold = entry.getValue();
            if (fold.bytes() > 0) {
                if (fold.folderNow_bytes() > 0) {
                    sumsHanded++;
                } else {
                    rowsHanded++;
                }
                ready.add(() -> new Tuple2<>(entry.getKey(), fold.payload()));
            }
        }
        for (SlotFold showing : showings.values()) {
            if (showing.showing != null) {
                ready.add(() -> new Tuple2<>(FoldKeys.ofShowing(showing.slot), showing.showing.payload(showing.slot)));
            }
        }
        folds.clear();
        showings.clear();
        held_bytes = 0;
        round++;
    }
}
