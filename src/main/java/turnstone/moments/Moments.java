package turnstone.moments;

import java.io.InvalidObjectException;
import java.io.ObjectInputStream;
import java.io.Serializable;
import java.math.BigInteger;

/**
 * How many count records, the sum of each channel, and the sum of products of each two channels: exact integers.
 *
 * <p>With addition, moments of disjoint sets of records are a commutative group, exactly: what was added can be taken out again. For {@code d}
 * channels there are {@code d} sums and {@code d(d+1)/2} products, 128 bits each, in units of counts and squared counts. Equal moments have equal
 * bytes and equal fingerprints, whatever way they came about. Immutable; serialised as {@link #toBytes()}.
 */
public final class Moments implements Serializable {
    private static final long serialVersionUID = 1L;

    private final int channels;
    private final long records;
    private final transient WideSums sums;
    private final transient WideSums products;

    /** Takes the sums over: the caller must not change them afterwards. */
    Moments(int channels, long records, WideSums sums, WideSums products) {
        this.channels = channels;
        this.records = records;
        this.sums = sums;
        this.products = products;
    }

    /**
     * Moments of no records.
     *
     * @throws IllegalArgumentException if there are fewer channels than 1 or more than {@link Bounds#MOST_CHANNELS}
     */
    public static Moments empty(int channels) {
        Bounds.checkChannels(channels);
        return new Moments(channels, 0, new WideSums(channels), new WideSums(Bounds.triangle(channels)));
    }

    /** Number of channels, {@code d}. */
    public int channels() {
        return channels;
    }

    /** Number of records. */
    public long records() {
        return records;
    }

    /** Sum of channel {@code i}. */
    public BigInteger sum(int i) {
        return sums.value(channel(i));
    }

    /** Sum of products of channels {@code i} and {@code j}, in either order. */
    public BigInteger product(int i, int j) {
        return products.value(entry(i, j));
    }

    /** High word of the sum of channel {@code i}, with its sign. */
    public long sumHigh(int i) {
        return sums.high(channel(i));
    }

    /** Low word of the sum of channel {@code i}, unsigned. */
    public long sumLow(int i) {
        return sums.low(channel(i));
    }

    /** High word of the sum of products, with its sign. */
    public long productHigh(int i, int j) {
        return products.high(entry(i, j));
    }

    /** Low word of the sum of products, unsigned. */
    public long productLow(int i, int j) {
        return products.low(entry(i, j));
    }

    /** Scatter about the means times the number of records: {@code n P_ij - s_i s_j}; never negative for {@code i = j}. */
    public BigInteger scatter(int i, int j) {
        return BigInteger.valueOf(records).multiply(product(i, j)).subtract(sum(i).multiply(sum(j)));
    }

    /**
     * Moments of both sets of records.
     *
     * @throws IllegalArgumentException if the channels differ
     * @throws ArithmeticException if there would be more records than {@link Bounds#MOST_RECORDS}
     */
    public Moments plus(Moments other) {
        return new MomentsAccumulator(this).merge(other).snapshot();
    }

    /**
     * Moments of these records without the others.
     *
     * @throws IllegalArgumentException if the channels differ, or the others can't be part of these: more records, or a scatter below zero would
     *     remain
     */
    public Moments minus(Moments other) {
        return new MomentsAccumulator(this).subtract(other).snapshot();
    }

    /** The bytes of {@link MomentsLayout}: versioned, checksummed, equal for equal moments. */
    public byte[] toBytes() {
        return MomentsLayout.write(this);
    }

    /**
     * Reads what {@link #toBytes()} wrote.
     *
     * @throws turnstone.fault.Fault storage, saying what is wrong with the bytes
     */
    public static Moments fromBytes(byte[] bytes) {
        return MomentsLayout.read(bytes);
    }

    /** SHA-256 of {@link #toBytes()}, 64 lower-case hexadecimal digits. */
    public String fingerprint() {
        return MomentsLayout.fingerprint(this);
    }

    WideSums sums() {
        return sums;
    }

    WideSums products() {
        return products;
    }

    private int channel(int i) {
        if (i < 0 || i >= channels) {
            throw new IndexOutOfBoundsException("channel " + i + " of " + channels);
        }
        return i;
    }

    private int entry(int i, int j) {
        return Bounds.at(Math.max(channel(i), channel(j)), Math.min(i, j));
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof Moments that
                && channels == that.channels
                && records == that.records
                && sums.equals(that.sums)
                && products.equals(that.products);
    }

    @Override
    public int hashCode() {
        return 31 * (31 * Long.hashCode(records) + sums.hashCode()) + products.hashCode();
    }

    @Override
    public String toString() {
        return "moments of " + records + " records, " + channels + " channels";
    }

    private Object writeReplace() {
        return new Bytes(toBytes());
    }

    private void readObject(ObjectInputStream stream) throws InvalidObjectException {
        throw new InvalidObjectException("moments are serialised as bytes");
    }

    private static final class Bytes implements Serializable {
        private static final long serialVersionUID = 1L;

        private final byte[] content;

        Bytes(byte[] content) {
            this.content = content;
        }

        private Object readResolve() {
            return fromBytes(content);
        }
    }
}
