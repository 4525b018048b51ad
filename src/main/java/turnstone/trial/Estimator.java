package turnstone.trial;

import java.util.HashMap;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import turnstone.decide.Quantiles;
import turnstone.plant.Duty;
import turnstone.plant.Requirement;

/**
 * Decision purity and decision recovery of a duty from tallies, with intervals clustered by showing.
 *
 * <p>Figures are those of {@link MassFigure}. The interval is for <em>this fleet tonight</em>: sorters are fixed, showings are the unit of
 * chance. A figure f is linearised in the shares sent, z = slope·(sent − p·records)/(all records of the material) for each showing; its
 * standard error is that of {@link ClusteredError} over strata sorter × material; the ends are logit f ± t·s/(f(1 − f)), taken back, t by
 * Satterthwaite's degrees of freedom. Stratified sampling with ratio estimates: Cochran, Sampling Techniques (1977), chapters 5 and 6, from
 * memory.
 *
 * <p>Differences between the two sides are taken showing by showing, on the figure's own scale.
 */
public final class Estimator {
    /** Contributions are shares rounded at 1e-16: their variance is dust below this, and an interval made of it would be false. */
    private static final double NO_SPREAD = 1e-26;

    private static final String ALIKE =
            "both sides sent alike on every showing; the bound rests on the number of showings";

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

    /** The figure of one side. */
    public Estimate estimate(Requirement.Figure figure, Duty duty, TrialTally tally, double confidence) {
        Sendings sendings = Sendings.of(duty, tally, showings);
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
        double variance = error.variance();
        if (variance <= NO_SPREAD) {
            return Estimate.pointOnly(
                    point,
                    confidence,
                    count,
                    "interval not given: showings do not differ at all; more showings would give one");
        }
        double df = error.degreesOfFreedom();
        double reach = Quantiles.student(1 - alpha, df) * Math.sqrt(variance) / (point * (1 - point));
        double logit = StrictMath.log(point / (1 - point));
        return new Estimate(
                OptionalDouble.of(point),
                OptionalDouble.of(expit(logit - reach)),
                OptionalDouble.of(expit(logit + reach)),
                confidence,
                OptionalDouble.of(df),
                count,
                "");
    }

    /** The figure of the candidate minus that of what is in service, showing by showing; both must have judged the same records. */
    public Estimate difference(
            Requirement.Figure figure, Duty duty, TrialTally candidate, TrialTally inService, double confidence) {
        Sendings ours = Sendings.of(duty, candidate, showings);
        Sendings theirs = Sendings.of(duty, inService, showings);
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
        return differenceWithin(error, point, confidence, count);
    }

    private static Estimate differenceWithin(ClusteredError error, double point, double confidence, int count) {
        Optional<String> single = error.stratumWithOneShowing();
        if (single.isPresent()) {
            return Estimate.pointOnly(point, confidence, count, oneShowing(single.get()));
        }
        double variance = error.variance();
        if (variance <= NO_SPREAD) {
            return Estimate.pointOnly(
                    point,
                    confidence,
                    count,
                    "interval not given: showings do not differ at all; more showings would give one");
        }
        double df = error.degreesOfFreedom();
        double reach = Quantiles.student((1 + confidence) / 2, df) * Math.sqrt(variance);
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

    private static double expit(double logit) {
        return 1 / (1 + StrictMath.exp(-logit));
    }
}
