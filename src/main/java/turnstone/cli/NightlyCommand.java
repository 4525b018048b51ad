package turnstone.cli;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.nio.file.Path;
import java.time.Clock;
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
import turnstone.ledger.DayCounts;
import turnstone.ledger.Ledger;
import turnstone.night.Day;
import turnstone.night.Night;
import turnstone.night.Places;
import turnstone.night.PostStep;
import turnstone.night.SampleNight;
import turnstone.plant.Plant;
import turnstone.spark.Session;
import turnstone.spark.SourceDays;
import turnstone.trial.Decision;

/** {@code nightly}: the whole night. */
@Command(
        name = "nightly",
        description = "Runs the night: post, refit, trial, verdict, project the day, summary.",
        footer = {
            "",
            "Examples: turnstone nightly --plant plant.yaml",
            "          turnstone nightly --plant plant.yaml --day 2026-03-14 --master spark://host:7077",
            "          turnstone nightly --sample"
        })
final class NightlyCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Option(names = "--plant", paramLabel = "FILE", description = "the plant file")
    Path plant;

    @Option(
            names = "--day",
            paramLabel = "DAY",
            converter = DayOption.class,
            description = "the day (default: the newest day of the source that is not posted)")
    LocalDate day;

    @Option(
            names = "--sample",
            description = "make the invented plant under work/sample, post its earlier nights, and run its last night")
    boolean sample;

    @Option(
            names = "--dry-run",
            description = "find, fold and count the day's records; post, refit and release nothing")
    boolean dryRun;

    @Option(
            names = "--hold-exit",
            paramLabel = "CODE",
            description = "exit code where the verdict is hold (default: 0, for a held night is a normal one)")
    int holdExit;

    NightlyCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        if (sample == (plant != null)) {
            throw Fault.usage("say which plant: either --plant FILE or --sample");
        }
        try (Session session = Engine.open("nightly", console)) {
            Plant file;
            LocalDate date;
            if (sample) {
                SampleNight prepared = SampleNight.prepare(
                        session, Home.folder().resolve("work").resolve("sample"), console.talk(), Clock.systemUTC());
                file = prepared.plant();
                date = day != null ? day : prepared.lastNight();
            } else {
                file = Plant.read(plant);
                Optional<LocalDate> chosen = day != null ? Optional.of(day) : newestNotPosted(session, file);
                if (chosen.isEmpty()) {
                    nothingToDo();
                    return 0;
                }
                date = chosen.get();
            }
            Night night = new Night(file, session, console.talk(), Clock.systemUTC());
            return dryRun ? look(night, file, date) : run(night, file, date);
        }
    }

    private Optional<LocalDate> newestNotPosted(Session session, Plant file) {
        console.talk().phase("look for days");
        List<LocalDate> days = SourceDays.of(session, file);
        if (days.isEmpty()) {
            throw Fault.input("the source has no day")
                    .at(file.records().path())
                    .remedy("check the path in the plant file");
        }
        Ledger ledger = Places.ledger(file);
        Set<LocalDate> posted =
                Set.copyOf(ledger.days().stream().map(entry -> entry.day()).toList());
        Optional<LocalDate> newest =
                days.stream().filter(candidate -> !posted.contains(candidate)).reduce((earlier, later) -> later);
        console.talk()
                .done(days.size() + " days in the source, " + posted.size() + " posted"
                        + newest.map(found -> "; the newest that is not: " + found)
                                .orElse(""));
        return newest;
    }

    private int look(Night night, Plant file, LocalDate date) {
        Day found = night.open(date, Set.of());
        PostStep.Folded folded = night.fold(found, Set.of(), Optional.empty());
        console.talk().done("folded " + date);
        Ledger ledger = Places.ledger(file);
        if (common.json) {
            console.json(lookedAt(ledger, folded, date));
            return 0;
        }
        console.say("dry run: nothing was posted, refitted or released");
        console.say(Night.counts(folded));
        console.say(folded.draft().moments().showings().size() + " showings, "
                + folded.draft().moments().moments().size() + " sums of "
                + file.countScale().channels() + " channels");
        console.say(ledger.day(date)
                .map(entry -> date + " is posted already, revision " + entry.revision())
                .orElse(date + " would be posted as a new day"));
        console.say("then: refit from up to " + file.refit().window_days() + " days, trial, verdict"
                + (file.project().write() == turnstone.plant.ProjectSpec.Write.ON ? ", projection of the day" : ""));
        return 0;
    }

    private static ObjectNode lookedAt(Ledger ledger, PostStep.Folded folded, LocalDate date) {
        DayCounts counts = folded.draft().counts();
        ObjectNode node = Json.object()
                .put("dryRun", true)
                .put("day", date.toString())
                .put("read", counts.read())
                .put("accepted", counts.accepted())
                .put("noSignal", counts.noSignal());
        ObjectNode quarantined = node.putObject("quarantined");
        counts.quarantined().forEach(quarantined::put);
        return node.put("showings", folded.draft().moments().showings().size())
                .put(
                        "postedRevision",
                        ledger.day(date).map(entry -> entry.revision()).orElse(0));
    }

    private void nothingToDo() {
        if (common.json) {
            ObjectNode node = Json.object();
            node.putNull("day");
            console.json(node);
            return;
        }
        console.say("every day of the source is posted already; name one with --day to run it again");
    }

    private int run(Night night, Plant file, LocalDate date) {
        Night.Result result = night.run(date);
        if (common.json) {
            ObjectNode node = Json.object()
                    .put("run", result.run().path().toString())
                    .put("day", date.toString())
                    .put("momentsFingerprint", result.entry().momentsFingerprint())
                    .put("candidate", result.candidate().fingerprint());
            node.set("verdict", result.verdict().json());
            console.json(node);
        } else {
            NightPage.of(file, result).forEach(console::say);
        }
        return result.verdict().decision() == Decision.HOLD ? holdExit : 0;
    }
}
