package turnstone.trial;

import java.util.Optional;
import java.util.OptionalDouble;
import java.util.function.ToDoubleFunction;
import turnstone.decide.Quantiles;
import turnstone.plant.Requirement;

/**
 * Figures of <em>this fleet tonight</em>: sorters are fixed, showings are the unit of chance.
 *
 * <p>A figure f is linearised in the shares sent, z = slope·(sent − p·records)/(all records of the material) for each showing; its standard
 * error is that of {@link ClusteredError} over strata sorter × material, with what the mix's own uncertainty adds; the ends are
 * logit f ± t·s/(f(1 − f)), taken back, t by Satterthwaite's degrees of freedom. Stratified sampling with ratio estimates: Cochran, Sampling
 * Techniques (1977), chapters 5 and 6, from memory. Differences between two sides are on the figure's own scale.
 */
final class FleetError {
    /** Contributions are shares rounded at 1e-16: their variance is dust below this, and an interval made of it would be false. */
    static final double NO_SPREAD = 1e-26;

    private static final String ALIKE =
            "both sides sent alike on every showing; the bound rests on the number of showings";
    private static final String NO_DIFFERENCE =
            "interval not given: showings do not differ at all; more showings would give one";

    private FleetError() {}

    /** The figure with its interval. */
    static Estimate estimate(Requirement.Figure figure, Sendings sendings, double confidence) {
        int count = sendings.showings();
        Optional<String> notShown = sendings.notShown();
        if (notShown.isPresent()) {
            return Estimate.notGiven(confidence, count, "no records of " + notShown.get() + " in the trial");
        }
        MassFigure mass = new MassFigure(figure, sendings);
        double point = mass.value();
        if (Double.isNaN(point)) {
            return Estimate.notGiven(confidence, count, "nothing was sent to the product stream");
        }
        double alpha = (1 - confidence) / 2;
        if (point == 0 || point == 1) {
            return withoutExample(mass, point, confidence, count);
        }
        ClusteredError error = new ClusteredError();
        for (Sendings.Part part : sendings.parts()) {
            addContributions(error, part, part, mass.slope(part), 0);
        }
        Optional<String> single = error.stratumWithOneShowing();
        if (single.isPresent()) {
            return Estimate.pointOnly(point, confidence, count, oneShowing(single.get()));
        }
        if (error.variance() <= NO_SPREAD) {
            return Estimate.pointOnly(point, confidence, count, NO_DIFFERENCE);
        }
        double mixVariance = mixVariance(sendings, mass::mixSlope);
        double df = error.degreesOfFreedom(mixVariance);
        double reach = Quantiles.student(1 - alpha, df) * Math.sqrt(error.variance() + mixVariance);
        return Logit.around(point, reach, confidence, df, count);
    }

    /** The figure of one side minus that of the other, showing by showing; both must have judged the same records. */
    static Estimate difference(Requirement.Figure figure, Sendings ours, Sendings theirs, double confidence) {
        requireSameRecords(ours, theirs);
        int count = ours.showings();
        Optional<String> notShown = ours.notShown();
        if (notShown.isPresent()) {
            return Estimate.notGiven(confidence, count, "no records of " + notShown.get() + " in the trial");
        }
        MassFigure a = new MassFigure(figure, ours);
        MassFigure b = new MassFigure(figure, theirs);
        double point = a.value() - b.value();
        if (Double.isNaN(point)) {
            return Estimate.notGiven(confidence, count, "one side sent nothing to the product stream");
        }
        if (ours.equalTo(theirs)) {
            double reach = a.reachWithoutExample((1 - confidence) / 2);
            return around(point, reach, confidence, OptionalDouble.empty(), count, ALIKE);
        }
        ClusteredError error = new ClusteredError();
        for (int m = 0; m < ours.parts().size(); m++) {
            Sendings.Part part = ours.parts().get(m);
            Sendings.Part other = theirs.parts().get(m);
            addContributions(error, part, other, a.slope(part), b.slope(other));
        }
        double mixVariance = 0;
        for (int m = 0; m < ours.parts().size(); m++) {
            double slope =
                    a.mixSlope(ours.parts().get(m)) - b.mixSlope(theirs.parts().get(m));
            double deviation = slope * ours.parts().get(m).massDeviation();
            mixVariance += deviation * deviation;
        }
        return differenceWithin(error, mixVariance, point, confidence, count);
    }

    /** What the uncertainty of the infeed mix adds to a variance, materials taken as independent. */
    static double mixVariance(Sendings sendings, ToDoubleFunction<Sendings.Part> mixSlope) {
        double variance = 0;
        for (Sendings.Part part : sendings.parts()) {
            double deviation = mixSlope.applyAsDouble(part) * part.massDeviation();
            variance += deviation * deviation;
        }
        return variance;
    }

    private static Estimate differenceWithin(
            ClusteredError error, double mixVariance, double point, double confidence, int count) {
        Optional<String> single = error.stratumWithOneShowing();
        if (single.isPresent()) {
            return Estimate.pointOnly(point, confidence, count, oneShowing(single.get()));
        }
        if (error.variance() <= NO_SPREAD) {
            return Estimate.pointOnly(point, confidence, count, NO_DIFFERENCE);
        }
        double df = error.degreesOfFreedom(mixVariance);
        double reach = Quantiles.student((1 + confidence) / 2, df) * Math.sqrt(error.variance() + mixVariance);
        return around(point, reach, confidence, OptionalDouble.of(df), count, "");
    }

    private static Estimate around(
            double point, double reach, double confidence, OptionalDouble df, int count, String note) {
        return new Estimate(
                OptionalDouble.of(point),
                OptionalDouble.of(Math.max(-1, point - reach)),
                OptionalDouble.of(Math.min(1, point + reach)),
                confidence,
                df,
                count,
                note);
    }

    private static Estimate withoutExample(MassFigure mass, double point, double confidence, int count) {
        double bound = mass.boundWithoutExample((1 - confidence) / 2);
        return new Estimate(
                OptionalDouble.of(point),
                OptionalDouble.of(Math.min(point, bound)),
                OptionalDouble.of(Math.max(point, bound)),
                confidence,
                OptionalDouble.empty(),
                count,
                "no showing shows the contrary: the bound is the rule of three, by showings");
    }

    private static void addContributions(
            ClusteredError error, Sendings.Part part, Sendings.Part other, double slope, double otherSlope) {
        double records = part.records();
        double sentShare = part.sentShare();
        double otherShare = other.sentShare();
        for (int i = 0; i < part.showings().size(); i++) {
            Sendings.Showing showing = part.showings().get(i);
            Sendings.Showing twin = other.showings().get(i);
            double z = slope * (showing.sent() - sentShare * showing.records())
                    - otherSlope * (twin.sent() - otherShare * twin.records());
            error.add(part.material() + " on " + showing.sorter(), z / records);
        }
    }

    private static void requireSameRecords(Sendings ours, Sendings theirs) {
        if (!ours.sameRecords(theirs)) {
            throw new IllegalArgumentException("the two sides of a trial must judge the same records");
        }
    }

    private static String oneShowing(String stratum) {
        return "interval not given: one showing only of " + stratum + ", two are needed";
    }
}
