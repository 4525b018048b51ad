package turnstone.night;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.Map;
import java.util.TreeMap;
import turnstone.json.Json;
import turnstone.trial.Side;
import turnstone.trial.TrialForm;
import turnstone.trial.TrialResult;

/** {@code trial.json}: tallies of a trial by form and side; and a CSV table of each. */
public final class TrialFiles {
    private TrialFiles() {}

    /** Writes both kinds of files into a run's folder. */
    public static void write(RunFolder run, TrialResult trial) {
        run.write("trial.json", json(trial));
        for (TrialForm form : TrialForm.values()) {
            for (Side side : Side.values()) {
                trial.tally(form, side)
                        .ifPresent(tally -> run.write(
                                "tally-" + form.label().replace(' ', '-') + "-"
                                        + side.label().replace(' ', '-') + ".csv",
                                tally.csv()));
            }
        }
    }

    /** Canonical: a function of the tallies and the two fingerprints. */
    public static ObjectNode json(TrialResult trial) {
        ObjectNode node = Json.object()
                .put("candidate", trial.candidate())
                .put("inService", trial.inService().orElse(null));
        ArrayNode days = node.putArray("days");
        trial.days().forEach(day -> days.add(day.toString()));
        reasons(node.putObject("notTried"), trial.notTried(TrialForm.THIS_FLEET));
        reasons(node.putObject("notTriedOnMachineNotSeen"), trial.notTried(TrialForm.MACHINE_NOT_SEEN));
        ObjectNode forms = node.putObject("forms");
        for (TrialForm form : TrialForm.values()) {
            ObjectNode sides = forms.putObject(form.label());
            for (Side side : Side.values()) {
                trial.tally(form, side).ifPresent(tally -> sides.set(side.label(), tally.json()));
            }
        }
        return node;
    }

    private static void reasons(ObjectNode node, Map<String, String> notTried) {
        new TreeMap<>(notTried).forEach(node::put);
    }
}
