package turnstone.spark;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.TreeSet;
import org.apache.spark.broadcast.Broadcast;
import turnstone.decide.Judgement;
import turnstone.trial.TrialForm;
import turnstone.trial.TrialModels;

/** Judges a day's records by models that have not seen their trays, all models in one pass. */
public final class TrialJob {
    private TrialJob() {}

    /**
     * Tallies all records of a source.
     *
     * @param spec the intake with the count scale that the models are defined on
     * @param ejected by duty, the materials that it ejects: scores are binned for these duties
     * @throws turnstone.fault.Fault of kind storage where records were read that were not counted apart, or the engine failed
     */
    public static TrialTallies run(
            RecordSource source,
            IntakeSpec spec,
            TrialModels models,
            Map<String, Set<String>> ejected,
            int quarantineKept) {
        HashMap<String, Set<String>> duties = new HashMap<>();
        ejected.forEach((duty, names) -> duties.put(duty, new TreeSet<>(names)));
        Broadcast<IntakeSpec> sharedSpec = source.session().context().broadcast(spec);
        Broadcast<TrialModels> sharedModels = source.session().context().broadcast(models);
        TableColumns columns = source.columns();
        List<TrialTallies> parts = SparkTrouble.guard(
                "trying models",
                () -> source.over(cursor -> {
                            Intake intake = new Intake(sharedSpec.value(), columns, cursor);
                            TrialTallies tallies =
                                    judge(cursor, intake, sharedModels.value().copy(), duties, quarantineKept);
                            return List.of(tallies).iterator();
                        })
                        .collect());
        TrialTallies total = new TrialTallies(quarantineKept);
        parts.forEach(total::merge);
        source.requireAll(total.counts().read());
        sharedSpec.unpersist(false);
        sharedModels.unpersist(false);
        return total;
    }

    private static TrialTallies judge(
            RecordCursor cursor,
            Intake intake,
            TrialModels models,
            Map<String, Set<String>> ejected,
            int quarantineKept) {
        TrialTallies tallies = new TrialTallies(quarantineKept);
        Judgement judgement = new Judgement();
        List<TrialSlot> all = new ArrayList<>();
        while (cursor.next()) {
            Intake.Outcome outcome = intake.take();
            tallies.counts().count(outcome, intake);
            if (outcome != Intake.Outcome.ACCEPTED && outcome != Intake.Outcome.NO_SIGNAL) {
                continue;
            }
            for (TrialSlot slot : slots(intake.slot(), models, ejected, all)) {
                if (outcome == Intake.Outcome.ACCEPTED) {
                    slot.judge(intake.counts(), judgement);
                } else {
                    slot.countNoSignal();
                }
            }
        }
        all.forEach(slot -> slot.addTo(tallies));
        return tallies;
    }

    private static TrialSlot[] slots(
            Slot slot, TrialModels models, Map<String, Set<String>> ejected, List<TrialSlot> all) {
        if (slot.attachment instanceof TrialSlot[] known) {
            return known;
        }
        TrialForm[] forms = TrialForm.values();
        TrialSlot[] made = new TrialSlot[forms.length];
        for (int i = 0; i < forms.length; i++) {
            made[i] = new TrialSlot(forms[i], slot, models, ejected);
            all.add(made[i]);
        }
        slot.attachment = made;
        return made;
    }
}
