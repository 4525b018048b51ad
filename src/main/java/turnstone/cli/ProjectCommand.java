package turnstone.cli;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.night.DayProjection;
import turnstone.night.Words;
import turnstone.plant.Plant;
import turnstone.spark.ProjectResult;
import turnstone.spark.ProjectSettings;
import turnstone.spark.ProjectTally;
import turnstone.spark.Session;
import turnstone.spark.TableSpec;
import turnstone.table.Table;
import turnstone.table.TableProject;

/** {@code project}: positions and decisions of the records of a table, or of a day of a plant. */
@Command(
        name = "project",
        description = "Projects records: position, decision, margin, distance and flags of each.",
        footer = {
            "",
            "Examples: turnstone project --model work/wine --table wine.csv --label label --out work/wine-positions",
            "          turnstone project --model 3f9c21ab --plant plant.yaml --day 2026-03-14 --out work/positions"
        })
final class ProjectCommand implements Callable<Integer> {
    /** In which form the positions are written. */
    enum Form {
        CSV,
        PARQUET
    }

    private static final int QUARANTINE_KEPT = 100_000;

    private final Console console;

    @Mixin
    CommonOptions common;

    @Option(
            names = "--model",
            paramLabel = "MODEL",
            required = true,
            description = "a folder with model.json, or a fingerprint on the plant's shelf")
    String model;

    @Option(names = "--table", paramLabel = "FILE", description = "the table to project")
    String table;

    @Option(
            names = "--label",
            paramLabel = "COLUMN",
            description = "the column with the truth: adds tally.csv and a summary")
    String label;

    @Option(names = "--array", paramLabel = "COLUMN", description = "the column that holds all channels as an array")
    String array;

    @Option(names = "--plant", paramLabel = "FILE", description = "the plant file, for a fingerprint or a day")
    Path plant;

    @Option(
            names = "--day",
            paramLabel = "DAY",
            converter = DayOption.class,
            description = "project this day of the plant instead of a table")
    LocalDate day;

    @Option(names = "--form", paramLabel = "FORM", description = "csv (default) or parquet")
    Form form = Form.CSV;

    @Option(
            names = "--max-quarantine",
            paramLabel = "SHARE",
            description = "the largest share of records that may be quarantined (default: ${DEFAULT-VALUE})")
    double mostQuarantined = 0.05;

    @Option(names = "--out", paramLabel = "DIR", required = true, description = "the folder to write; new or empty")
    Path out;

    ProjectCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Range.requireShare("--max-quarantine", mostQuarantined);
        if ((table == null) == (day == null)) {
            throw Fault.usage("name what to project: either --table FILE, or --plant FILE and --day DAY");
        }
        if (day != null && plant == null) {
            throw Fault.usage("--day needs --plant FILE, which says where the records are");
        }
        Model found = Models.find(model, plant);
        ProjectSettings settings = new ProjectSettings(
                out.toAbsolutePath().toUri().toString(),
                form == Form.CSV ? TableSpec.Form.CSV : TableSpec.Form.PARQUET,
                mostQuarantined,
                QUARANTINE_KEPT);
        try (Session session = Engine.open("project", console)) {
            console.talk().phase("project");
            ProjectResult result = table != null
                    ? TableProject.run(session, found, table(found), settings)
                    : DayProjection.run(session, Plant.read(plant), day, Set.of(), found, settings);
            console.talk().done("projected by " + Words.shortened(found.fingerprint()));
            print(result);
        }
        return 0;
    }

    private Table table(Model found) {
        List<String> channels = array == null ? found.channels() : List.of();
        return new Table(table, Optional.ofNullable(label), channels, Optional.ofNullable(array));
    }

    private void print(ProjectResult result) {
        ProjectTally tally = result.tally();
        long records = result.counts().accepted() + result.counts().noSignal();
        boolean labelled = label != null || day != null;
        if (common.json) {
            ObjectNode node = Json.object()
                    .put("out", out.toString())
                    .put("read", result.counts().read())
                    .put("accepted", result.counts().accepted())
                    .put("noSignal", result.counts().noSignal())
                    .put("quarantined", result.counts().quarantinedTotal())
                    .put("unfamiliar", tally.unfamiliar());
            if (labelled) {
                node.put("decidedOtherwise", tally.wrong());
            }
            console.json(node);
            return;
        }
        console.say(Words.number(records) + " positions in " + out.resolve("positions") + ", "
                + Words.number(result.counts().noSignal()) + " of them no signal, "
                + Words.number(tally.unfamiliar()) + " flagged unfamiliar");
        if (result.counts().quarantinedTotal() > 0) {
            console.say(Words.number(result.counts().quarantinedTotal()) + " quarantined: "
                    + result.counts().quarantined());
        }
        if (labelled) {
            console.say(Words.number(tally.wrong()) + " of "
                    + Words.number(result.counts().accepted()) + " decided otherwise than their label; see tally.csv");
        }
    }
}
