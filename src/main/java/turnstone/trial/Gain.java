package turnstone.trial;

import java.util.OptionalDouble;

/**
 * How much more a candidate gives than what is in service, between blocks of one sorter on one day.
 *
 * @param figure what was compared, in words: {@code decision recovery at purity 95.00 %}
 * @param point candidate minus in service; empty where there is none
 * @param lower the one-sided lower bound; empty where it can't be given
 * @param standardError of the point; empty where it can't be given
 * @param confidence of the bound
 * @param days with showings
 * @param sorters with showings
 * @param blocks of one sorter on one day, with showings
 * @param showings of the material of the infeed with the fewest
 * @param note why something is empty; empty where nothing is
 */
public record Gain(
        String figure,
        OptionalDouble point,
        OptionalDouble lower,
        OptionalDouble standardError,
        double confidence,
        int days,
        int sorters,
        int blocks,
        int showings,
        String note) {
    /** Degrees of freedom of the bound. */
    public int degreesOfFreedom() {
        return blocks - 1;
    }

    /** The share of trials like this one whose bound passes {@code above} where the truth lies {@code beyond} above it; empty without an error. */
    public OptionalDouble power(double beyond) {
        if (standardError.isEmpty()) {
            return OptionalDouble.empty();
        }
        return OptionalDouble.of(Power.shown(beyond, standardError.getAsDouble(), degreesOfFreedom(), confidence));
    }

    /** Nights like these until the bound would pass {@code above} if the gain stays as found; empty where it would not. */
    public OptionalDouble nightsFor(double above) {
        if (standardError.isEmpty() || days == 0) {
            return OptionalDouble.empty();
        }
        double blockDeviation = standardError.getAsDouble() * Math.sqrt(blocks);
        return Power.nights(point.orElseThrow() - above, blockDeviation, (double) blocks / days, confidence);
    }
}
