package turnstone.cli;

import java.time.Clock;
import java.time.LocalDate;
import java.util.Optional;
import java.util.Set;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.ledger.DayEntry;
import turnstone.ledger.Ledger;
import turnstone.night.Day;
import turnstone.night.Night;
import turnstone.night.Places;
import turnstone.night.RefitStep;
import turnstone.night.RunFolder;
import turnstone.night.TrialFiles;
import turnstone.night.TrialStep;
import turnstone.night.VerdictRemarks;
import turnstone.plant.Plant;
import turnstone.refit.Recipe;
import turnstone.shelf.Shelf;
import turnstone.spark.Session;

/** {@code trial}: a candidate against what is in service. */
@Command(
        name = "trial",
        description = "Tries a candidate against what is in service, on a posted day that neither has seen.",
        footer = {"", "Example: turnstone trial --plant plant.yaml --day 2026-03-14 --candidate 3f9c21ab"})
final class TrialCommand implements Callable<Integer> {
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
            description = "the posted day")
    LocalDate day;

    @Option(
            names = "--candidate",
            paramLabel = "MODEL",
            required = true,
            description =
                    "the first 8 or more digits of a model on the shelf; its recipe is tried, made from the days before")
    String candidate;

    TrialCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Plant file = plant.read();
        Ledger ledger = Places.ledger(file);
        Shelf shelf = Places.shelf(file);
        Model model = Models.find(candidate, plant.file);
        Recipe recipe = Recipe.fromJson(
                model.recipe()
                        .orElseThrow(() -> Fault.input("this model was made from a table, not from a ledger")
                                .at("model " + candidate)),
                "model " + candidate);
        DayEntry posted = ledger.day(day)
                .orElseThrow(() -> Fault.input(day + " is not posted")
                        .at(ledger.describe())
                        .remedy("post it first"));
        Optional<Model> inService = RefitStep.inService(file, shelf);
        try (Session session = Engine.open("trial", console)) {
            Night night = new Night(file, session, console.talk(), Clock.systemUTC());
            Day found = night.open(day, Set.copyOf(posted.without()));
            TrialStep.Contest contest = new TrialStep.Contest(recipe, model, inService);
            TrialStep.Tried tried = TrialStep.run(file, ledger, found, contest, night::openPosted, console.talk());
            RunFolder run = RunFolder.next(Places.runs(file), day);
            TrialFiles.write(run, tried.result());
            String page = VerdictRemarks.page(file, tried.verdict());
            run.write("verdict.txt", page);
            run.write("verdict.json", tried.verdict().json());
            if (common.json) {
                console.json(tried.verdict().json());
            } else {
                console.say(page);
                console.say("files of this run: " + run.path());
                console.say("verdict: " + tried.verdict().decision().label());
            }
        }
        return 0;
    }
}
