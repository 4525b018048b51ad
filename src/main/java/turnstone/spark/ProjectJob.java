package turnstone.spark;

import java.util.List;
import org.apache.spark.api.java.JavaRDD;
import org.apache.spark.broadcast.Broadcast;
import org.apache.spark.sql.Dataset;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.SaveMode;
import turnstone.decide.Judgement;
import turnstone.decide.Projector;
import turnstone.fault.Fault;

/**
 * Projects records: position, decision, margin, distance and flags for each, with its key columns carried through.
 *
 * <p>One pass counts and tallies, so that nothing is written when too much is quarantined; a second writes, and what was written is
 * counted again before it gets its name.
 */
public final class ProjectJob {
    private ProjectJob() {}

    /** What one task counted. */
    private record Tallied(RecordCounts counts, ProjectTally tally) implements java.io.Serializable {}

    /**
     * Projects all records of a source.
     *
     * @param spec the intake with the model's own head and count scale
     * @throws Fault of kind input where too many records are quarantined or the output folder is not empty; of kind storage where
     *     something can't be read or written
     */
    public static ProjectResult run(
            RecordSource source, IntakeSpec spec, Projector projector, ProjectSettings settings) {
        Output output = Output.prepare(source.session(), settings.out());
        Broadcast<IntakeSpec> sharedSpec = source.session().context().broadcast(spec);
        Broadcast<Projector> sharedProjector = source.session().context().broadcast(projector);
        Tallied tallied = tally(source, sharedSpec, sharedProjector, settings.quarantineKept());
        RecordCounts counts = tallied.counts();
        source.requireAll(counts.read());
        requireFew(counts, settings.mostQuarantined());
        try {
            write(source, sharedSpec, sharedProjector, settings.form(), output);
            output.requireRecords(settings.form(), counts.accepted() + counts.noSignal());
            output.text("quarantine.csv", counts.quarantineCsv());
            if (source.columns().index(KeyColumn.MATERIAL) >= 0) {
                output.text("tally.csv", tallied.tally().csv());
            }
            output.publish();
        } catch (RuntimeException e) {
            output.discard();
            throw e;
        }
        sharedSpec.unpersist(false);
        sharedProjector.unpersist(false);
        return new ProjectResult(counts, tallied.tally(), settings.out());
    }

    /** Refuses where the share of quarantined records passes a limit. */
    public static void requireFew(RecordCounts counts, double mostShare) {
        if (counts.quarantinedShare() > mostShare) {
            String first = counts.quarantine().isEmpty()
                    ? ""
                    : "; the first: " + counts.quarantine().get(0).csv();
            throw Fault.input("too many records are quarantined")
                    .found(counts.quarantinedTotal() + " of " + counts.read() + " " + counts.quarantined() + first)
                    .expected("a share of at most " + Numerals.shortest(mostShare))
                    .remedy("look at the records, or allow more");
        }
    }

    private static Tallied tally(
            RecordSource source, Broadcast<IntakeSpec> spec, Broadcast<Projector> projector, int quarantineKept) {
        TableColumns columns = source.columns();
        List<Tallied> parts = SparkTrouble.guard(
                "projecting records",
                () -> source.over(cursor -> {
                            Intake intake = new Intake(spec.value(), columns, cursor);
                            Tallied tallied =
                                    count(cursor, intake, projector.value().copy(), quarantineKept);
                            return List.of(tallied).iterator();
                        })
                        .collect());
        Tallied total = new Tallied(new RecordCounts(quarantineKept), new ProjectTally());
        for (Tallied part : parts) {
            total.counts().merge(part.counts());
            total.tally().merge(part.tally());
        }
        return total;
    }

    private static Tallied count(RecordCursor cursor, Intake intake, Projector projector, int quarantineKept) {
        Tallied tallied = new Tallied(new RecordCounts(quarantineKept), new ProjectTally());
        double[] position = new double[projector.rank()];
        Judgement judgement = new Judgement();
        while (cursor.next()) {
            Intake.Outcome outcome = intake.take();
            tallied.counts().count(outcome, intake);
            String material = intake.slot().keys.material();
            String truth = material == null ? "" : material;
            if (outcome == Intake.Outcome.ACCEPTED) {
                projector.judge(intake.counts(), 0, position, judgement);
                tallied.tally().add(truth, projector.material(judgement.material()), 1);
                tallied.tally().addUnfamiliar(judgement.unfamiliar() ? 1 : 0);
            } else if (outcome == Intake.Outcome.NO_SIGNAL) {
                tallied.tally().add(truth, ProjectTally.NO_SIGNAL, 1);
            }
        }
        return tallied;
    }

    private static void write(
            RecordSource source,
            Broadcast<IntakeSpec> spec,
            Broadcast<Projector> projector,
            TableSpec.Form form,
            Output output) {
        TableColumns columns = source.columns();
        int texts = columns.texts().size();
        ProjectedRows.Cells cells = form == TableSpec.Form.CSV ? ProjectedRows.Cells.TEXT : ProjectedRows.Cells.TYPED;
        JavaRDD<Row> rows = source.over(cursor -> new ProjectedRows(
                cursor,
                new Intake(spec.value(), columns, cursor),
                projector.value().copy(),
                texts,
                cells));
        Dataset<Row> frame = source.session()
                .spark()
                .createDataFrame(
                        rows,
                        ProjectedRows.schema(columns.texts(), projector.value().rank(), cells));
        SparkTrouble.guard("writing positions", () -> {
            String folder = output.positions();
            if (form == TableSpec.Form.CSV) {
                frame.write()
                        .mode(SaveMode.ErrorIfExists)
                        .option("header", "true")
                        .option("emptyValue", "")
                        .csv(folder);
            } else {
                frame.write().mode(SaveMode.ErrorIfExists).parquet(folder);
            }
            return folder;
        });
    }
}
