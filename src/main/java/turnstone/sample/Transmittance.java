package turnstone.sample;

/**
 * 10^−A of absorbances A, by IEEE operations in a stated order, the same on every machine and quicker than {@link StrictMath}.
 *
 * <p>x = −A·ln 10 = k·ln 2 + r with |r| ≤ ln 2 / 2, e^x = 2^k·e^r, e^r by its series to r^13: the first term left out is below 2^-57. The error
 * is that of x, about 2^-52 of it, and one unit in the last place. A is above −300 and below 300. Not for sharing between threads.
 */
final class Transmittance {
    private static final double LN_10 = 2.302585092994046;
    private static final double PER_LN_2 = 1.4426950408889634;
    /** ln 2 as a double of 40 bits after the point, so that k times it is exact, and the double nearest to the rest. */
    private static final double LN_2_HIGH = 0x1.62e42fefa2p-1;

    private static final double LN_2_LOW = 0x1.9ef35793c7673p-41;
    /** Adding it rounds to a whole number, which then stands in the low bits. */
    private static final double WHOLE = 0x1.8p52;

    private static final int EXPONENT_AT = 52;

    private final double[] shifted;

    Transmittance(int channels) {
        shifted = new double[channels];
    }

    /** In place. */
    void apply(double[] values) {
        series(values, shifted, shifted.length);
        for (int c = 0; c < shifted.length; c++) {
            // The whole part, k, goes onto the exponent.
            long exponent = Double.doubleToRawLongBits(shifted[c]) << EXPONENT_AT;
            values[c] = Double.longBitsToDouble(Double.doubleToRawLongBits(values[c]) + exponent);
        }
    }

    /** From 0 on and without a branch, so that compilers make vector code of it. */
    private static void series(double[] values, double[] shifted, int n) {
        for (int c = 0; c < n; c++) {
            double x = -LN_10 * values[c];
            double whole = x * PER_LN_2 + WHOLE;
            double k = whole - WHOLE;
            double r = (x - k * LN_2_HIGH) - k * LN_2_LOW;
            double p = 1.0 / 6227020800.0;
            p = p * r + 1.0 / 479001600.0;
            p = p * r + 1.0 / 39916800.0;
            p = p * r + 1.0 / 3628800.0;
            p = p * r + 1.0 / 362880.0;
            p = p * r + 1.0 / 40320.0;
            p = p * r + 1.0 / 5040.0;
            p = p * r + 1.0 / 720.0;
            p = p * r + 1.0 / 120.0;
            p = p * r + 1.0 / 24.0;
            p = p * r + 1.0 / 6.0;
            p = p * r + 0.5;
            p = p * r + 1;
            values[c] = p * r + 1;
            shifted[c] = whole;
        }
    }
}
