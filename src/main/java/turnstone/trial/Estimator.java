package turnstone.trial;

import java.util.HashMap;
import java.util.Map;
import turnstone.plant.Duty;
import turnstone.plant.Requirement;

/**
 * Decision purity and decision recovery of a duty from tallies or from scores at a cut, each with the interval of what it speaks for.
 *
 * <p>Figures are those of {@link MassFigure}; intervals those of {@link FleetError} and {@link SorterError}. Differences between the two sides
 * are taken showing by showing, on the figure's own scale, and speak for this fleet.
 */
public final class Estimator {
    private final Map<String, TrialShowing> showings;

    /** An estimator for tallies of these showings. */
    public Estimator(Iterable<TrialShowing> showings) {
        this.showings = new HashMap<>();
        for (TrialShowing showing : showings) {
            if (this.showings.put(showing.showing(), showing) != null) {
                throw new IllegalArgumentException("showing given twice: " + showing.showing());
            }
        }
    }

    /** The figure of one side, for this fleet tonight. */
    public Estimate estimate(Requirement.Figure figure, Duty duty, TrialTally tally, double confidence) {
        return estimate(figure, Requirement.Reach.THIS_FLEET_TONIGHT, duty, tally, confidence);
    }

    /** The figure of one side, with the interval of what it is to speak for. */
    public Estimate estimate(
            Requirement.Figure figure, Requirement.Reach reach, Duty duty, TrialTally tally, double confidence) {
        return estimate(figure, reach, Sendings.of(duty, tally, showings), confidence);
    }

    /** The figure of one side at a cut of {@link ScoreBins}. */
    public Estimate estimate(
            Requirement.Figure figure,
            Requirement.Reach reach,
            Duty duty,
            ScoreHistogram histogram,
            int cut,
            double confidence) {
        return estimate(figure, reach, Sendings.of(duty, histogram, cut, showings), confidence);
    }

    static Estimate estimate(Requirement.Figure figure, Requirement.Reach reach, Sendings sendings, double confidence) {
        return switch (reach) {
            case THIS_FLEET_TONIGHT -> FleetError.estimate(figure, sendings, confidence);
            case MACHINES_LIKE_THESE -> SorterError.machinesLikeThese(figure, sendings, confidence);
            case ONE_NEW_MACHINE -> SorterError.oneNewMachine(figure, sendings, confidence);
        };
    }

    /** The figure of the candidate minus that of what is in service, showing by showing; both must have judged the same records. */
    public Estimate difference(
            Requirement.Figure figure, Duty duty, TrialTally candidate, TrialTally inService, double confidence) {
        return FleetError.difference(
                figure, Sendings.of(duty, candidate, showings), Sendings.of(duty, inService, showings), confidence);
    }
}
