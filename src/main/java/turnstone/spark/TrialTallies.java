package turnstone.spark;

import java.io.Serializable;
import java.util.EnumMap;
import java.util.Map;
import turnstone.trial.Side;
import turnstone.trial.TrialForm;
import turnstone.trial.TrialTally;

/** What one pass over a day's records tallied: both forms, both sides. Not thread-safe. */
public final class TrialTallies implements Serializable {
    private static final long serialVersionUID = 1L;

    private final EnumMap<TrialForm, EnumMap<Side, TrialTally>> tallies = new EnumMap<>(TrialForm.class);
    private final EnumMap<TrialForm, Long> notTried = new EnumMap<>(TrialForm.class);
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
        counts.merge(other.counts);
    }
}
