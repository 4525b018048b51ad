package turnstone.trial;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;

/**
 * The variance of a sum over showings that are drawn independently within strata (sorter × material).
 *
 * <p>With z the contribution of a showing and k the showings of stratum h: v_h = k/(k − 1)·Σ(z − z̄)², V = Σ v_h, degrees of freedom
 * V²/Σ(v_h²/(k − 1)) (Satterthwaite 1946). Strata of no variance add nothing to either. A stratum with one showing has no variance that
 * could be known, and is named.
 */
final class ClusteredError {
    private final Map<String, List<Double>> strata = new TreeMap<>();

    void add(String stratum, double contribution) {
        strata.computeIfAbsent(stratum, name -> new ArrayList<>()).add(contribution);
    }

    Optional<String> stratumWithOneShowing() {
        return strata.entrySet().stream()
                .filter(stratum -> stratum.getValue().size() < 2)
                .map(Map.Entry::getKey)
                .findFirst();
    }

    double variance() {
        double sum = 0;
        for (List<Double> stratum : strata.values()) {
            sum += variance(stratum);
        }
        return sum;
    }

    /** Satterthwaite's, with a further variance that is taken as known. */
    double degreesOfFreedom(double known) {
        double squares = 0;
        for (List<Double> stratum : strata.values()) {
            double v = variance(stratum);
            squares += v * v / (stratum.size() - 1);
        }
        double v = variance() + known;
        return v * v / squares;
    }

    private static double variance(List<Double> stratum) {
        int k = stratum.size();
        double mean = 0;
        for (double z : stratum) {
            mean += z / k;
        }
        double squares = 0;
        for (double z : stratum) {
            squares += (z - mean) * (z - mean);
        }
        return squares * k / (k - 1);
    }
}
