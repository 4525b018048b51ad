package turnstone.fisher;

/**
 * Element-wise loops in double-double over two arrays of high and low parts, in index order.
 *
 * <p>All arrays of a loop are read and written at one index, not at offsets of their own: compilers cannot rule out that ranges at different
 * offsets overlap, and then do not vectorise. The loops have no branch and no call, so that the compiler can run several elements side by side; every element is computed by the
 * same IEEE operations whether it does or not. Results are normalised: the low part is at most a unit in the last place of the high part.
 */
final class Kernels {
    /** 2^27 + 1: splits 53 bits into 26 and 26 with a sign. */
    static final double SPLITTER = 134217729.0;

    private Kernels() {}

    /** The upper half of the bits of a double of magnitude below 2^996. */
    static double top(double a) {
        double t = SPLITTER * a;
        return t - (t - a);
    }

    /**
     * y[j] += a·x[j] for j below n.
     *
     * <p>Relative to |y| + |a·x| each element is within 2^-102.
     */
    static void multiplyAdd(
            double aHigh,
            double aLow,
            double[] xHigh,
            double[] xLow,
            double[] yHigh,
            double[] yLow,
            int from,
            int end) {
        double aTop = top(aHigh);
        double aRest = aHigh - aTop;
        for (int j = from; j < end; j++) {
            double x = xHigh[j];
            double t = SPLITTER * x;
            double xTop = t - (t - x);
            double xRest = x - xTop;
            double p = aHigh * x;
            double e = ((aTop * xTop - p) + aTop * xRest + aRest * xTop) + aRest * xRest;
            e += aHigh * xLow[j] + aLow * x;
            double y = yHigh[j];
            double s = y + p;
            double part = s - y;
            double low = ((y - (s - part)) + (p - part)) + (e + yLow[j]);
            double high = s + low;
            yHigh[j] = high;
            yLow[j] = low - (high - s);
        }
    }

    /** y[j] *= x[j] for j below n. */
    static void multiply(double[] xHigh, double[] xLow, double[] yHigh, double[] yLow, int from, int end) {
        for (int j = from; j < end; j++) {
            double x = xHigh[j];
            double t = SPLITTER * x;
            double xTop = t - (t - x);
            double xRest = x - xTop;
            double y = yHigh[j];
            double u = SPLITTER * y;
            double yTop = u - (u - y);
            double yRest = y - yTop;
            double p = x * y;
            double e = ((xTop * yTop - p) + xTop * yRest + xRest * yTop) + xRest * yRest;
            e += y * xLow[j] + x * yLow[j];
            double high = p + e;
            yHigh[j] = high;
            yLow[j] = e - (high - p);
        }
    }

    /** y[j] *= a for j below n. */
    static void scale(double aHigh, double aLow, double[] yHigh, double[] yLow, int from, int end) {
        double aTop = top(aHigh);
        double aRest = aHigh - aTop;
        for (int j = from; j < end; j++) {
            double y = yHigh[j];
            double u = SPLITTER * y;
            double yTop = u - (u - y);
            double yRest = y - yTop;
            double p = aHigh * y;
            double e = ((aTop * yTop - p) + aTop * yRest + aRest * yTop) + aRest * yRest;
            e += aHigh * yLow[j] + aLow * y;
            double high = p + e;
            yHigh[j] = high;
            yLow[j] = e - (high - p);
        }
    }

    /** y[j] /= a for a double a that is not 0; within 2^-103 relative. */
    static void divide(double a, double[] yHigh, double[] yLow, int from, int end) {
        double aTop = top(a);
        double aRest = a - aTop;
        for (int j = from; j < end; j++) {
            double y = yHigh[j];
            double q = y / a;
            double u = SPLITTER * q;
            double qTop = u - (u - q);
            double qRest = q - qTop;
            double p = q * a;
            double e = ((aTop * qTop - p) + aTop * qRest + aRest * qTop) + aRest * qRest;
            double second = (((y - p) - e) + yLow[j]) / a;
            double high = q + second;
            yHigh[j] = high;
            yLow[j] = second - (high - q);
        }
    }

    /**
     * Sum of products of the pairs from {@code from} and below {@code end}, in four interleaved sums that are added in order.
     *
     * <p>Within their number times 2^-103 of the sum of the sizes of the products.
     */
    static DoubleDouble dot(double[] xHigh, double[] xLow, double[] yHigh, double[] yLow, int from, int end) {
        double[] high = new double[4];
        double[] low = new double[4];
        for (int j = from; j < end; j++) {
            int lane = j & 3;
            double x = xHigh[j];
            double y = yHigh[j];
            double xTop = top(x);
            double xRest = x - xTop;
            double yTop = top(y);
            double yRest = y - yTop;
            double p = x * y;
            double e = ((xTop * yTop - p) + xTop * yRest + xRest * yTop) + xRest * yRest;
            e += x * yLow[j] + y * xLow[j];
            double sum = high[lane];
            double s = sum + p;
            double part = s - sum;
            low[lane] += ((sum - (s - part)) + (p - part)) + e;
            high[lane] = s;
        }
        DoubleDouble result = DoubleDouble.sum(high[0], low[0]);
        for (int lane = 1; lane < 4; lane++) {
            result = result.plus(DoubleDouble.sum(high[lane], low[lane]));
        }
        return result;
    }
}
