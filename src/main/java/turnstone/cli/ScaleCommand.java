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
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.measure.ChannelScale;
import turnstone.measure.CountScale;
import turnstone.measure.Precision;
import turnstone.night.DayScale;
import turnstone.night.Words;
import turnstone.plant.Plant;
import turnstone.spark.Session;
import turnstone.table.Table;
import turnstone.table.TableScale;

/** {@code scale}: proposes a count scale and says what it would cost. */
@Command(
        name = "scale",
        description = "Proposes a count scale for a table or a day of a plant, and says what it would cost.",
        footer = {
            "",
            "Examples: turnstone scale --table wine.csv --label label",
            "          turnstone scale --plant plant.yaml --day 2026-03-14"
        })
final class ScaleCommand implements Callable<Integer> {
    private static final int SHOWN = 12;

    private final Console console;

    @Mixin
    CommonOptions common;

    @Option(names = "--table", paramLabel = "FILE", description = "the table to look at")
    String table;

    @Option(names = "--label", paramLabel = "COLUMN", description = "the column of the table that is no channel")
    String label;

    @Option(names = "--channels", paramLabel = "COLUMN", split = ",", description = "the columns that are channels")
    List<String> channels = List.of();

    @Option(names = "--array", paramLabel = "COLUMN", description = "the column that holds all channels as an array")
    String array;

    @Option(names = "--plant", paramLabel = "FILE", description = "the plant file")
    Path plant;

    @Option(
            names = "--day",
            paramLabel = "DAY",
            converter = DayOption.class,
            description = "the day of the plant to look at")
    LocalDate day;

    ScaleCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        if ((table == null) == (plant == null) || (plant != null && day == null)) {
            throw Fault.usage("name what to look at: either --table FILE --label COLUMN, or --plant FILE --day DAY");
        }
        if (table != null && label == null && channels.isEmpty() && array == null) {
            throw Fault.usage(
                    "name the column that is no channel: --label COLUMN; or the channels: --channels or --array");
        }
        try (Session session = Engine.open("scale", console)) {
            console.talk().phase("look at values");
            TableScale.Finding finding = table != null
                    ? TableScale.propose(
                            session, new Table(table, Optional.ofNullable(label), channels, Optional.ofNullable(array)))
                    : DayScale.propose(session, Plant.read(plant), day, Set.of());
            console.talk().done("looked at " + Words.number(finding.records()) + " records");
            print(finding);
        }
        return 0;
    }

    private void print(TableScale.Finding finding) {
        CountScale scale = finding.scale();
        if (common.json) {
            ObjectNode node = Json.object();
            node.set("countScale", scale.json());
            node.set("scaleLoss", finding.loss().json());
            console.json(node);
            return;
        }
        int fine = 0;
        for (int c = 0; c < scale.channels(); c++) {
            ChannelScale channel = scale.channel(c);
            fine += channel.precision() == Precision.FINE ? 1 : 0;
            if (c < SHOWN) {
                console.say(String.format(
                        "%-16s offset %-14s step %-12s %s",
                        finding.channelNames().get(c),
                        channel.offset().toPlainString(),
                        channel.step().toPlainString(),
                        channel.precision().label()));
            }
        }
        if (scale.channels() > SHOWN) {
            console.say("… " + (scale.channels() - SHOWN) + " more channels; --json prints them all");
        }
        console.say(
                fine == 0
                        ? "all channels coarse"
                        : fine + " of " + scale.channels() + " channels fine: more work when folding");
        console.say(
                finding.loss().isLossless()
                        ? "costs nothing: every value is held without loss"
                        : "costs: largest rounding distance "
                                + Figures.shortest(finding.loss().largestDistance()) + " steps, "
                                + Words.share(finding.loss().shareHeld()) + " of records held without loss");
    }
}
