package turnstone.trial;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.HashSet;
import java.util.List;
import java.util.OptionalInt;
import java.util.Set;
import java.util.TreeSet;
import turnstone.plant.Duty;
import turnstone.plant.DutyTerms;
import turnstone.plant.Required;
import turnstone.plant.Requirement;

/**
 * The cut of one side, set on days before those that it is judged on, and kept.
 *
 * @param cut as {@link ScoreBins} counts them; empty where there is none
 * @param days that it was set on, ascending
 * @param note why there is none, or empty
 */
public record CutChoice(OptionalInt cut, List<LocalDate> days, String note) {
    /** Days without which no cut is set: one night alone would leave the true purity under the requirement on half of all plants. */
    public static final int LEAST_DAYS = 3;

    /** Two-sided, for a lower end that errs in one of ten. */
    private static final double CONFIDENCE = 0.80;

    /** Keeps a copy. */
    public CutChoice {
        days = List.copyOf(days);
    }

    /** From the showings of days before {@code judged}; only for a duty that fixes a figure. */
    public static CutChoice of(Duty duty, ScoreHistogram histogram, Iterable<TrialShowing> showings, LocalDate judged) {
        Required required = duty.terms()
                .required()
                .orElseThrow(() -> new IllegalArgumentException("duty " + duty.name() + " fixes no figure"));
        List<TrialShowing> earlier = new ArrayList<>();
        Set<String> ids = new HashSet<>();
        TreeSet<LocalDate> days = new TreeSet<>();
        for (TrialShowing showing : showings) {
            if (showing.day().isBefore(judged) && duty.sorters().contains(showing.sorter())) {
                earlier.add(showing);
                ids.add(showing.showing());
                days.add(showing.day());
            }
        }
        List<LocalDate> list = List.copyOf(days);
        if (list.size() < LEAST_DAYS) {
            return none(list, (LEAST_DAYS - list.size()) + " more days before " + judged + " are needed to set a cut");
        }
        ScoreHistogram before = histogram.only(ids::contains);
        FrontierSums sums = FrontierSums.empty(duty);
        before.rows().forEach((key, row) -> sums.add(key.truth(), row));
        if (!sums.notShown().isEmpty()) {
            return none(list, "no records of " + sums.notShown() + " before " + judged);
        }
        Frontier frontier = sums.frontier();
        boolean purity = required.figure() == Requirement.Figure.DECISION_PURITY;
        OptionalInt cut =
                purity ? frontier.loosestOfPurity(required.share()) : frontier.tightestOfRecovery(required.share());
        if (cut.isPresent() && duty.terms().cut() == DutyTerms.CutRule.LOWER) {
            cut = byLowerEnd(duty, before, earlier, cut.getAsInt());
        }
        return cut.isPresent()
                ? new CutChoice(cut, list, "")
                : none(list, "no cut reaches what the duty fixes on the days before " + judged);
    }

    /** From the cut of the point on, the first whose lower end reaches it too. */
    private static OptionalInt byLowerEnd(Duty duty, ScoreHistogram before, List<TrialShowing> earlier, int point) {
        Required required = duty.terms().required().orElseThrow();
        boolean tighten = required.figure() == Requirement.Figure.DECISION_PURITY;
        boolean upwards = tighten == (duty.productStream() == Duty.Stream.EJECTED);
        Estimator estimator = new Estimator(earlier);
        for (int cut = point; cut >= 0 && cut <= ScoreBins.COUNT; cut += upwards ? 1 : -1) {
            Estimate estimate = estimator.estimate(
                    required.figure(), Requirement.Reach.THIS_FLEET_TONIGHT, duty, before, cut, CONFIDENCE);
            if (estimate.lower().orElse(0) >= required.share()) {
                return OptionalInt.of(cut);
            }
        }
        return OptionalInt.empty();
    }

    private static CutChoice none(List<LocalDate> days, String why) {
        return new CutChoice(OptionalInt.empty(), days, why);
    }
}
