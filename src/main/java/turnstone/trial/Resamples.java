package turnstone.trial;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.SplittableRandom;
import java.util.TreeMap;
import turnstone.plant.Requirement;

/**
 * A cloud of values that a figure might have taken with other showings, for drawings only: quantiles of it hold the truth too seldom.
 *
 * <p>Of the K showings of a sorter and material, K − 1 are drawn with replacement, so that the cloud is as wide as the error of K (drawing K would
 * make it too narrow by √((K − 1)/K)). A stratum with one showing keeps it. The same seed gives the same values on every machine.
 */
final class Resamples {
    private Resamples() {}

    /** Values in ascending order; those of samples in which nothing was sent are NaN, at the end. */
    static double[] of(Requirement.Figure figure, Sendings sendings, int samples, long seed) {
        SplittableRandom random = new SplittableRandom(seed);
        double[] values = new double[samples];
        for (int i = 0; i < samples; i++) {
            values[i] = new MassFigure(figure, sendings.map(part -> resampled(part, random))).value();
        }
        Arrays.sort(values);
        return values;
    }

    private static Sendings.Part resampled(Sendings.Part part, SplittableRandom random) {
        TreeMap<String, List<Sendings.Showing>> strata = new TreeMap<>();
        part.showings()
                .forEach(showing -> strata.computeIfAbsent(showing.sorter(), name -> new ArrayList<>())
                        .add(showing));
        List<Sendings.Showing> drawn = new ArrayList<>();
        for (List<Sendings.Showing> stratum : strata.values()) {
            int draws = Math.max(1, stratum.size() - 1);
            for (int k = 0; k < draws; k++) {
                drawn.add(stratum.get(random.nextInt(stratum.size())));
            }
        }
        return part.with(drawn);
    }
}
