package turnstone.moments;

import java.math.BigInteger;
import java.nio.ByteBuffer;

/**
 * Adds up moments in place: the left side changes, the right does not. Shapes and counts are checked before anything changes. Not for sharing
 * between threads.
 */
public final class MomentsAccumulator {
    private final int channels;
    private final WideSums sums;
    private final WideSums products;
    private long records;

    /** Starts from a copy of these moments. */
    MomentsAccumulator(Moments start) {
        this.channels = start.channels();
        this.records = start.records();
        this.sums = start.sums().copy();
        this.products = start.products().copy();
    }

    /**
     * An accumulator of no records.
     *
     * @throws IllegalArgumentException if there are fewer channels than 1 or more than {@link Bounds#MOST_CHANNELS}
     */
    public static MomentsAccumulator empty(int channels) {
        return new MomentsAccumulator(Moments.empty(channels));
    }

    /** Number of channels. */
    public int channels() {
        return channels;
    }

    /** Number of records so far. */
    public long records() {
        return records;
    }

    /**
     * Adds moments of further records.
     *
     * @throws IllegalArgumentException if the channels differ
     * @throws ArithmeticException if there would be more records than {@link Bounds#MOST_RECORDS}
     */
    public MomentsAccumulator merge(Moments other) {
        checkChannels(other);
        if (other.records() > Bounds.MOST_RECORDS - records) {
            throw new ArithmeticException(
                    "exact sums hold " + Bounds.MOST_RECORDS + " records, not " + (records + other.records()));
        }
        sums.addAll(other.sums());
        products.addAll(other.products());
        records += other.records();
        return this;
    }

    /**
     * Takes moments of some of the records out.
     *
     * @throws IllegalArgumentException if the channels differ, or the others can't be part of these: more records, or a scatter below zero would
     *     remain
     */
    public MomentsAccumulator subtract(Moments other) {
        checkChannels(other);
        long left = records - other.records();
        if (left < 0) {
            throw new IllegalArgumentException("can't take " + other.records() + " records out of " + records);
        }
        for (int i = 0; i < channels; i++) {
            if (!leavesPossible(left, i, other)) {
                throw new IllegalArgumentException(
                        "these records are not among those that they are taken out of: channel " + i
                                + " would have a scatter below zero");
            }
        }
        sums.subtractAll(other.sums());
        products.subtractAll(other.products());
        records = left;
        return this;
    }

    /** What has been added up, as a value of its own. */
    public Moments snapshot() {
        return new Moments(channels, records, sums.copy(), products.copy());
    }

    private boolean leavesPossible(long left, int channel, Moments other) {
        int square = Bounds.at(channel, channel);
        long sumLow = sums.low(channel) - other.sumLow(channel);
        long sumHigh = sums.high(channel) - other.sumHigh(channel) - borrow(sums.low(channel), other.sumLow(channel));
        long squaresLow = products.low(square) - other.productLow(channel, channel);
        long squaresHigh = products.high(square)
                - other.productHigh(channel, channel)
                - borrow(products.low(square), other.productLow(channel, channel));
        return possible(left, sumHigh, sumLow, squaresHigh, squaresLow);
    }

    private static long borrow(long from, long taken) {
        return Long.compareUnsigned(from, taken) < 0 ? 1 : 0;
    }

    /**
     * Whether any records can have this sum and sum of squares, 128 bits each: {@code n P - s s >= 0}, and nothing but zeros without
     * records.
     */
    static boolean possible(long records, long sumHigh, long sumLow, long squaresHigh, long squaresLow) {
        if (records == 0) {
            return (sumHigh | sumLow | squaresHigh | squaresLow) == 0;
        }
        boolean words = sumHigh == sumLow >> 63 && squaresHigh == 0 && squaresLow >= 0;
        if (words) {
            // Both products are below 2^126.
            long most = Math.multiplyHigh(records, squaresLow);
            long least = Math.multiplyHigh(sumLow, sumLow);
            return most != least ? most > least : Long.compareUnsigned(records * squaresLow, sumLow * sumLow) >= 0;
        }
        BigInteger sum = wide(sumHigh, sumLow);
        BigInteger squares = wide(squaresHigh, squaresLow);
        return BigInteger.valueOf(records).multiply(squares).compareTo(sum.multiply(sum)) >= 0;
    }

    private static BigInteger wide(long high, long low) {
        return new BigInteger(ByteBuffer.allocate(16).putLong(high).putLong(low).array());
    }

    private void checkChannels(Moments other) {
        if (other.channels() != channels) {
            throw new IllegalArgumentException("moments of " + channels + " channels and of " + other.channels());
        }
    }
}
