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
        if (overflowOfAdding(other) < 0) {
            overflowOfSubtracting(other);
            throw new ArithmeticException("a sum passes 128 bits");
        }
    }

    void subtractAll(WideSums other) {
        if (overflowOfSubtracting(other) < 0) {
            overflowOfAdding(other);
            throw new ArithmeticException("a difference passes 128 bits");
        }
    }

    // Words wrap around, so each of the two undoes the other. No branch and no call in the loops, so that compilers
    // make vector code of them.

    /** Adds, and is negative where an entry wrapped around. */
    private long overflowOfAdding(WideSums other) {
        long overflow = 0;
        long[] otherHigh = other.high;
        long[] otherLow = other.low;
        for (int i = 0; i < high.length; i++) {
            long a = low[i];
            long b = otherLow[i];
            long sum = a + b;
            long carry = ((a & b) | ((a | b) & ~sum)) >>> 63;
            long before = high[i];
            long added = otherHigh[i];
            long after = before + added + carry;
            overflow |= (before ^ after) & (added ^ after);
            low[i] = sum;
            high[i] = after;
        }
        return overflow;
    }

    /** Subtracts, and is negative where an entry wrapped around. */
    private long overflowOfSubtracting(WideSums other) {
        long overflow = 0;
        long[] otherHigh = other.high;
        long[] otherLow = other.low;
        for (int i = 0; i < high.length; i++) {
            long a = low[i];
            long b = otherLow[i];
            long difference = a - b;
            long borrow = ((~a & b) | ((~a | b) & difference)) >>> 63;
            long before = high[i];
            long taken = otherHigh[i];
            long after = before - taken - borrow;
            overflow |= (before ^ taken) & (before ^ after);
            low[i] = difference;
            high[i] = after;
        }
        return overflow;
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
