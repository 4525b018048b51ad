package turnstone.trial;

import turnstone.plant.Requirement;

/**
 * A figure of the trial as it is reported beside the requirements.
 *
 * @param form what the judging models were made without
 * @param side whose figure it is
 * @param figure decision purity or decision recovery
 * @param reach what the interval speaks for
 * @param estimate with its interval
 */
public record FigureLine(
        TrialForm form, Side side, Requirement.Figure figure, Requirement.Reach reach, Estimate estimate) {
    /** {@code decision purity} or {@code decision recovery}. */
    public String figureName() {
        return figure == Requirement.Figure.DECISION_PURITY ? "decision purity" : "decision recovery";
    }
}
