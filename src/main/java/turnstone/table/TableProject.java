package turnstone.table;

import turnstone.decide.Model;
import turnstone.decide.Projector;
import turnstone.fault.Fault;
import turnstone.measure.HeadSpec;
import turnstone.measure.Resampling;
import turnstone.spark.IntakeSpec;
import turnstone.spark.ProjectJob;
import turnstone.spark.ProjectResult;
import turnstone.spark.ProjectSettings;
import turnstone.spark.RecordSource;
import turnstone.spark.Session;

/** Projects a table by a model. */
public final class TableProject {
    private TableProject() {}

    /**
     * Projects all records of a table.
     *
     * @throws Fault of kind input where the model's head needs what a plain table does not have, the channels differ, or too much is
     *     quarantined
     */
    public static ProjectResult run(Session session, Model model, Table table, ProjectSettings settings) {
        HeadSpec head = HeadSpec.fromJson(model.pretreatment().path("head"));
        if (head.corrects() || head.resampling() == Resampling.FROM_INSTRUMENT) {
            throw Fault.input("this model works on raw records of known instruments, a plain table has neither")
                    .at("model " + model.fingerprint().substring(0, 12))
                    .found("input " + head.input() + ", resampled or corrected by dark and white")
                    .remedy("project a day of its plant instead: --plant FILE --day DAY");
        }
        RecordSource source = table.openCarrying(session);
        if (source.channels() != head.channels()) {
            throw Fault.input("the table has another number of channels than the model")
                    .at(table.path())
                    .found(source.channels())
                    .expected(head.channels());
        }
        return ProjectJob.run(source, IntakeSpec.table(head, model.countScale()), Projector.of(model), settings);
    }
}
