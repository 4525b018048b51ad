package turnstone.cli;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.time.Clock;
import java.time.LocalDate;
import java.util.Optional;
import java.util.Set;
import java.util.TreeSet;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import turnstone.json.Json;
import turnstone.ledger.DayEntry;
import turnstone.ledger.Ledger;
import turnstone.ledger.PostOutcome;
import turnstone.ledger.Replace;
import turnstone.night.Day;
import turnstone.night.Night;
import turnstone.night.Places;
import turnstone.night.PostStep;
import turnstone.night.RunFolder;
import turnstone.night.Words;
import turnstone.plant.Plant;
import turnstone.spark.Session;

/** {@code post}: folds a day's records into the ledger. */
@Command(
        name = "post",
        description = "Folds the records of a day into the ledger.",
        footer = {
            "",
            "Examples: turnstone post --plant plant.yaml --day 2026-03-14",
            "          turnstone post --plant plant.yaml --day 2026-03-14 --without S-20260314-017"
        })
final class PostCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    @Option(
            names = "--day",
            paramLabel = "DAY",
            required = true,
            converter = DayOption.class,
            description = "the day to post")
    LocalDate day;

    @Option(
            names = "--without",
            paramLabel = "SHOWING",
            description =
                    "leave out a mislabelled showing; may be given several times; makes a new revision of a posted day")
    Set<String> without = new TreeSet<>();

    @Option(names = "--replace", description = "post a new revision where the day holds other records")
    boolean replace;

    PostCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Plant file = plant.read();
        Ledger ledger = Places.ledger(file);
        try (Session session = Engine.open("post", console)) {
            Night night = new Night(file, session, console.talk(), Clock.systemUTC());
            Day found = night.open(day, without);
            PostStep.Folded folded = night.fold(found, without, Optional.of(RunFolder.next(Places.runs(file), day)));
            PostStep.requireLeftOut(folded, without);
            Replace how = replace || !without.isEmpty() ? Replace.YES : Replace.NO;
            PostStep.Posted posted = PostStep.post(ledger, folded.draft(), how);
            console.talk().done("folded " + day);
            print(folded, posted);
        }
        return 0;
    }

    private void print(PostStep.Folded folded, PostStep.Posted posted) {
        DayEntry entry = posted.entry();
        if (common.json) {
            ObjectNode node = Json.object()
                    .put("day", entry.day().toString())
                    .put("revision", entry.revision())
                    .put("outcome", posted.outcome() == PostOutcome.POSTED ? "posted" : "same records")
                    .put("fingerprint", entry.fingerprint())
                    .put("read", entry.counts().read())
                    .put("accepted", entry.counts().accepted())
                    .put("noSignal", entry.counts().noSignal());
            ObjectNode quarantined = node.putObject("quarantined");
            entry.counts().quarantined().forEach(quarantined::put);
            console.json(node);
            return;
        }
        console.say((posted.outcome() == PostOutcome.POSTED ? "posted " : "already posted with the same records: ")
                + entry.day() + " revision " + entry.revision() + ", fingerprint "
                + Words.shortened(entry.fingerprint()));
        console.say(Night.counts(folded));
    }
}
