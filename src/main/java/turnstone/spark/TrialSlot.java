package turnstone.spark;

import java.util.Arrays;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.TreeMap;
import turnstone.decide.Judgement;
import turnstone.decide.Projector;
import turnstone.trial.EjectScore;
import turnstone.trial.Recognition;
import turnstone.trial.ScoreBins;
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
        final double[] scores;
        final TreeMap<String, Binned> binned = new TreeMap<>();

        Judged(Projector projector, Map<String, Set<String>> ejected) {
            this.projector = projector;
            this.position = new double[projector.rank()];
            this.familiar = new long[projector.materials().size()];
            this.unfamiliar = new long[projector.materials().size()];
            this.scores = new double[projector.materials().size()];
            ejected.forEach((duty, names) -> EjectScore.of(names, projector.materials())
                    .ifPresent(score -> binned.put(duty, new Binned(score))));
        }

        void judge(double[] counts, Judgement judgement) {
            projector.judge(counts, 0, position, judgement);
            long[] cells = judgement.unfamiliar() ? unfamiliar : familiar;
            cells[judgement.material()]++;
            if (!binned.isEmpty() && !judgement.unfamiliar()) {
                projector.scores(position, scores);
                for (Binned duty : binned.values()) {
                    duty.bins[duty.score.bin(judgement.material(), scores)]++;
                }
            }
        }
    }

    /** Familiar records by the bin of their score for one duty. */
    private static final class Binned {
        final EjectScore score;
        final long[] bins = new long[ScoreBins.COUNT];

        Binned(EjectScore score) {
            this.score = score;
        }
    }

    /**
     * The records of one showing.
     *
     * @param ejected by duty, the materials that it ejects; scores are binned for these duties, for this fleet only
     */
    TrialSlot(TrialForm form, Slot slot, TrialModels models, Map<String, Set<String>> ejected) {
        Map<String, Set<String>> wanted = form == TrialForm.THIS_FLEET ? ejected : Map.of();
        this.form = form;
        this.slot = slot;
        this.pair =
                models.find(form, slot.trayGroup, slot.instrument).filter(found -> found.tries(slot.keys.material()));
        this.candidate = pair.map(TrialModels.Pair::candidate)
                .map(projector -> new Judged(projector, wanted))
                .orElse(null);
        this.inService = pair.flatMap(TrialModels.Pair::inService)
                .map(projector -> new Judged(projector, wanted))
                .orElse(null);
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
        add(tallies, Side.CANDIDATE, candidate);
        if (inService != null) {
            add(tallies, Side.IN_SERVICE, inService);
        }
    }

    private void add(TrialTallies tallies, Side side, Judged judged) {
        TrialTally tally = tallies.tally(form, side);
        String showing = slot.keys.showing();
        String truth = slot.keys.material();
        for (int m = 0; m < judged.familiar.length; m++) {
            String decided = judged.projector.material(m);
            tally.add(new TallyCell(showing, truth, decided, Recognition.FAMILIAR), judged.familiar[m]);
            tally.add(new TallyCell(showing, truth, decided, Recognition.UNFAMILIAR), judged.unfamiliar[m]);
        }
        tally.add(TallyCell.noSignal(showing, truth), noSignal);
        long strange = Arrays.stream(judged.unfamiliar).sum();
        judged.binned.forEach(
                (duty, one) -> tallies.scores(duty, side).add(showing, truth, one.bins, strange, noSignal));
    }
}
