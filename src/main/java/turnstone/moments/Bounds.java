package turnstone.moments;

/**
 * The bounds that keep every sum exact, each beside the inequality it comes from. All limits are inclusive.
 *
 * <p>A count passes through three accumulators: a triangle of doubles, 64-bit panel sums and 128-bit sums. Each is emptied into the next before
 * its bound is passed.
 */
public final class Bounds {
    /** Bits of the low half of a split count: {@code q = high * 2^22 + low}. */
    static final int LOW_BITS = 22;

    /** Largest low half in size: {@code low} lies in {@code [-2^21, 2^21 - 1]}. */
    static final long LOW_LIMIT = 1L << (LOW_BITS - 1);

    /** Largest coarse count in size: {@code |q| < 2^21}. */
    public static final long COARSE_LIMIT = (1L << 21) - 1;

    /**
     * Largest fine count in size: {@code |q| < 2^43 - 2^21}, so that {@code high = (q + 2^21) >> 22} lies in
     * {@code [-(2^21 - 1), 2^21 - 1]}.
     */
    public static final long FINE_LIMIT = (1L << 43) - (1L << 21) - 1;

    /**
     * Records that a triangle of doubles may hold: each product of halves is at most {@code 2^21 * 2^21} in size, and
     * {@code 2048 * 2^42 = 2^53}. It is not met by 2049 records even of coarse counts: {@code 2049 * (2^21 - 1)^2 > 2^53}.
     */
    public static final int TRIANGLE_RECORDS = 2048;

    /** Records that 64-bit sums may hold: {@code 2^20 * 2^42 = 2^62 < 2^63}, which leaves a factor of 2. */
    public static final long PANEL_RECORDS = 1L << 20;

    /** Records that 128-bit sums may hold: {@code 2^41 * (2^43)^2 = 2^127}, and fine counts are smaller than {@code 2^43}. */
    public static final long MOST_RECORDS = 1L << 41;

    /** Channels of moments: {@code 16 * (d(d+1)/2 + d)} bytes must fit an array, and {@code 2d} halves a packed triangle. */
    public static final int MOST_CHANNELS = 8192;

    private Bounds() {}

    static void checkChannels(int channels) {
        if (channels < 1 || channels > MOST_CHANNELS) {
            throw new IllegalArgumentException("channels must be 1 to " + MOST_CHANNELS + ", not " + channels);
        }
    }

    /** Entries of a packed lower triangle with its diagonal. */
    static int triangle(int channels) {
        return channels * (channels + 1) / 2;
    }

    /** Where row {@code i}, column {@code j <= i} lies in a packed lower triangle. */
    static int at(int i, int j) {
        return i * (i + 1) / 2 + j;
    }

    /** The high half of a count. */
    static long high(long count) {
        return (count + LOW_LIMIT) >> LOW_BITS;
    }

    /** The low half of a count. */
    static long low(long count) {
        return count - (high(count) << LOW_BITS);
    }
}
