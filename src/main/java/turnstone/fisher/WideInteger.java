package turnstone.fisher;

import java.math.BigInteger;

/**
 * A mutable signed integer of 192 bits for n·P − s·s, and its one rounding to double-double.
 *
 * <p>With n below 2^63, P in 128 bits and s in 64 bits, n·P is below 2^190 and s·s below 2^126: nothing overflows. Sums beyond 64 bits
 * go by {@link BigInteger} instead, to the same result.
 */
final class WideInteger {
    /** Bits taken for one rounding: they fit a positive long, and the last stands for all the bits below it. */
    private static final int WINDOW = 62;

    private long top;
    private long middle;
    private long bottom;

    /** Becomes factor·value, value being 128 bits in two's complement and factor not negative. */
    void setProduct(long factor, long high, long low) {
        bottom = low * factor;
        long carried = Math.multiplyHigh(low, factor) + (low < 0 ? factor : 0);
        long upper = high * factor;
        middle = carried + upper;
        top = Math.multiplyHigh(high, factor) + (Long.compareUnsigned(middle, carried) < 0 ? 1 : 0);
    }

    /** Less a·b, each with its sign. */
    void subtractProduct(long a, long b) {
        long high = Math.multiplyHigh(a, b);
        subtractWords(a * b, high, high >> 63);
    }

    int signum() {
        return top < 0 ? -1 : (top | middle | bottom) == 0 ? 0 : 1;
    }

    BigInteger value() {
        return BigInteger.valueOf(top)
                .shiftLeft(64)
                .add(unsigned(middle))
                .shiftLeft(64)
                .add(unsigned(bottom));
    }

    /** The nearest double, ties to even, and the nearest double of what is left: the number itself is used up. */
    void round(double[] high, double[] low, int at) {
        double first = takeNearest();
        high[at] = first;
        low[at] = first == 0 ? 0 : takeNearest();
    }

    /** The nearest double; the number becomes what is left. */
    private double takeNearest() {
        boolean negative = top < 0;
        if (negative) {
            negate();
        }
        int shift = Math.max(0, length() - WINDOW);
        long window = window(shift);
        boolean rest = shift > 0 && hasBitsBelow(shift);
        // With one bit kept for everything below, rounding 62 bits is rounding them all.
        double nearest = (double) (rest ? window | 1 : window);
        subtractShifted((long) nearest, shift);
        if (negative) {
            negate();
        }
        return (negative ? -nearest : nearest) * Math.scalb(1.0, shift);
    }

    private int length() {
        if (top != 0) {
            return 192 - Long.numberOfLeadingZeros(top);
        }
        return middle != 0 ? 128 - Long.numberOfLeadingZeros(middle) : 64 - Long.numberOfLeadingZeros(bottom);
    }

    private long window(int shift) {
        int words = shift >> 6;
        int bits = shift & 63;
        long lower = words == 0 ? bottom : words == 1 ? middle : top;
        long upper = words == 0 ? middle : words == 1 ? top : 0;
        return bits == 0 ? lower : (lower >>> bits) | (upper << (64 - bits));
    }

    private boolean hasBitsBelow(int shift) {
        long below = shift >= 64 ? bottom : bottom << (64 - shift);
        if (shift > 64) {
            below |= shift >= 128 ? middle : middle << (128 - shift);
        }
        if (shift > 128) {
            below |= top << (192 - shift);
        }
        return below != 0;
    }

    /** Less value·2^shift, value not negative. */
    private void subtractShifted(long value, int shift) {
        int words = shift >> 6;
        int bits = shift & 63;
        long lower = value << bits;
        long upper = bits == 0 ? 0 : value >>> (64 - bits);
        subtractWords(
                words == 0 ? lower : 0,
                words == 0 ? upper : words == 1 ? lower : 0,
                words == 1 ? upper : words == 2 ? lower : 0);
    }

    private void subtractWords(long low, long mid, long high) {
        long borrow = Long.compareUnsigned(bottom, low) < 0 ? 1 : 0;
        bottom -= low;
        long before = middle;
        middle = before - mid - borrow;
        long lost = Long.compareUnsigned(before, mid) < 0 || (before == mid && borrow == 1) ? 1 : 0;
        top = top - high - lost;
    }

    private void negate() {
        long low = bottom;
        long mid = middle;
        long high = top;
        bottom = 0;
        middle = 0;
        top = 0;
        subtractWords(low, mid, high);
    }

    private static BigInteger unsigned(long word) {
        BigInteger value = BigInteger.valueOf(word & Long.MAX_VALUE);
        return word < 0 ? value.setBit(63) : value;
    }
}
