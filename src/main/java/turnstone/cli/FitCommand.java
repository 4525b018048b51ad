package turnstone.cli;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.nio.file.Path;
import java.util.List;
import java.util.Optional;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import turnstone.decide.Model;
import turnstone.json.Json;
import turnstone.night.Words;
import turnstone.spark.Session;
import turnstone.table.Mix;
import turnstone.table.Table;
import turnstone.table.TableFit;

/** {@code fit}: one shot, no plant. */
@Command(
        name = "fit",
        description = "Fits a projection to a table of labelled records, without a plant.",
        footer = {"", "Example: turnstone fit --table wine.csv --label label --out work/wine"})
final class FitCommand implements Callable<Integer> {
    private static final double UNFAMILIAR_SHARE = 0.01;

    private final Console console;

    @Mixin
    CommonOptions common;

    @Option(
            names = "--table",
            paramLabel = "FILE",
            required = true,
            description = "file, folder or pattern; CSV with a header (also .csv.gz), else Parquet")
    String table;

    @Option(names = "--label", paramLabel = "COLUMN", required = true, description = "the column with the material")
    String label;

    @Option(
            names = "--channels",
            paramLabel = "COLUMN",
            split = ",",
            description = "the columns that are channels (default: every column but the label)")
    List<String> channels = List.of();

    @Option(names = "--array", paramLabel = "COLUMN", description = "the column that holds all channels as an array")
    String array;

    @Option(
            names = "--ridge",
            paramLabel = "R",
            description = "share of the mean diagonal that is added to the within scatter, or analytic (default: 0)")
    String ridge = "0";

    @Option(names = "--axes", paramLabel = "N", description = "axes kept (default: all)")
    int axes;

    @Option(
            names = "--mix",
            paramLabel = "MIX",
            description =
                    "as-counted (default), equal, or a file of lines material,share: weights of the between scatter and"
                            + " decision prior")
    String mix = "as-counted";

    @Option(
            names = "--scale",
            paramLabel = "FILE",
            description =
                    "a count scale as `turnstone scale --json` prints it (default: the largest powers of ten that lose"
                            + " nothing)")
    Path scale;

    @Option(
            names = "--max-quarantine",
            paramLabel = "SHARE",
            description = "the largest share of records that may be quarantined (default: ${DEFAULT-VALUE})")
    double mostQuarantined = 0.05;

    @Option(names = "--out", paramLabel = "DIR", required = true, description = "the folder for model.json")
    Path out;

    FitCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Range.requireAxes("--axes", axes);
        Range.requireShare("--max-quarantine", mostQuarantined);
        TableFit.Order order = new TableFit.Order(
                new Table(table, Optional.of(label), channels, Optional.ofNullable(array)),
                RefitCommand.ridge(ridge),
                axes,
                mix(),
                Optional.ofNullable(scale).map(ScaleFiles::read),
                UNFAMILIAR_SHARE,
                mostQuarantined);
        ModelFolder folder = ModelFolder.prepare(out);
        try (Session session = Engine.open("fit", console)) {
            console.talk().phase("fit " + table);
            TableFit.Result result = TableFit.run(session, order);
            folder.write(result.model(), result.counts());
            console.talk().done("fitted " + table);
            print(result);
        }
        return 0;
    }

    private Mix mix() {
        return switch (mix) {
            case "as-counted" -> new Mix.AsCounted();
            case "equal" -> new Mix.Equal();
            default -> Mix.read(Path.of(mix));
        };
    }

    private void print(TableFit.Result result) {
        Model model = result.model();
        if (common.json) {
            ObjectNode node = Json.object()
                    .put("model", out.toString())
                    .put("fingerprint", model.fingerprint())
                    .put("momentsFingerprint", result.momentsFingerprint());
            node.set("fisherRatios", Json.array(model.fisherRatios()));
            node.put("ridge", model.ridge()).put("reciprocalCondition", model.reciprocalCondition());
            node.set("scaleLoss", result.loss().json());
            console.json(node);
            return;
        }
        console.say("model " + Words.shortened(model.fingerprint()) + " in " + out);
        console.say(Words.number(result.counts().read()) + " read = "
                + Words.number(result.counts().accepted())
                + " accepted + " + Words.number(result.counts().noSignal()) + " no signal + "
                + Words.number(result.counts().quarantinedTotal()) + " quarantined");
        double[] ratios = model.fisherRatios();
        double[] shares = model.fisherShares();
        for (int axis = 0; axis < ratios.length; axis++) {
            console.say(String.format(
                    java.util.Locale.ROOT,
                    "axis %-3d Fisher ratio %-22s share %s",
                    axis + 1,
                    Figures.shortest(ratios[axis]),
                    axis < shares.length ? Words.share(shares[axis]) : ""));
        }
        console.say("ridge " + Figures.shortest(model.ridge()) + ", reciprocal condition "
                + Figures.shortest(model.reciprocalCondition()) + ", within degrees of freedom "
                + Words.number(model.withinDegreesOfFreedom()));
        console.say(
                result.loss().isLossless()
                        ? "count scale: every value is held without loss"
                        : "count scale: largest rounding distance "
                                + Figures.shortest(result.loss().largestDistance()) + " steps, "
                                + Words.share(result.loss().shareHeld()) + " of records held without loss");
        model.remarks().forEach(remark -> console.talk().remark(remark));
    }
}
