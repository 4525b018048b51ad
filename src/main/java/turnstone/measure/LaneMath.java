package turnstone.measure;

/**
 * Sums and logarithms in a stated order of IEEE operations, the same on every machine.
 *
 * <p>The lane rule: element k of a sum goes to lane k mod 8, each lane adds in index order from +0, and the lanes are added as
 * ((0+4)+(2+6))+((1+5)+(3+7)), which is how vectors of 2, 4 or 8 lanes halve. Products are rounded before they are added: no fused operation. Code of any
 * vector width up to 8 can follow it, with the same bits.
 *
 * <p>The logarithm: x = 2^k·m with m in [√½, √2), s = (m − 1)/(m + 1), ln m = 2 artanh s = 2s + s·z·p, z = s² ≤ 0.0295,
 * p = 2/3 + 2/5 z + … + 2/21 z⁹; as 2s = f − s·f with f = m − 1 it is taken as f − s·(f − z·p), whose first term is exact. The
 * first term left out is below 2^-60 of the sum. No branch, no table. Error at most {@value #LOG_ERROR_ULPS} units in the last place of the result for every
 * normal x above 0.
 */
public final class LaneMath {
    /** Number of lanes. */
    public static final int LANES = 8;

    /** Largest error of {@link #log} and {@link #absorbance} in units in the last place of the result; the worst seen in tests is 1.5. */
    public static final int LOG_ERROR_ULPS = 2;

    private static final long SQRT_HALF_BITS = Double.doubleToRawLongBits(0.7071067811865476);
    // ln 2 and log10 2, each as a double of 40 bits after the point (so that k times it is exact) and the double
    // nearest to the rest.
    private static final double LN2_HIGH = 0x1.62e42fefa2p-1;
    private static final double LN2_LOW = 0x1.9ef35793c7673p-41;
    private static final double LOG10_2_HIGH = 0x1.34413509f4p-2;
    private static final double LOG10_2_LOW = 0x1.cff7988f8959bp-41;
    private static final double LOG10_E = 0x1.bcb7b1526e50ep-2;

    private LaneMath() {}

    /** The sum of n numbers by the lane rule. */
    public static double laneSum(double[] a, int from, int n) {
        double l0 = 0;
        double l1 = 0;
        double l2 = 0;
        double l3 = 0;
        double l4 = 0;
        double l5 = 0;
        double l6 = 0;
        double l7 = 0;
        int whole = from + (n & -LANES);
        for (int i = from; i < whole; i += LANES) {
            l0 += a[i];
            l1 += a[i + 1];
            l2 += a[i + 2];
            l3 += a[i + 3];
            l4 += a[i + 4];
            l5 += a[i + 5];
            l6 += a[i + 6];
            l7 += a[i + 7];
        }
        int rest = n & (LANES - 1);
        l0 = rest > 0 ? l0 + a[whole] : l0;
        l1 = rest > 1 ? l1 + a[whole + 1] : l1;
        l2 = rest > 2 ? l2 + a[whole + 2] : l2;
        l3 = rest > 3 ? l3 + a[whole + 3] : l3;
        l4 = rest > 4 ? l4 + a[whole + 4] : l4;
        l5 = rest > 5 ? l5 + a[whole + 5] : l5;
        l6 = rest > 6 ? l6 + a[whole + 6] : l6;
        return ((l0 + l4) + (l2 + l6)) + ((l1 + l5) + (l3 + l7));
    }

    /** The sum of n products by the lane rule. */
    public static double laneDot(double[] a, int aFrom, double[] b, int bFrom, int n) {
        double l0 = 0;
        double l1 = 0;
        double l2 = 0;
        double l3 = 0;
        double l4 = 0;
        double l5 = 0;
        double l6 = 0;
        double l7 = 0;
        int whole = n & -LANES;
        for (int i = 0; i < whole; i += LANES) {
            int p = aFrom + i;
            int q = bFrom + i;
            l0 += a[p] * b[q];
            l1 += a[p + 1] * b[q + 1];
            l2 += a[p + 2] * b[q + 2];
            l3 += a[p + 3] * b[q + 3];
            l4 += a[p + 4] * b[q + 4];
            l5 += a[p + 5] * b[q + 5];
            l6 += a[p + 6] * b[q + 6];
            l7 += a[p + 7] * b[q + 7];
        }
        int rest = n - whole;
        int p = aFrom + whole;
        int q = bFrom + whole;
        l0 = rest > 0 ? l0 + a[p] * b[q] : l0;
        l1 = rest > 1 ? l1 + a[p + 1] * b[q + 1] : l1;
        l2 = rest > 2 ? l2 + a[p + 2] * b[q + 2] : l2;
        l3 = rest > 3 ? l3 + a[p + 3] * b[q + 3] : l3;
        l4 = rest > 4 ? l4 + a[p + 4] * b[q + 4] : l4;
        l5 = rest > 5 ? l5 + a[p + 5] * b[q + 5] : l5;
        l6 = rest > 6 ? l6 + a[p + 6] * b[q + 6] : l6;
        return ((l0 + l4) + (l2 + l6)) + ((l1 + l5) + (l3 + l7));
    }

    /** The natural logarithm of a normal double above 0; any other argument gives a number of no meaning. */
    public static double log(double x) {
        double k = exponent(x);
        double m = mantissa(x);
        double s = ratio(m);
        return k * LN2_HIGH + (k * LN2_LOW + logNearOne(m, s, withHighTerms(s, lowTerms(s))));
    }

    /** log10(1/R) of a normal double above 0; any other argument gives a number of no meaning. */
    public static double absorbance(double reflectance) {
        double m = mantissa(reflectance);
        double s = ratio(m);
        return absorbance(exponent(reflectance), m, s, withHighTerms(s, lowTerms(s)));
    }

    /** k of x = 2^k·m. */
    static double exponent(double x) {
        return (double) ((Double.doubleToRawLongBits(x) - SQRT_HALF_BITS) >> 52);
    }

    /** m of x = 2^k·m, in [√½, √2). */
    static double mantissa(double x) {
        long bits = Double.doubleToRawLongBits(x);
        return Double.longBitsToDouble(bits - ((bits - SQRT_HALF_BITS) & 0xfff0_0000_0000_0000L));
    }

    /** s = f/(2 + f), f = m − 1, which is exact. */
    static double ratio(double m) {
        double f = m - 1.0;
        return f / (2.0 + f);
    }

    /** The first four terms of p, in pairs. */
    static double lowTerms(double s) {
        double z = s * s;
        return (2.0 / 3 + z * (2.0 / 5)) + (z * z) * (2.0 / 7 + z * (2.0 / 9));
    }

    /** p from its first four terms and the other six. */
    static double withHighTerms(double s, double low) {
        double z = s * s;
        double z2 = z * z;
        double z4 = z2 * z2;
        double middle = (2.0 / 11 + z * (2.0 / 13)) + z2 * (2.0 / 15 + z * (2.0 / 17));
        return low + z4 * (middle + z4 * (2.0 / 19 + z * (2.0 / 21)));
    }

    private static double logNearOne(double m, double s, double p) {
        double f = m - 1.0;
        return f - s * (f - (s * s) * p);
    }

    /** log10(1/R) from its parts. */
    static double absorbance(double k, double m, double s, double p) {
        // 0 - x and not -x: reflectance 1 gives +0.
        return 0.0 - (k * LOG10_2_HIGH + (k * LOG10_2_LOW + logNearOne(m, s, p) * LOG10_E));
    }
}
