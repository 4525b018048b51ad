package turnstone.plant;

import java.util.List;
import java.util.Map;
import java.util.Optional;

/**
 * What a duty says beyond its targets, stream, sorters, mix and absolute requirements.
 *
 * @param mixDeviation standard deviation of a material's share of the infeed by mass; a material that is not listed has none
 * @param costs of what goes astray, if given
 * @param required the figure that the duty fixes, if it fixes one
 * @param cut how the decision thresholds are set where a figure is fixed
 * @param gain over what is in service
 * @param guards in the order of the plant file
 * @param limits in parts per million, in the order of the plant file
 */
public record DutyTerms(
        Map<String, Double> mixDeviation,
        Optional<Costs> costs,
        Optional<Required> required,
        CutRule cut,
        GainRule gain,
        List<Guard> guards,
        List<PpmLimit> limits) {
    /**
     * Costs by mass, in any one currency.
     *
     * @param targetLost_perTonne of target that is not in the product
     * @param otherSent_perTonne of other material that is
     */
    public record Costs(double targetLost_perTonne, double otherSent_perTonne) {}

    /** How a cut is set on earlier days. */
    public enum CutRule {
        /** So that the figure itself is what is required. */
        POINT,
        /** So that the lower end of its one-sided 90 % interval is. */
        LOWER;

        static CutRule of(String word) {
            return Words.constant(CutRule.class, word);
        }
    }

    /** Keeps copies. */
    public DutyTerms {
        mixDeviation = Map.copyOf(mixDeviation);
        guards = List.copyOf(guards);
        limits = List.copyOf(limits);
    }

    /** Nothing but the standard gain. */
    public static DutyTerms standard() {
        return new DutyTerms(
                Map.of(), Optional.empty(), Optional.empty(), CutRule.POINT, GainRule.standard(), List.of(), List.of());
    }

    /** The same with this figure fixed. */
    public DutyTerms requiring(Required figure) {
        return new DutyTerms(mixDeviation, costs, Optional.of(figure), cut, gain, guards, limits);
    }
}
