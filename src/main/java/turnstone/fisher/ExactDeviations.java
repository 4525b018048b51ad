package turnstone.fisher;

import java.math.BigInteger;
import turnstone.moments.Moments;

/**
 * Deviations that would lose digits in floating point, formed in integers and rounded once to double-double; in counts.
 *
 * <p>Scatter of a set about its own mean: (n·P_ij − s_i·s_j)/n. Mean of a part about the mean of everything: (N·s_i − n·S_i)/(N·n).
 */
final class ExactDeviations {
    private ExactDeviations() {}

    /**
     * Adds weight · scatter about the mean to the lower triangle of a matrix.
     *
     * @throws IllegalArgumentException if a diagonal element is negative, which no records can give
     */
    static void addScatter(Part part, ExtendedMatrix lower) {
        Moments moments = part.moments();
        int d = moments.channels();
        boolean narrow = sumsFitWord(moments);
        WideInteger wide = new WideInteger();
        double[] high = new double[d];
        double[] low = new double[d];
        for (int i = 0; i < d; i++) {
            if (narrow) {
                narrowRow(moments, i, wide, high, low);
            } else {
                wideRow(moments, i, high, low);
            }
            if (high[i] < 0) {
                throw new IllegalArgumentException(
                        "scatter of channel " + (i + 1) + " is below zero: not sums of records");
            }
            Kernels.divide((double) moments.records(), high, low, 0, i + 1);
            Kernels.multiplyAdd(part.weight(), 0, high, low, lower.high[i], lower.low[i], 0, i + 1);
        }
    }

    private static void narrowRow(Moments moments, int i, WideInteger wide, double[] high, double[] low) {
        long n = moments.records();
        long sum = moments.sumLow(i);
        for (int j = 0; j <= i; j++) {
            wide.setProduct(n, moments.productHigh(i, j), moments.productLow(i, j));
            wide.subtractProduct(sum, moments.sumLow(j));
            wide.round(high, low, j);
        }
    }

    private static void wideRow(Moments moments, int i, double[] high, double[] low) {
        for (int j = 0; j <= i; j++) {
            DoubleDouble value = DoubleDouble.of(moments.scatter(i, j));
            high[j] = value.high();
            low[j] = value.low();
        }
    }

    /** Mean of a part less the mean of everything, into one row of a matrix. */
    static void addMean(Moments part, Totals total, ExtendedMatrix into, int row, DoubleDouble weight) {
        int d = part.channels();
        double[] high = new double[d];
        double[] low = new double[d];
        boolean narrow = sumsFitWord(part) && total.fitWord();
        WideInteger wide = new WideInteger();
        for (int i = 0; i < d; i++) {
            if (narrow) {
                wide.setProduct(total.records(), part.sumHigh(i), part.sumLow(i));
                wide.subtractProduct(part.records(), total.sum(i).longValue());
                wide.round(high, low, i);
            } else {
                BigInteger own = part.sum(i).multiply(BigInteger.valueOf(total.records()));
                BigInteger all = total.sum(i).multiply(BigInteger.valueOf(part.records()));
                DoubleDouble value = DoubleDouble.of(own.subtract(all));
                high[i] = value.high();
                low[i] = value.low();
            }
        }
        Kernels.divide((double) total.records(), high, low, 0, d);
        Kernels.divide((double) part.records(), high, low, 0, d);
        Kernels.multiplyAdd(weight.high(), weight.low(), high, low, into.high[row], into.low[row], 0, d);
    }

    private static boolean sumsFitWord(Moments moments) {
        for (int i = 0; i < moments.channels(); i++) {
            if (moments.sumHigh(i) != moments.sumLow(i) >> 63) {
                return false;
            }
        }
        return true;
    }
}
