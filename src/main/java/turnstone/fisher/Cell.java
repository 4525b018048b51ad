package turnstone.fisher;

import java.util.Objects;
import turnstone.moments.Moments;

/**
 * Moments that enter a material with one weight.
 *
 * <p>Weight 1 for all cells of a request is "as counted". Only the ratios of weights within a request matter: they are rescaled
 * so that the weighted number of records equals the number of records.
 *
 * @param moments exact sums of counts, on the request's count scale
 * @param weight positive and finite; a record of this cell counts this many times
 */
public record Cell(Moments moments, double weight) {
    /** Checks the weight. */
    public Cell {
        Objects.requireNonNull(moments, "moments");
        if (!(weight > 0) || Double.isInfinite(weight)) {
            throw new IllegalArgumentException("weight of a cell must be positive and finite: " + weight);
        }
    }

    /** A cell as counted. */
    public static Cell asCounted(Moments moments) {
        return new Cell(moments, 1);
    }
}
