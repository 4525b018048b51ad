package turnstone.trial;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.TreeSet;
import turnstone.decide.Quantiles;
import turnstone.plant.Requirement;

/**
 * Figures that speak for machines which were not shown anything: sorters are the unit of chance.
 *
 * <p><em>Machines like these</em>: with f the pooled figure and z_s the sum over a sorter's showings of slope·(sent − p·records)/(all records
 * of the material), s² = S/(S − 1)·Σ z_s², and the ends are logit f ± t(S − 1)·s/(f(1 − f)), taken back. <em>One new machine</em>: with y_s the
 * logits of the sorters' own figures, half a record added to what was sent and to what was not, ȳ their mean and s their deviation, the ends of
 * ȳ ± t(S − 1)·s·√(1 + 1/S), taken back: a prediction interval, wide by nature. Only sorters that showed every material of the mix count there.
 */
final class SorterError {
    /** Sorters without which an interval for machines like these is not given. */
    static final int LIKE_THESE = 4;
    /** Sorters without which an interval for a new machine is not given. */
    static final int NEW_MACHINE = 6;

    private SorterError() {}

    static Estimate machinesLikeThese(Requirement.Figure figure, Sendings sendings, double confidence) {
        int count = sendings.showings();
        Optional<Estimate> missing = missing(sendings, LIKE_THESE, confidence);
        if (missing.isPresent()) {
            return missing.get();
        }
        MassFigure mass = new MassFigure(figure, sendings);
        double point = mass.value();
        if (Double.isNaN(point)) {
            return Estimate.notGiven(confidence, count, "nothing was sent to the product stream");
        }
        if (point == 0 || point == 1) {
            return Estimate.pointOnly(
                    point, confidence, count, "interval not given: no showing shows the contrary; more showings may");
        }
        int sorters = sendings.sorters().size();
        double squares = 0;
        for (String sorter : sendings.sorters()) {
            double z = contribution(mass, sendings, sorter);
            squares += z * z;
        }
        double variance = squares * sorters / (sorters - 1);
        if (variance <= FleetError.NO_SPREAD) {
            return Estimate.pointOnly(
                    point,
                    confidence,
                    count,
                    "interval not given: sorters do not differ at all; more showings would give one");
        }
        double mixVariance = FleetError.mixVariance(sendings, mass::mixSlope);
        double all = variance + mixVariance;
        double df = (sorters - 1) * (all / variance) * (all / variance);
        return Logit.around(point, Quantiles.student((1 + confidence) / 2, df) * Math.sqrt(all), confidence, df, count);
    }

    private static double contribution(MassFigure mass, Sendings sendings, String sorter) {
        double sum = 0;
        for (Sendings.Part part : sendings.parts()) {
            double share = part.sentShare();
            for (Sendings.Showing showing : part.showings()) {
                if (showing.sorter().equals(sorter)) {
                    sum += mass.slope(part) * (showing.sent() - share * showing.records()) / part.records();
                }
            }
        }
        return sum;
    }

    static Estimate oneNewMachine(Requirement.Figure figure, Sendings sendings, double confidence) {
        int count = sendings.showings();
        Optional<Estimate> missing = missing(sendings, NEW_MACHINE, confidence);
        if (missing.isPresent()) {
            return missing.get();
        }
        List<Double> logits = new ArrayList<>();
        double mean = 0;
        for (String sorter : sendings.sorters()) {
            Sendings own = sendings.onlySorter(sorter);
            if (own.notShown().isEmpty()) {
                double share = MassFigure.withHalfARecord(figure, own);
                logits.add(Logit.of(share));
                mean += Logit.of(share);
            }
        }
        int sorters = logits.size();
        mean /= sorters;
        double squares = 0;
        for (double logit : logits) {
            squares += (logit - mean) * (logit - mean);
        }
        double slope = 1 / (Logit.back(mean) * (1 - Logit.back(mean)));
        double mixVariance = FleetError.mixVariance(sendings, new MassFigure(figure, sendings)::mixSlope);
        double spread = squares / (sorters - 1) * (1 + 1.0 / sorters) + mixVariance * slope * slope;
        double reach = Quantiles.student((1 + confidence) / 2, sorters - 1) * Math.sqrt(spread);
        return Logit.between(Logit.back(mean), mean, reach, confidence, sorters - 1, count);
    }

    /** Why the figure can't be given: a material that too few sorters showed. */
    private static Optional<Estimate> missing(Sendings sendings, int needed, double confidence) {
        TreeSet<String> everything = new TreeSet<>(sendings.sorters());
        for (Sendings.Part part : sendings.parts()) {
            TreeSet<String> showed = new TreeSet<>();
            part.showings().forEach(showing -> showed.add(showing.sorter()));
            everything.retainAll(showed);
            if (showed.size() < needed) {
                return Optional.of(Estimate.notGiven(
                        confidence,
                        sendings.showings(),
                        enough(part.material() + " was shown", showed.size(), needed)));
            }
        }
        return everything.size() >= needed
                ? Optional.empty()
                : Optional.of(Estimate.notGiven(
                        confidence,
                        sendings.showings(),
                        enough("every material of the infeed was shown", everything.size(), needed)));
    }

    private static String enough(String what, int found, int needed) {
        return what + " on " + found + (found == 1 ? " sorter, " : " sorters, ") + needed + " are needed";
    }
}
