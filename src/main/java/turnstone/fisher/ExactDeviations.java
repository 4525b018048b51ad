package turnstone.fisher;

import java.math.BigInteger;
import turnstone.moments.Moments;

/**
 * Deviations that would lose digits in floating point, formed in integers and rounded once to double-double; in counts.
 *
 * <p>Scatter of a set about its own mean: (n·P_ij − s_i·s_j)/n. Mean of a part about the mean of everything: (N·s_i − n·S_i)/(N·n).
 */
final class ExactDeviations {
    /** With n below 2^42 and a product of one word, n·P is below 2^105. */
    private static final long SMALL_RECORDS = 1L << 42;

    /** With sums below 2^52, s·s is below 2^104; together they stay below 2^106. */
    private static final long SMALL_SUM = 1L << 52;

    private static final double WORD = 0x1p64;
    private static final double HALF_WORD = 0x1p32;
    private static final long HALF_MASK = 0xffffffffL;

    private ExactDeviations() {}

    /**
     * Scatter about the mean.
     *
     * @throws IllegalArgumentException if a diagonal element is negative, which no records can give
     */
    static LowerRows scatter(Moments moments) {
        int d = moments.channels();
        boolean narrow = sumsFitWord(moments);
        long[] sums = new long[d];
        long largest = 0;
        for (int i = 0; i < d; i++) {
            sums[i] = moments.sumLow(i);
            largest = Math.max(largest, Math.abs(sums[i]));
        }
        boolean small = narrow && largest >= 0 && largest < SMALL_SUM && moments.records() < SMALL_RECORDS;
        WideInteger wide = new WideInteger();
        LowerRows rows = new LowerRows(d);
        for (int i = 0; i < d; i++) {
            double[] high = rows.high[i];
            double[] low = rows.low[i];
            if (small) {
                smallRow(moments, sums, i, wide, high, low);
            } else if (narrow) {
                narrowRow(moments, i, wide, high, low);
            } else {
                wideRow(moments, i, high, low);
            }
            if (high[i] < 0) {
                throw new IllegalArgumentException(
                        "scatter of channel " + (i + 1) + " is below zero: not sums of records");
            }
            Kernels.divide((double) moments.records(), high, low, 0, i + 1);
        }
        return rows;
    }

    /** Row by row where n and all sums are small enough for {@link #roundTwoWords}; products that are not go the longer way. */
    private static void smallRow(Moments moments, long[] sums, int i, WideInteger wide, double[] high, double[] low) {
        long n = moments.records();
        long sum = sums[i];
        for (int j = 0; j <= i; j++) {
            long product = moments.productLow(i, j);
            if (moments.productHigh(i, j) == product >> 63) {
                long firstLow = n * product;
                long secondLow = sum * sums[j];
                long borrow = Long.compareUnsigned(firstLow, secondLow) < 0 ? 1 : 0;
                long top = Math.multiplyHigh(n, product) - Math.multiplyHigh(sum, sums[j]) - borrow;
                roundTwoWords(top, firstLow - secondLow, high, low, j);
            } else {
                wide.setProduct(n, moments.productHigh(i, j), product);
                wide.subtractProduct(sum, sums[j]);
                wide.round(high, low, j);
            }
        }
    }

    /**
     * A two's complement integer of two words, below 2^106 in size, as the nearest double and the rest of it, which is below 2^53 then: all
     * steps but the two roundings are exact.
     */
    private static void roundTwoWords(long top, long bottom, double[] high, double[] low, int at) {
        double a = top * WORD;
        double b = (bottom >>> 32) * HALF_WORD;
        double c = bottom & HALF_MASK;
        double nearBottom = b + c;
        double restOfBottom = c - (nearBottom - b);
        double near = a + nearBottom;
        double part = near - a;
        double rest = ((a - (near - part)) + (nearBottom - part)) + restOfBottom;
        double nearest = near + rest;
        high[at] = nearest;
        low[at] = rest - (nearest - near);
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
