package turnstone.measure;

import java.io.Serializable;

/**
 * {@link LaneMath#absorbance} of up to so many values at a time: the same operations on each, hence the same bits, in five loops.
 *
 * <p>The moves of bits in the first loop are not made into vector code by compilers, a loop of more than a few dozen operations neither, nor one over arrays of
 * different offsets: so each loop is short and its arrays begin at 0. Twice as fast as one loop. Not thread-safe.
 */
final class Absorbances implements Serializable {
    private final double[] k;
    private final double[] m;
    private final double[] s;
    private final double[] p;

    Absorbances(int most) {
        k = new double[most];
        m = new double[most];
        s = new double[most];
        p = new double[most];
    }

    int most() {
        return k.length;
    }

    /** Replaces n reflectances, normal and above 0, by their absorbances. */
    void apply(double[] values, int from, int n) {
        split(values, from, n, k, m);
        ratios(m, n, s);
        lowTerms(s, n, p);
        highTerms(s, n, p);
        join(k, m, s, n, p);
        System.arraycopy(p, 0, values, from, n);
    }

    private static void split(double[] values, int from, int n, double[] k, double[] m) {
        for (int i = 0; i < n; i++) {
            k[i] = LaneMath.exponent(values[from + i]);
            m[i] = LaneMath.mantissa(values[from + i]);
        }
    }

    private static void ratios(double[] m, int n, double[] s) {
        for (int i = 0; i < n; i++) {
            s[i] = LaneMath.ratio(m[i]);
        }
    }

    private static void lowTerms(double[] s, int n, double[] p) {
        for (int i = 0; i < n; i++) {
            p[i] = LaneMath.lowTerms(s[i]);
        }
    }

    private static void highTerms(double[] s, int n, double[] p) {
        for (int i = 0; i < n; i++) {
            p[i] = LaneMath.withHighTerms(s[i], p[i]);
        }
    }

    private static void join(double[] k, double[] m, double[] s, int n, double[] p) {
        for (int i = 0; i < n; i++) {
            p[i] = LaneMath.absorbance(k[i], m[i], s[i], p[i]);
        }
    }
}
