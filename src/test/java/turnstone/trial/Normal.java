package turnstone.trial;

/** The standard normal law for invented plants. */
final class Normal {
    private Normal() {}

    /** P(Z ≤ z), to 7.5e-8: Abramowitz and Stegun, Handbook of Mathematical Functions (1964), 26.2.17, from memory. */
    static double below(double z) {
        double x = Math.abs(z);
        double t = 1 / (1 + 0.2316419 * x);
        double series =
                t * (0.319381530 + t * (-0.356563782 + t * (1.781477937 + t * (-1.821255978 + t * 1.330274429))));
        double tail = StrictMath.exp(-x * x / 2) / Math.sqrt(2 * Math.PI) * series;
        return z >= 0 ? 1 - tail : tail;
    }
}
