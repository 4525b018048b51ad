package turnstone.fisher;

/**
 * Element-wise loops in double-double over two arrays of high and low parts, in index order.
 *
 * <p>The loops have no branch and no call, so that the compiler can run several elements side by side; every element is computed by the
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
     * y[yFrom + j] += a·x[xFrom + j] for j below n.
     *
     * <p>Relative to |y| + |a·x| each element is within 2^-102.
     */
    static void multiplyAdd(
            double aHigh,
            double aLow,
            double[] xHigh,
            double[] xLow,
            int xFrom,
            double[] yHigh,
            double[] yLow,
            int yFrom,
            int n) {
        double aTop = top(aHigh);
        double aRest = aHigh - aTop;
        for (int j = 0; j < n; j++) {
            double x = xHigh[xFrom + j];
            double t = SPLITTER * x;
            double xTop = t - (t - x);
            double xRest = x - xTop;
            double p = aHigh * x;
            double e = ((aTop * xTop - p) + aTop * xRest + aRest * xTop) + aRest * xRest;
            e += aHigh * xLow[xFrom + j] + aLow * x;
            double y = yHigh[yFrom + j];
            double s = y + p;
            double part = s - y;
            double low = ((y - (s - part)) + (p - part)) + (e + yLow[yFrom + j]);
            double high = s + low;
            yHigh[yFrom + j] = high;
            yLow[yFrom + j] = low - (high - s);
        }
    }

    /** y[yFrom + j] *= x[xFrom + j] for j below n. */
    static void multiply(double[] xHigh, double[] xLow, int xFrom, double[] yHigh, double[] yLow, int yFrom, int n) {
        for (int j = 0; j < n; j++) {
            double x = xHigh[xFrom + j];
            double t = SPLITTER * x;
            double xTop = t - (t - x);
            double xRest = x - xTop;
            double y = yHigh[yFrom + j];
            double u = SPLITTER * y;
            double yTop = u - (u - y);
            double yRest = y - yTop;
            double p = x * y;
            double e = ((xTop * yTop - p) + xTop * yRest + xRest * yTop) + xRest * yRest;
            e += y * xLow[xFrom + j] + x * yLow[yFrom + j];
            double high = p + e;
            yHigh[yFrom + j] = high;
            yLow[yFrom + j] = e - (high - p);
        }
    }

    /** y[from + j] *= a for j below n. */
    static void scale(double aHigh, double aLow, double[] yHigh, double[] yLow, int from, int n) {
        double aTop = top(aHigh);
        double aRest = aHigh - aTop;
        for (int j = 0; j < n; j++) {
            double y = yHigh[from + j];
            double u = SPLITTER * y;
            double yTop = u - (u - y);
            double yRest = y - yTop;
            double p = aHigh * y;
            double e = ((aTop * yTop - p) + aTop * yRest + aRest * yTop) + aRest * yRest;
            e += aHigh * yLow[from + j] + aLow * y;
            double high = p + e;
            yHigh[from + j] = high;
            yLow[from + j] = e - (high - p);
        }
    }

    /** y[from + j] /= a for a double a that is not 0; within 2^-103 relative. */
    static void divide(double a, double[] yHigh, double[] yLow, int from, int n) {
        double aTop = top(a);
        double aRest = a - aTop;
        for (int j = 0; j < n; j++) {
            double y = yHigh[from + j];
            double q = y / a;
            double u = SPLITTER * q;
            double qTop = u - (u - q);
            double qRest = q - qTop;
            double p = q * a;
            double e = ((aTop * qTop - p) + aTop * qRest + aRest * qTop) + aRest * qRest;
            double second = (((y - p) - e) + yLow[from + j]) / a;
            double high = q + second;
            yHigh[from + j] = high;
            yLow[from + j] = second - (high - q);
        }
    }

    /**
     * Sum of products of n pairs, in four interleaved sums that are added in order.
     *
     * <p>Within n·2^-103 of the sum of the sizes of the products.
     */
    static DoubleDouble dot(double[] xHigh, double[] xLow, int xFrom, double[] yHigh, double[] yLow, int yFrom, int n) {
        double[] high = new double[4];
        double[] low = new double[4];
        for (int j = 0; j < n; j++) {
            int lane = j & 3;
            double x = xHigh[xFrom + j];
            double y = yHigh[yFrom + j];
            double xTop = top(x);
            double xRest = x - xTop;
            double yTop = top(y);
            double yRest = y - yTop;
            double p = x * y;
            double e = ((xTop * yTop - p) + xTop * yRest + xRest * yTop) + xRest * yRest;
            e += x * yLow[yFrom + j] + y * xLow[xFrom + j];
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
