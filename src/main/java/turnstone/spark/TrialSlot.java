package turnstone.spark;

import java.util.Optional;
import turnstone.decide.Judgement;
import turnstone.decide.Projector;
import turnstone.trial.Recognition;
import turnstone.trial.Side;
import turnstone.trial.TallyCell;
import turnstone.trial.TrialForm;
import turnstone.trial.TrialModels;
import turnstone.trial.TrialTally;

/** The records of one showing within one task, judged in one form: whole numbers by decision. For one thread. */
final class TrialSlot {
    private final TrialForm form;
    private final Slot slot;
    private final Optional<TrialModels.Pair> pair;
    private final Judged candidate;
    private final Judged inService;
    private long noSignal;
    private long records;

    /** One side: how often each material was decided, familiar and unfamiliar. */
    private static final class Judged {
        final Projector projector;
        final double[] position;
        final long[] familiar;
        final long[] unfamiliar;

        Judged(Projector projector) {
            this.projector = projector;
            this.position = new double[projector.rank()];
            this.familiar = new long[projector.materials().size()];
            this.unfamiliar = new long[projector.materials().size()];
        }

        void judge(double[] counts, Judgement judgement) {
            projector.judge(counts, 0, position, judgement);
            long[] cells = judgement.unfamiliar() ? unfamiliar : familiar;
            cells[judgement.material()]++;
        }
    }

    TrialSlot(TrialForm form, Slot slot, TrialModels models) {
        this.form = form;
        this.slot = slot;
        this.pair =
                models.find(form, slot.trayGroup, slot.instrument).filter(found -> found.tries(slot.keys.material()));
        this.candidate = pair.map(TrialModels.Pair::candidate).map(Judged::new).orElse(null);
        this.inService =
                pair.flatMap(TrialModels.Pair::inService).map(Judged::new).orElse(null);
    }

    void judge(double[] counts, Judgement judgement) {
        records++;
        if (candidate != null) {
            candidate.judge(counts, judgement);
        }
        if (inService != null) {
            inService.judge(counts, judgement);
        }
    }

    void countNoSignal() {
        records++;
        noSignal++;
    }

    void addTo(TrialTallies tallies) {
        if (pair.isEmpty()) {
            tallies.addNotTried(form, records);
            return;
        }
        add(tallies.tally(form, Side.CANDIDATE), candidate);
        if (inService != null) {
            add(tallies.tally(form, Side.IN_SERVICE), inService);
        }
    }

    private void add(TrialTally tally, Judged judged) {
        String showing = slot.keys.showing();
        String truth = slot.keys.material();
        for (int m = 0; m < judged.familiar.length; m++) {
            String decided = judged.projector.material(m);
            tally.add(new TallyCell(showing, truth, decided, Recognition.FAMILIAR), judged.familiar[m]);
            tally.add(new TallyCell(showing, truth, decided, Recognition.UNFAMILIAR), judged.unfamiliar[m]);
        }
        tally.add(TallyCell.noSignal(showing, truth), noSignal);
    }
}
