package turnstone.night;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Collection;
import java.util.List;
import java.util.Optional;
import turnstone.decide.Model;
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
import turnstone.trial.Judge;
import turnstone.trial.NightFacts;
import turnstone.trial.Side;
import turnstone.trial.TrialForm;
import turnstone.trial.TrialResult;
import turnstone.trial.TrialShowing;
import turnstone.trial.Verdict;

/**
 * Tries a recipe on a day's records: made from the days before that day, against the recipe and days of what is in service, both re-made
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

    /** Runs the trial; nothing is written. */
    public static Tried run(Plant plant, Ledger ledger, Day day, Contest contest, Progress progress) {
        DayEntry posted = ledger.day(day.day()).orElseThrow();
        Collection<ShowingSums> showings = ledger.showings(posted).values();
        TrialResult.Builder result = TrialResult.of(
                        contest.candidate().fingerprint(), contest.inService().map(Model::fingerprint))
                .showings(trialShowings(day.day(), showings))
                .facts(facts(posted, contest.candidate()));
        List<DayEntry> before =
                Window.before(ledger, day.day(), contest.recipe().window_days());
        Optional<String> obstacle = obstacle(day.day(), before, contest.inService());
        if (obstacle.isPresent()) {
            plant.materialNames().forEach(material -> result.notTried(material, obstacle.get()));
            return judged(plant, result.build(), 0);
        }
        progress.phase("re-make both sides without each tray group and machine");
        TrialPairs pairs = pairs(plant, ledger, before, contest, showings);
        pairs.seenWhole().forEach(result::oneGroupOnly);
        pairs.oneMachineOnly().forEach(result::oneMachineOnly);
        progress.done("re-made " + Words.number(pairs.models().size()) + " pairs of models");
        progress.phase("trial of " + day.day(), day.source().rows());
        TrialTallies tallies = TrialJob.run(day.source(), day.intake(), pairs.models(), QUARANTINE_KEPT);
        for (TrialForm form : TrialForm.values()) {
            result.tally(form, Side.CANDIDATE, tallies.tally(form, Side.CANDIDATE));
            if (contest.inService().isPresent()) {
                result.tally(form, Side.IN_SERVICE, tallies.tally(form, Side.IN_SERVICE));
            }
        }
        progress.done("tried on "
                + Words.number(tallies.counts().accepted() + tallies.counts().noSignal()) + " records of " + day.day()
                + " that neither side has seen");
        return judged(plant, result.build(), pairs.models().size());
    }

    private static TrialPairs pairs(
            Plant plant, Ledger ledger, List<DayEntry> before, Contest contest, Collection<ShowingSums> showings) {
        ModelMaker maker = new ModelMaker(plant.materialNames(), plant.head(), plant.countScale());
        TrialPairs.Maker candidate = new TrialPairs.Maker(contest.recipe(), WindowSums.read(ledger, before));
        Optional<TrialPairs.Maker> inService = contest.inService()
                .map(model -> new TrialPairs.Maker(
                        Recipe.fromJson(model.recipe().orElseThrow(), "model " + model.fingerprint()),
                        WindowSums.read(ledger, Window.of(ledger, model))));
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
