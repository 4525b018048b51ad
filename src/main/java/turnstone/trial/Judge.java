package turnstone.trial;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import turnstone.plant.Duty;
import turnstone.plant.Requirement;

/**
 * Holds a trial against the requirements of the plant's duties.
 *
 * <p>Each requirement takes its figure in the form that it names ({@code tray} not seen, or {@code machine} not seen as well), at its point or
 * at the lower end of its two-sided interval. With something in service {@link ComparisonRule} is added to every duty. What cannot be judged
 * is not met, and says what would let it be judged.
 */
public final class Judge {
    private static final double REPORTED_CONFIDENCE = 0.90;

    private final TrialResult trial;
    private final ComparisonRule comparison;
    private final Estimator estimator;

    private Judge(TrialResult trial, ComparisonRule comparison) {
        this.trial = trial;
        this.comparison = comparison;
        this.estimator = new Estimator(trial.showings());
    }

    /** The verdict on these duties. */
    public static Verdict verdict(TrialResult trial, List<Duty> duties, ComparisonRule comparison) {
        Judge judge = new Judge(trial, comparison);
        List<DutyVerdict> verdicts = duties.stream().map(judge::judge).toList();
        boolean release =
                !verdicts.isEmpty() && verdicts.stream().allMatch(verdict -> verdict.decision() == Decision.RELEASE);
        return new Verdict(
                release ? Decision.RELEASE : Decision.HOLD,
                mainReason(verdicts),
                verdicts,
                trial.days(),
                trial.showings().size(),
                trial.candidate(),
                trial.inService());
    }

    private static String mainReason(List<DutyVerdict> verdicts) {
        if (verdicts.isEmpty()) {
            return "the plant file names no duty, so there is nothing to release for; write one to have it judged";
        }
        DutyVerdict main = verdicts.stream()
                .filter(verdict -> verdict.decision() == Decision.HOLD)
                .findFirst()
                .orElse(verdicts.get(0));
        return main.name() + ": " + main.mainReason();
    }

    private DutyVerdict judge(Duty duty) {
        List<RequirementResult> results = new ArrayList<>();
        for (Requirement requirement : duty.requirements()) {
            results.add(judge(duty, requirement));
        }
        if (trial.inService().isPresent()) {
            results.add(compare(duty));
        }
        return DutyVerdict.of(duty.name(), results, figures(duty));
    }

    private RequirementResult judge(Duty duty, Requirement requirement) {
        String name = requirement.name();
        String bound = requirement.bound() == Requirement.Bound.POINT ? "point" : lowerEnd(requirement.confidence());
        TrialForm form =
                requirement.unseen() == Requirement.Unseen.TRAY ? TrialForm.THIS_FLEET : TrialForm.MACHINE_NOT_SEEN;
        Optional<String> obstacle = obstacle(duty, form);
        Optional<TrialTally> tally = trial.tally(form, Side.CANDIDATE);
        if (obstacle.isPresent() || tally.isEmpty()) {
            String why = obstacle.orElse("the form \"" + form.label() + "\" was not run; run it to have this judged");
            return RequirementResult.notJudged(name, requirement.least(), bound, why);
        }
        Estimate estimate = estimator.estimate(requirement.figure(), duty, tally.get(), requirement.confidence());
        OptionalDouble found = requirement.bound() == Requirement.Bound.POINT ? estimate.point() : estimate.lower();
        return found.isPresent()
                ? RequirementResult.judged(name, found.getAsDouble(), requirement.least(), bound)
                : RequirementResult.notJudged(name, requirement.least(), bound, estimate.note());
    }

    private RequirementResult compare(Duty duty) {
        String bound = lowerEnd(comparison.confidence());
        double required = 0 - comparison.allowedLoss();
        Optional<String> obstacle = obstacle(duty, TrialForm.THIS_FLEET);
        Optional<TrialTally> ours = trial.tally(TrialForm.THIS_FLEET, Side.CANDIDATE);
        Optional<TrialTally> theirs = trial.tally(TrialForm.THIS_FLEET, Side.IN_SERVICE);
        if (obstacle.isPresent() || ours.isEmpty() || theirs.isEmpty()) {
            String why = obstacle.orElse("the two sides were not both run; run both to have this judged");
            return RequirementResult.notJudged(ComparisonRule.NAME, required, bound, why);
        }
        Estimate estimate = estimator.difference(
                Requirement.Figure.DECISION_RECOVERY, duty, ours.get(), theirs.get(), comparison.confidence());
        return estimate.lower().isPresent()
                ? RequirementResult.judged(ComparisonRule.NAME, estimate.lower().getAsDouble(), required, bound)
                : RequirementResult.notJudged(ComparisonRule.NAME, required, bound, estimate.note());
    }

    /** Why no figure of this duty can be judged in this form: a material of its infeed that was not tried. */
    private Optional<String> obstacle(Duty duty, TrialForm form) {
        return trial.notTried(form).entrySet().stream()
                .filter(entry -> duty.infeedMix().getOrDefault(entry.getKey(), 0.0) > 0)
                .min(Map.Entry.comparingByKey())
                .map(Map.Entry::getValue);
    }

    private List<FigureLine> figures(Duty duty) {
        List<FigureLine> lines = new ArrayList<>();
        for (TrialForm form : TrialForm.values()) {
            for (Side side : Side.values()) {
                Optional<TrialTally> tally = trial.tally(form, side);
                if (tally.isPresent()) {
                    for (Requirement.Figure figure : Requirement.Figure.values()) {
                        Estimate estimate = estimator.estimate(figure, duty, tally.get(), REPORTED_CONFIDENCE);
                        lines.add(new FigureLine(form, side, figure, estimate));
                    }
                }
            }
        }
        return lines;
    }

    private static String lowerEnd(double confidence) {
        return String.format(Locale.ROOT, "lower end of the %.4g %% interval", 100 * confidence)
                .replaceFirst("\\.?0+ %", " %");
    }
}
