package turnstone.trial;

import java.util.Locale;
import java.util.OptionalDouble;
import java.util.function.Function;
import turnstone.plant.Duty;
import turnstone.plant.Required;
import turnstone.plant.Requirement;

/**
 * The one figure by which sides and rungs are compared for a duty.
 *
 * @param name in words: {@code decision recovery at purity 95.00 %}
 * @param of what it is on a frontier; empty where no cut reaches what is fixed
 */
record DutyFigure(String name, Function<Frontier, OptionalDouble> of) {
    /** Recovery by the decision for the nearest material. */
    static DutyFigure nearest() {
        return new DutyFigure(
                "decision recovery",
                frontier -> OptionalDouble.of(frontier.at(ScoreBins.NEAREST).recovery()));
    }

    /** The other figure at the one that the duty fixes; where it fixes none, {@link #nearest}. */
    static DutyFigure of(Duty duty) {
        if (duty.terms().required().isEmpty()) {
            return nearest();
        }
        Required required = duty.terms().required().get();
        double share = required.share();
        return required.figure() == Requirement.Figure.DECISION_PURITY
                ? new DutyFigure(
                        name("decision recovery at purity", share), frontier -> frontier.recoveryAtPurity(share))
                : new DutyFigure(
                        name("decision purity at recovery", share), frontier -> frontier.purityAtRecovery(share));
    }

    private static String name(String words, double share) {
        return String.format(Locale.ROOT, "%s %.2f %%", words, 100 * share);
    }
}
