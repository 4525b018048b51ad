package turnstone.trial;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.OptionalInt;
import java.util.Set;
import java.util.TreeSet;
import java.util.stream.Collectors;
import turnstone.plant.Duty;
import turnstone.plant.Guard;
import turnstone.plant.PpmLimit;
import turnstone.plant.Requirement;

/** Holds a trial against what one duty demands. */
final class DutyJudge {
    private static final double REPORTED_CONFIDENCE = 0.90;

    private final TrialResult trial;
    private final Duty duty;
    private final Map<String, TrialShowing> showings = new HashMap<>();
    private final Map<String, TrialShowing> allShowings = new HashMap<>();
    private final Set<String> tonight;

    DutyJudge(TrialResult trial, Duty duty) {
        this.trial = trial;
        this.duty = duty;
        trial.showings().forEach(showing -> showings.put(showing.showing(), showing));
        allShowings.putAll(showings);
        LocalDate newest =
                trial.days().isEmpty() ? null : trial.days().get(trial.days().size() - 1);
        tonight = trial.showings().stream()
                .filter(showing -> showing.day().equals(newest))
                .map(TrialShowing::showing)
                .collect(Collectors.toSet());
        trial.earlierShowings().forEach(showing -> allShowings.put(showing.showing(), showing));
    }

    DutyVerdict verdict() {
        List<RequirementResult> results = new ArrayList<>();
        duty.requirements().forEach(requirement -> results.add(absolute(requirement)));
        if (trial.inService().isPresent()) {
            results.add(gain());
        }
        duty.terms().guards().forEach(guard -> results.add(guard(guard)));
        List<PpmBound> bounds = new ArrayList<>();
        for (PpmLimit limit : duty.terms().limits()) {
            Optional<PpmBound> bound = bound(limit);
            bound.ifPresent(bounds::add);
            if (limit.use() == PpmLimit.Use.REQUIREMENT) {
                results.add(limit(limit, bound));
            }
        }
        return DutyVerdict.of(duty.name(), results, figures(), bounds, costs(), notes());
    }

    /** What one side sent on the newest day of the trial; the gain and the guards take all its days. */
    private Optional<Sendings> sendings(TrialForm form, Side side) {
        return sendingsOfAllDays(form, side).map(sendings -> sendings.onlyShowings(tonight));
    }

    /** At its cut where one was set on earlier days, else by the decision for the nearest material. */
    private Optional<Sendings> sendingsOfAllDays(TrialForm form, Side side) {
        OptionalInt cut = trial.cut(duty.name(), form, side);
        Optional<ScoreHistogram> scores = trial.scores(duty.name(), form, side);
        if (cut.isPresent() && scores.isPresent()) {
            return Optional.of(Sendings.of(duty, scores.get(), cut.getAsInt(), showings));
        }
        return trial.tally(form, side).map(tally -> Sendings.of(duty, tally, showings));
    }

    /** Why no figure of this duty can be judged for this fleet. */
    private Optional<String> obstacle() {
        return obstacle(TrialForm.THIS_FLEET);
    }

    /** Why no figure of this duty can be judged in this form: a material of its infeed that was not tried. */
    private Optional<String> obstacle(TrialForm form) {
        return trial.notTried(form).entrySet().stream()
                .filter(entry -> duty.infeedMix().getOrDefault(entry.getKey(), 0.0) > 0)
                .min(Map.Entry.comparingByKey())
                .map(Map.Entry::getValue);
    }

    private RequirementResult absolute(Requirement requirement) {
        String name = requirement.name();
        boolean point = requirement.bound() == Requirement.Bound.POINT;
        String bound = point ? "point" : "lower end of the " + Judge.percent(requirement.confidence()) + " % interval";
        TrialForm form =
                requirement.unseen() == Requirement.Unseen.TRAY ? TrialForm.THIS_FLEET : TrialForm.MACHINE_NOT_SEEN;
        Optional<String> obstacle = obstacle(form);
        Optional<Sendings> sendings = obstacle.isPresent() ? Optional.empty() : sendings(form, Side.CANDIDATE);
        String why = obstacle.orElse("the form \"" + form.label() + "\" was not run; run it to have this judged");
        if (sendings.isPresent()) {
            Requirement.Reach reach = point ? Requirement.Reach.THIS_FLEET_TONIGHT : requirement.reach();
            Estimate estimate =
                    Estimator.estimate(requirement.figure(), reach, sendings.get(), requirement.confidence());
            OptionalDouble found = point ? estimate.point() : estimate.lower();
            if (found.isPresent()) {
                return RequirementResult.judged(
                        name,
                        found.getAsDouble(),
                        requirement.least(),
                        RequirementResult.Demand.AT_LEAST,
                        RequirementResult.Unit.SHARE,
                        bound,
                        "");
            }
            why = estimate.note();
        }
        return RequirementResult.notJudged(
                name, requirement.least(), RequirementResult.Demand.AT_LEAST, RequirementResult.Unit.SHARE, bound, why);
    }

    private RequirementResult gain() {
        Optional<Gain> gain = obstacle().isPresent() ? Optional.empty() : foundGain();
        String missing = duty.terms().required().isPresent() && bothTallies()
                ? "the duty fixes a figure, and scores were not binned; a trial that bins them lets it be judged"
                : "the two sides were not both run; run both to have this judged";
        if (gain.isPresent()) {
            return new GainJudge(duty.terms().gain(), gain.get()).result();
        }
        return RequirementResult.notJudged(
                GainJudge.name("decision recovery"),
                duty.terms().gain().above(),
                RequirementResult.Demand.ABOVE,
                RequirementResult.Unit.DIFFERENCE,
                GainJudge.bound(duty.terms().gain()),
                obstacle().orElse(missing));
    }

    private boolean bothTallies() {
        return trial.tally(TrialForm.THIS_FLEET, Side.CANDIDATE).isPresent()
                && trial.tally(TrialForm.THIS_FLEET, Side.IN_SERVICE).isPresent();
    }

    private Optional<Gain> foundGain() {
        Optional<ScoreHistogram> ours = trial.scores(duty.name(), TrialForm.THIS_FLEET, Side.CANDIDATE);
        Optional<ScoreHistogram> theirs = trial.scores(duty.name(), TrialForm.THIS_FLEET, Side.IN_SERVICE);
        if (ours.isPresent() && theirs.isPresent()) {
            return Optional.of(GainEstimator.ofScores(duty, ours.get(), theirs.get(), showings));
        }
        return bothTallies() && duty.terms().required().isEmpty()
                ? Optional.of(GainEstimator.ofTallies(
                        duty,
                        trial.tally(TrialForm.THIS_FLEET, Side.CANDIDATE).orElseThrow(),
                        trial.tally(TrialForm.THIS_FLEET, Side.IN_SERVICE).orElseThrow(),
                        showings))
                : Optional.empty();
    }

    private RequirementResult guard(Guard guard) {
        Sendings nothing = Sendings.of(duty, TrialTally.empty(), showings);
        Sendings ours = sendingsOfAllDays(TrialForm.THIS_FLEET, Side.CANDIDATE).orElse(nothing);
        Sendings theirs = trial.inService().isEmpty()
                ? null
                : sendingsOfAllDays(TrialForm.THIS_FLEET, Side.IN_SERVICE).orElse(nothing);
        return new GuardJudge(trial.facts(), ours, theirs).judge(guard);
    }

    private Optional<PpmBound> bound(PpmLimit limit) {
        Optional<TrialTally> tonight = trial.tally(TrialForm.THIS_FLEET, Side.CANDIDATE);
        if (obstacle().isPresent() || tonight.isEmpty() || trial.days().isEmpty()) {
            return Optional.empty();
        }
        LocalDate first = trial.days().get(trial.days().size() - 1).minusDays(PpmBound.MOST_DAYS - 1L);
        TrialTally pooled = TrialTally.empty();
        pooled.merge(tonight.get());
        trial.earlier()
                .ifPresent(earlier -> earlier.cells().forEach((cell, count) -> {
                    TrialShowing showing = allShowings.get(cell.showing());
                    if (showing != null && !showing.day().isBefore(first)) {
                        pooled.add(cell, count);
                    }
                }));
        Sendings all = Sendings.of(duty, pooled, allShowings);
        if (all.notShown().isPresent()) {
            return Optional.empty();
        }
        TreeSet<LocalDate> nights = new TreeSet<>();
        all.parts()
                .forEach(part -> part.showings()
                        .forEach(showing ->
                                nights.add(allShowings.get(showing.showing()).day())));
        return Optional.of(PpmBound.of(limit, all, nights.size()));
    }

    private RequirementResult limit(PpmLimit limit, Optional<PpmBound> bound) {
        String name = "limit: " + limit.material() + " in the product";
        String end = "one-sided " + Judge.percent(limit.confidence()) + " % upper bound";
        if (bound.isPresent() && bound.get().byRecords_ppm().isPresent()) {
            return RequirementResult.judged(
                    name,
                    bound.get().byRecords_ppm().getAsDouble(),
                    limit.most_ppm(),
                    RequirementResult.Demand.AT_MOST,
                    RequirementResult.Unit.PPM,
                    end,
                    bound.get().text());
        }
        return RequirementResult.notJudged(
                name,
                limit.most_ppm(),
                RequirementResult.Demand.AT_MOST,
                RequirementResult.Unit.PPM,
                end,
                bound.map(PpmBound::text)
                        .orElse("not every material of the infeed was tried; show each on the duty's sorters"));
    }

    private List<FigureLine> figures() {
        List<FigureLine> lines = new ArrayList<>();
        for (TrialForm form : TrialForm.values()) {
            for (Side side : Side.values()) {
                sendings(form, side).ifPresent(sendings -> {
                    for (Requirement.Reach reach : reaches(form)) {
                        for (Requirement.Figure figure : Requirement.Figure.values()) {
                            Estimate estimate = Estimator.estimate(figure, reach, sendings, REPORTED_CONFIDENCE);
                            lines.add(new FigureLine(form, side, figure, reach, estimate));
                        }
                    }
                });
            }
        }
        return lines;
    }

    /** Machines that were not shown anything are spoken for where models have not seen the machine. */
    private static List<Requirement.Reach> reaches(TrialForm form) {
        return form == TrialForm.THIS_FLEET
                ? List.of(Requirement.Reach.THIS_FLEET_TONIGHT)
                : List.of(Requirement.Reach.MACHINES_LIKE_THESE, Requirement.Reach.ONE_NEW_MACHINE);
    }

    /** Sorters of the duty that showed nothing: nothing is said of them. */
    private List<String> notes() {
        TreeSet<String> showed = new TreeSet<>();
        showings.values().forEach(showing -> showed.add(showing.sorter()));
        List<String> absent = duty.sorters().stream()
                .filter(sorter -> !showed.contains(sorter))
                .toList();
        if (absent.isEmpty() || showings.isEmpty()) {
            return List.of();
        }
        String half = 2 * absent.size() >= duty.sorters().size() ? "half of the duty's sorters or more: " : "";
        return List.of(
                half + "no showing on " + String.join(", ", absent) + "; nothing here speaks for what was not shown");
    }

    private List<CostLine> costs() {
        List<CostLine> lines = new ArrayList<>();
        duty.terms().costs().ifPresent(costs -> {
            for (Side side : Side.values()) {
                sendings(TrialForm.THIS_FLEET, side)
                        .filter(sendings -> sendings.notShown().isEmpty())
                        .ifPresent(sendings -> lines.add(CostLine.of(side, costs, sendings)));
            }
        });
        return lines;
    }
}
