package turnstone.trial;

import turnstone.plant.DutyTerms;

/**
 * What goes astray on one side, in money.
 *
 * @param side whose decisions
 * @param perTonne of infeed, in the currency of the duty's costs
 */
public record CostLine(Side side, double perTonne) {
    static CostLine of(Side side, DutyTerms.Costs costs, Sendings sendings) {
        double sum = 0;
        for (Sendings.Part part : sendings.parts()) {
            sum += part.massShare()
                    * (part.target()
                            ? costs.targetLost_perTonne() * (1 - part.sentShare())
                            : costs.otherSent_perTonne() * part.sentShare());
        }
        return new CostLine(side, sum);
    }
}
