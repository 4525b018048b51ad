package turnstone.night;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Collection;
import java.util.Comparator;
import java.util.EnumMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.TreeMap;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.ledger.DayCounts;
import turnstone.ledger.DayEntry;
import turnstone.ledger.Ledger;
import turnstone.ledger.ShowingSums;
import turnstone.measure.QuarantineReason;
import turnstone.plant.Guard;
import turnstone.plant.Plant;
import turnstone.refit.ModelMaker;
import turnstone.refit.Recipe;
import turnstone.refit.Window;
import turnstone.refit.WindowSums;
import turnstone.spark.TrialJob;
import turnstone.spark.TrialTallies;
import turnstone.trial.EjectScore;
import turnstone.trial.Judge;
import turnstone.trial.NightFacts;
import turnstone.trial.ScoreHistogram;
import turnstone.trial.Side;
import turnstone.trial.TrialForm;
import turnstone.trial.TrialResult;
import turnstone.trial.TrialShowing;
import turnstone.trial.TrialTally;
import turnstone.trial.Verdict;

/**
 * Tries a recipe forward in time, on the newest days that neither side has seen: for each day made from the days before it, against the recipe and days of what is in service, both re-made
 * without the tray group of the record being judged, and in a second form without its instrument as well.
 */
public final class TrialStep {
    private static final int QUARANTINE_KEPT = 0;

    private TrialStep() {}

    /**
     * A trial and its verdict.
     *
     * @param result tallies by form and side
     * @param verdict release or hold
     * @param models models that were re-made for it, pairs in both forms
     */
    public record Tried(TrialResult result, Verdict verdict, int models) {}

    /**
     * What is tried.
     *
     * @param recipe the candidate's
     * @param candidate the model that a release would put in service: the recipe on the window that ends with the day
     * @param inService what is in service, if anything
     */
    public record Contest(Recipe recipe, Model candidate, Optional<Model> inService) {}

    /** Finds the records of a day that is posted already, less what was left out of it. */
    @FunctionalInterface
    public interface Opener {
        /** The day of this entry; empty where its records are no longer in the source. */
        Optional<Day> open(DayEntry posted);
    }

    /**
     * Runs the trial forward in time: each of the newest days that neither side has seen is judged by the candidate's recipe on the days
     * before it. Nothing is written.
     *
     * @param day the newest of them
     * @param earlier finds the days before it
     */
    public static Tried run(Plant plant, Ledger ledger, Day day, Contest contest, Opener earlier, Progress progress) {
        TrialResult.Builder result = TrialResult.of(
                        contest.candidate().fingerprint(), contest.inService().map(Model::fingerprint))
                .facts(facts(ledger.day(day.day()).orElseThrow(), contest.candidate()));
        List<DayEntry> before =
                Window.before(ledger, day.day(), contest.recipe().window_days());
        Optional<String> obstacle = obstacle(day.day(), before, contest.inService());
        if (obstacle.isPresent()) {
            DayEntry posted = ledger.day(day.day()).orElseThrow();
            result.showings(trialShowings(day.day(), ledger.showings(posted).values()));
            plant.materialNames().forEach(material -> result.notTried(material, obstacle.get()));
            return judged(plant, result.build(), 0);
        }
        Optional<TrialPairs.Maker> inService = contest.inService()
                .map(model -> new TrialPairs.Maker(
                        Recipe.fromJson(model.recipe().orElseThrow(), "model " + model.fingerprint()),
                        WindowSums.read(ledger, Window.of(ledger, model))));
        Map<TrialForm, Map<Side, TrialTally>> sums = new EnumMap<>(TrialForm.class);
        Map<String, Map<Side, ScoreHistogram>> scores = new TreeMap<>();
        Map<String, Set<String>> ejected = ejected(plant);
        int models = 0;
        for (DayEntry posted : judgedDays(plant, ledger, day.day(), contest.inService())) {
            Optional<Day> found = posted.day().equals(day.day()) ? Optional.of(day) : earlier.open(posted);
            if (found.isEmpty()) {
                continue;
            }
            Collection<ShowingSums> showings = ledger.showings(posted).values();
            result.showings(trialShowings(posted.day(), showings));
            TrialPairs pairs = pairs(plant, ledger, posted.day(), contest.recipe(), inService, showings, progress);
            pairs.seenWhole().forEach(result::oneGroupOnly);
            pairs.oneMachineOnly().forEach(result::oneMachineOnly);
            models += pairs.models().size();
            TrialTallies tallies = tallies(found.get(), pairs, ejected, progress);
            requirePosted(posted, tallies);
            add(sums, tallies, contest.inService());
            addScores(scores, tallies, ejected.keySet());
        }
        sums.forEach((form, sides) -> sides.forEach((side, tally) -> result.tally(form, side, tally)));
        scores.forEach((duty, sides) -> sides.forEach((side, histogram) -> {
            if (histogram.records() > 0) {
                result.scores(duty, TrialForm.THIS_FLEET, side, histogram);
            }
        }));
        return judged(plant, result.build(), models);
    }

    /** The newest posted days up to this one that neither side has seen: as many as the plant's duties want; one where there is nothing to compare. */
    private static List<DayEntry> judgedDays(Plant plant, Ledger ledger, LocalDate last, Optional<Model> inService) {
        int wanted = inService.isEmpty()
                ? 1
                : plant.duties().stream()
                        .mapToInt(duty -> duty.terms().gain().days())
                        .max()
                        .orElse(1);
        Optional<LocalDate> seen = inService.flatMap(model -> model.madeFrom().days().stream()
                .map(made -> LocalDate.parse(made.day()))
                .max(Comparator.naturalOrder()));
        List<DayEntry> posted = ledger.days();
        List<DayEntry> unseen = posted.stream()
                .skip(1)
                .filter(entry -> !entry.day().isAfter(last))
                .filter(entry -> seen.isEmpty() || entry.day().isAfter(seen.get()))
                .toList();
        return unseen.subList(Math.max(0, unseen.size() - wanted), unseen.size());
    }

    /** What is ejected by each duty that fixes a figure: their gain is taken from scores. */
    private static Map<String, Set<String>> ejected(Plant plant) {
        Map<String, Set<String>> ejected = new TreeMap<>();
        plant.duties().stream()
                .filter(duty -> duty.terms().required().isPresent())
                .forEach(duty -> ejected.put(duty.name(), EjectScore.ejected(duty, plant.materialNames())));
        return ejected;
    }

    private static void addScores(
            Map<String, Map<Side, ScoreHistogram>> scores, TrialTallies tallies, Set<String> duties) {
        for (String duty : duties) {
            Map<Side, ScoreHistogram> sides = scores.computeIfAbsent(duty, name -> new EnumMap<>(Side.class));
            for (Side side : Side.values()) {
                sides.computeIfAbsent(side, s -> ScoreHistogram.empty()).merge(tallies.scores(duty, side));
            }
        }
    }

    /** A day is judged on the records that were posted, not on what its files hold by now. */
    private static void requirePosted(DayEntry posted, TrialTallies tallies) {
        long accepted = tallies.counts().accepted();
        long noSignal = tallies.counts().noSignal();
        if (accepted != posted.counts().accepted()
                || noSignal != posted.counts().noSignal()) {
            throw Fault.input("the records of " + posted.day() + " are no longer those that were posted")
                    .found(accepted + " accepted, " + noSignal + " no signal")
                    .expected(posted.counts().accepted() + " accepted, "
                            + posted.counts().noSignal() + " no signal")
                    .remedy("put the files back as they were, or post the day again with --replace");
        }
    }

    private static TrialTallies tallies(
            Day day, TrialPairs pairs, Map<String, Set<String>> ejected, Progress progress) {
        progress.phase("trial of " + day.day(), day.source().rows());
        TrialTallies tallies = TrialJob.run(day.source(), day.intake(), pairs.models(), ejected, QUARANTINE_KEPT);
        progress.done("tried on "
                + Words.number(tallies.counts().accepted() + tallies.counts().noSignal()) + " records of " + day.day()
                + " that neither side has seen, by "
                + Words.number(pairs.models().size()) + " pairs of models");
        return tallies;
    }

    private static void add(
            Map<TrialForm, Map<Side, TrialTally>> sums, TrialTallies tallies, Optional<Model> inService) {
        for (TrialForm form : TrialForm.values()) {
            Map<Side, TrialTally> sides = sums.computeIfAbsent(form, f -> new EnumMap<>(Side.class));
            for (Side side : Side.values()) {
                if (side == Side.CANDIDATE || inService.isPresent()) {
                    sides.computeIfAbsent(side, s -> TrialTally.empty()).merge(tallies.tally(form, side));
                }
            }
        }
    }

    private static TrialPairs pairs(
            Plant plant,
            Ledger ledger,
            LocalDate day,
            Recipe recipe,
            Optional<TrialPairs.Maker> inService,
            Collection<ShowingSums> showings,
            Progress progress) {
        progress.phase("re-make both sides without each tray group and machine, for " + day);
        ModelMaker maker = new ModelMaker(plant.materialNames(), plant.head(), plant.countScale());
        List<DayEntry> before = Window.before(ledger, day, recipe.window_days());
        TrialPairs.Maker candidate = new TrialPairs.Maker(recipe, WindowSums.read(ledger, before));
        return TrialPairs.make(maker, candidate, inService, showings);
    }

    private static Tried judged(Plant plant, TrialResult result, int models) {
        return new Tried(result, Judge.verdict(result, plant.duties()), models);
    }

    /** Why the day can't serve for a trial at all. */
    private static Optional<String> obstacle(LocalDate day, List<DayEntry> before, Optional<Model> inService) {
        if (before.isEmpty()) {
            return Optional.of(
                    "no day before " + day + " is posted, so there is nothing to try on it; post an earlier day");
        }
        return inService
                .flatMap(model -> model.madeFrom().days().stream()
                        .map(made -> LocalDate.parse(made.day()))
                        .filter(made -> !made.isBefore(day))
                        .findFirst())
                .map(seen -> "what is in service was made from " + seen + ", which is not before " + day
                        + "; only a later day can judge it");
    }

    /** What guards ask for that the day and the candidate say. */
    private static NightFacts facts(DayEntry posted, Model candidate) {
        DayCounts counts = posted.counts();
        NightFacts facts = NightFacts.none().with(Guard.Kind.RECIPROCAL_CONDITION, candidate.reciprocalCondition());
        if (counts.read() == 0) {
            return facts;
        }
        long stale = counts.quarantined().getOrDefault(QuarantineReason.STALE_WHITE.label(), 0L);
        double read = counts.read();
        return facts.with(Guard.Kind.QUARANTINED_SHARE, counts.quarantinedTotal() / read)
                .with(Guard.Kind.STALE_WHITE_SHARE, stale / read);
    }

    private static List<TrialShowing> trialShowings(LocalDate day, Collection<ShowingSums> showings) {
        List<TrialShowing> list = new ArrayList<>();
        for (ShowingSums showing : showings) {
            list.add(new TrialShowing(
                    showing.showing(),
                    day,
                    showing.sorter(),
                    showing.instrument(),
                    showing.tray(),
                    showing.trayGroup(),
                    showing.material()));
        }
        return list;
    }
}
