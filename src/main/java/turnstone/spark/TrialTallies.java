package turnstone.spark;

import java.io.Serializable;
import java.util.EnumMap;
import java.util.Map;
import java.util.TreeMap;
import turnstone.trial.ScoreHistogram;
import turnstone.trial.Side;
import turnstone.trial.TrialForm;
import turnstone.trial.TrialTally;

/** What one pass over a day's records tallied: both forms, both sides. Not thread-safe. */
public final class TrialTallies implements Serializable {
    private static final long serialVersionUID = 1L;

    private final EnumMap<TrialForm, EnumMap<Side, TrialTally>> tallies = new EnumMap<>(TrialForm.class);
    private final EnumMap<TrialForm, Long> notTried = new EnumMap<>(TrialForm.class);
    private final TreeMap<String, EnumMap<Side, ScoreHistogram>> scores = new TreeMap<>();
    private final RecordCounts counts;

    TrialTallies(int quarantineKept) {
        counts = new RecordCounts(quarantineKept);
        for (TrialForm form : TrialForm.values()) {
            EnumMap<Side, TrialTally> sides = new EnumMap<>(Side.class);
            for (Side side : Side.values()) {
                sides.put(side, TrialTally.empty());
            }
            tallies.put(form, sides);
            notTried.put(form, 0L);
        }
    }

    /** The tally of a form and side; empty in the side in service where nothing is. */
    public TrialTally tally(TrialForm form, Side side) {
        return tallies.get(form).get(side);
    }

    /** Scores for a duty that fixes a figure, of this fleet; of nothing where the duty was not asked for. */
    public ScoreHistogram scores(String duty, Side side) {
        return scores.computeIfAbsent(duty, name -> new EnumMap<>(Side.class))
                .computeIfAbsent(side, one -> ScoreHistogram.empty());
    }

    /** Records without a pair of models in this form. */
    public long notTried(TrialForm form) {
        return notTried.get(form);
    }

    /** What became of the records. */
    public RecordCounts counts() {
        return counts;
    }

    void addNotTried(TrialForm form, long records) {
        notTried.merge(form, records, Math::addExact);
    }

    void merge(TrialTallies other) {
        for (Map.Entry<TrialForm, EnumMap<Side, TrialTally>> form : other.tallies.entrySet()) {
            form.getValue().forEach((side, tally) -> tally(form.getKey(), side).merge(tally));
            addNotTried(form.getKey(), other.notTried(form.getKey()));
        }
        other.scores.forEach((duty, sides) ->
                sides.forEach((side, histogram) -> scores(duty, side).merge(histogram)));
        counts.merge(other.counts);
    }
}
