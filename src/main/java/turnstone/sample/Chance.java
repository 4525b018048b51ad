package turnstone.sample;

/**
 * Seeded numbers that are the same on every machine: SplitMix64 (Steele, Lea, Flood 2014, Fast splittable pseudorandom number generators, figure 13), normal
 * ones by the polar method of Marsaglia and Bray 1964 with {@link StrictMath}.
 */
final class Chance {
    private static final long GOLDEN = 0x9e3779b97f4a7c15L;
    private static final double DOUBLE_STEP = 0x1p-53;

    private long state;

    private Chance(long state) {
        this.state = state;
    }

    /** The sequence of a seed and a place: other places have unrelated sequences. */
    static Chance of(long seed, long... place) {
        long state = mixed(seed + GOLDEN);
        for (long part : place) {
            state = mixed((state ^ part) + GOLDEN);
        }
        return new Chance(state);
    }

    private static long mixed(long bits) {
        long z = (bits ^ (bits >>> 30)) * 0xbf58476d1ce4e5b9L;
        z = (z ^ (z >>> 27)) * 0x94d049bb133111ebL;
        return z ^ (z >>> 31);
    }

    long bits() {
        state += GOLDEN;
        return mixed(state);
    }

    /** Even, 0 included, 1 not. */
    double share() {
        return (bits() >>> 11) * DOUBLE_STEP;
    }

    double between(double least, double most) {
        return least + (most - least) * share();
    }

    /** Even over 0 to bound − 1; the bias of the modulus is below 1e-15 for the small bounds here. */
    int below(int bound) {
        return (int) Math.floorMod(bits(), (long) bound);
    }

    /** Normal with mean 0 and deviation 1. */
    double normal() {
        while (true) {
            double u = 2 * share() - 1;
            double v = 2 * share() - 1;
            double s = u * u + v * v;
            if (s > 0 && s < 1) {
                return u * StrictMath.sqrt(-2 * StrictMath.log(s) / s);
            }
        }
    }

    /** Nearly normal, mean 0, deviation 1, none beyond 3.5: the sum of the four 16-bit parts of one draw. For detector noise, of which there is much. */
    double pixelNoise() {
        long draw = bits();
        long sum = (draw & 0xffff) + (draw >>> 16 & 0xffff) + (draw >>> 32 & 0xffff) + (draw >>> 48);
        // Each part has variance (2^32 − 1)/12, so the sum has deviation 2^16/sqrt(3) to ten digits.
        return (sum - 131070.0) * (1.7320508075688772 / 65536);
    }
}
