package turnstone.moments;

import java.math.BigInteger;
import java.nio.ByteBuffer;
import java.util.Arrays;

/** A row of 128-bit two's complement integers, each as a high and a low word; an overflow is a defect and throws. */
final class WideSums {
    private final long[] high;
    private final long[] low;

    WideSums(int length) {
        this(new long[length], new long[length]);
    }

    private WideSums(long[] high, long[] low) {
        this.high = high;
        this.low = low;
    }

    WideSums copy() {
        return new WideSums(high.clone(), low.clone());
    }

    int length() {
        return high.length;
    }

    long high(int i) {
        return high[i];
    }

    long low(int i) {
        return low[i];
    }

    BigInteger value(int i) {
        return new BigInteger(
                ByteBuffer.allocate(16).putLong(high[i]).putLong(low[i]).array());
    }

    void clear() {
        Arrays.fill(high, 0);
        Arrays.fill(low, 0);
    }

    void set(int i, long highWord, long lowWord) {
        high[i] = highWord;
        low[i] = lowWord;
    }

    void add(int i, long highWord, long lowWord) {
        long before = high[i];
        long lowSum = low[i] + lowWord;
        long carry = Long.compareUnsigned(lowSum, lowWord) < 0 ? 1 : 0;
        long highSum = before + highWord + carry;
        if (((before ^ highSum) & (highWord ^ highSum)) < 0) {
            throw new ArithmeticException("sum " + i + " passes 128 bits");
        }
        high[i] = highSum;
        low[i] = lowSum;
    }

    void add(int i, long value) {
        add(i, value >> 63, value);
    }

    /** Adds {@code value * 2^shift}; the shift is 0 to 63. */
    void addShifted(int i, long value, int shift) {
        // Two steps, because a shift by 64 is a shift by none.
        add(i, (value >> 1) >> (63 - shift), value << shift);
    }

    void addAll(WideSums other) {
        for (int i = 0; i < high.length; i++) {
            add(i, other.high[i], other.low[i]);
        }
    }

    void subtractAll(WideSums other) {
        for (int i = 0; i < high.length; i++) {
            long before = high[i];
            long borrow = Long.compareUnsigned(low[i], other.low[i]) < 0 ? 1 : 0;
            long difference = before - other.high[i] - borrow;
            if (((before ^ other.high[i]) & (before ^ difference)) < 0) {
                throw new ArithmeticException("difference " + i + " passes 128 bits");
            }
            low[i] -= other.low[i];
            high[i] = difference;
        }
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof WideSums that && Arrays.equals(high, that.high) && Arrays.equals(low, that.low);
    }

    @Override
    public int hashCode() {
        return 31 * Arrays.hashCode(high) + Arrays.hashCode(low);
    }
}
