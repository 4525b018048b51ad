package turnstone.night;

import java.nio.charset.StandardCharsets;
import java.time.Clock;
import java.time.LocalDate;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.TreeSet;
import turnstone.decide.Model;
import turnstone.decide.Projector;
import turnstone.json.Json;
import turnstone.ledger.DayEntry;
import turnstone.ledger.Ledger;
import turnstone.ledger.PostOutcome;
import turnstone.ledger.Replace;
import turnstone.plant.Plant;
import turnstone.plant.ProjectSpec;
import turnstone.plant.TableFormat;
import turnstone.refit.HeldOut;
import turnstone.refit.Recipe;
import turnstone.refit.Recipes;
import turnstone.refit.Window;
import turnstone.shelf.Shelf;
import turnstone.shelf.ShelfEntry;
import turnstone.shelf.VerdictReference;
import turnstone.spark.ProjectJob;
import turnstone.spark.ProjectResult;
import turnstone.spark.ProjectSettings;
import turnstone.spark.Session;
import turnstone.spark.SourceDays;
import turnstone.spark.TableSpec;
import turnstone.trial.Verdict;

/** The nightly sequence for one day: post, refit, trial, verdict, project. */
public final class Night {
    private static final String PROGRAM = "turnstone nightly";
    private static final double ALL = 1.0;

    private final Plant plant;
    private final Session session;
    private final Progress progress;
    private final Clock clock;

    /** A night of one plant on one engine. */
    public Night(Plant plant, Session session, Progress progress, Clock clock) {
        this.plant = plant;
        this.session = session;
        this.progress = progress;
        this.clock = clock;
    }

    /**
     * How a night ended.
     *
     * @param run the folder of the run
     * @param day the day
     * @param entry the day in the ledger
     * @param outcome whether this run posted it
     * @param candidate the model that was made
     * @param verdict release or hold
     * @param projected what the projection of the day counted, where the plant wants it
     * @param released the change of what is in service, where the plant lets the night make it and the verdict allows it
     */
    public record Result(
            RunFolder run,
            LocalDate day,
            DayEntry entry,
            PostOutcome outcome,
            Model candidate,
            Verdict verdict,
            Optional<ProjectResult> projected,
            Optional<ShelfEntry> released) {}

    /**
     * Runs the whole sequence. The verdict file is written last: a run that fails leaves none.
     *
     * @throws turnstone.fault.Fault where a step refuses or fails
     */
    public Result run(LocalDate date) {
        Ledger ledger = Places.ledger(plant);
        Shelf shelf = Places.shelf(plant);
        Optional<Model> inService = RefitStep.inService(plant, shelf);
        NightRelease release = NightRelease.prepare(plant, shelf, PROGRAM);
        RunFolder run = RunFolder.next(Places.runs(plant), date);
        RunRecord record = new RunRecord(clock, PROGRAM, plant.file().toString(), date.toString());
        record.put("engine", session.spark().version());
        record.put("master", session.spark().sparkContext().master());

        Set<String> without = leftOut(ledger, date);
        Day day = open(date, without);
        record.lap("find and count files");
        PostStep.Posted posted = post(ledger, day, without, run);
        record.lap("fold and post");

        Recipe recipe = Recipes.of(plant).get(0);
        Model candidate = refit(ledger, shelf, date, recipe, inService);
        record.lap("refit");

        TrialStep.Contest contest = new TrialStep.Contest(recipe, candidate, inService);
        TrialStep.Tried tried = TrialStep.run(plant, ledger, day, contest, this::openPosted, progress);
        record.lap("trial");
        Optional<ProjectResult> projected = project(day, candidate, run);
        record.lap("project");

        TrialFiles.write(run, tried.result());
        Verdict verdict = tried.verdict();
        run.write("verdict.txt", VerdictRemarks.page(plant, verdict));
        run.write("run.json", record.ended());
        byte[] content = Json.pretty(verdict.json());
        run.write("verdict.json", new String(content, StandardCharsets.UTF_8));
        VerdictReference reference =
                new VerdictReference(run.path("verdict.json").toString(), Json.sha256(content));
        Optional<ShelfEntry> released = release.make(verdict, reference, progress);
        return new Result(run, date, posted.entry(), posted.outcome(), candidate, verdict, projected, released);
    }

    /** Finds a day's files and references. */
    public Day open(LocalDate date, Set<String> without) {
        progress.phase("find records of " + date);
        Day day = Day.open(session, plant, date, without);
        progress.done("found " + Words.number(day.source().rows()) + " records of " + date + " in "
                + day.source().files().size() + " files");
        return day;
    }

    /** Finds the files of a posted day again, less what it was posted without; empty, with a remark, where they are no longer there. */
    public Optional<Day> openPosted(DayEntry posted) {
        if (!SourceDays.of(session, plant).contains(posted.day())) {
            progress.remark("the records of " + posted.day() + " are no longer in the source: that day is not judged");
            return Optional.empty();
        }
        return Optional.of(Day.open(session, plant, posted.day(), new TreeSet<>(posted.without())));
    }

    /** What a posted day was posted without stays out of every later run of that day. */
    private Set<String> leftOut(Ledger ledger, LocalDate date) {
        Set<String> without =
                ledger.day(date).map(entry -> new TreeSet<>(entry.without())).orElseGet(TreeSet::new);
        if (!without.isEmpty()) {
            progress.remark(date + " is posted without " + String.join(", ", without) + ", and run without it again");
        }
        return without;
    }

    private PostStep.Posted post(Ledger ledger, Day day, Set<String> without, RunFolder run) {
        PostStep.Folded folded = fold(day, without, Optional.of(run));
        PostStep.Posted posted = PostStep.post(ledger, folded.draft(), Replace.NO);
        progress.done(
                posted.outcome() == PostOutcome.POSTED
                        ? "posted " + day.day() + ": " + counts(folded)
                        : "already posted with the same records: " + day.day() + ", " + counts(folded));
        return posted;
    }

    /** Folds a day, writes what was quarantined, and refuses a day that is not sound. */
    public PostStep.Folded fold(Day day, Set<String> without, Optional<RunFolder> run) {
        progress.phase("fold " + day.day(), day.source().rows());
        PostStep.Folded folded = PostStep.fold(plant, day, without);
        run.ifPresent(
                folder -> folder.write("quarantine.csv", folded.fold().counts().quarantineCsv()));
        PostStep.requireSound(plant, day, folded.fold().counts());
        return folded;
    }

    /** {@code 24 817 read = 24 000 accepted + 700 no signal + 117 quarantined (…)}. */
    public static String counts(PostStep.Folded folded) {
        var counts = folded.draft().counts();
        return Words.number(counts.read()) + " read = " + Words.number(counts.accepted()) + " accepted + "
                + Words.number(counts.noSignal()) + " no signal + " + Words.number(counts.quarantinedTotal())
                + " quarantined"
                + (counts.quarantined().isEmpty() ? "" : " (" + PostStep.reasons(counts.quarantined()) + ")");
    }

    private Model refit(Ledger ledger, Shelf shelf, LocalDate date, Recipe recipe, Optional<Model> inService) {
        progress.phase("refit");
        List<DayEntry> window = Window.upTo(ledger, date, recipe.window_days());
        Model candidate = RefitStep.make(plant, ledger, window, List.of(recipe), HeldOut.NOTHING, inService)
                .get(0);
        shelf.put(candidate.json());
        progress.done("refit " + Words.shortened(candidate.fingerprint()) + " from " + window.size() + " days, "
                + Words.number(candidate.madeFrom().records()) + " records, "
                + Words.number(candidate.madeFrom().showings()) + " showings");
        candidate.remarks().forEach(progress::remark);
        return candidate;
    }

    private Optional<ProjectResult> project(Day day, Model candidate, RunFolder run) {
        if (plant.project().write() == ProjectSpec.Write.OFF) {
            return Optional.empty();
        }
        progress.phase("project " + day.day(), day.source().rows());
        TableSpec.Form form = plant.project().form() == TableFormat.CSV ? TableSpec.Form.CSV : TableSpec.Form.PARQUET;
        ProjectSettings settings =
                new ProjectSettings(run.path("projection").toUri().toString(), form, ALL, 0);
        ProjectResult projected = ProjectJob.run(day.source(), day.intake(), Projector.of(candidate), settings);
        progress.done("projected "
                + Words.number(
                        projected.counts().accepted() + projected.counts().noSignal()) + " records of " + day.day());
        return Optional.of(projected);
    }
}
