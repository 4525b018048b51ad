package turnstone.fisher;

import java.math.BigDecimal;
import java.math.BigInteger;

/**
 * An unevaluated sum of two doubles, about 106 bits; for numbers outside the loops, which work on arrays ({@link Kernels}).
 *
 * <p>Two-sum of D. E. Knuth; splitting and two-product of T. J. Dekker, Numerische Mathematik 18 (1971), 224–242. Products are split
 * rather than fused: the fused operation is emulated, hundreds of times slower, where the hardware lacks it. Each operation is within a
 * few units of 2^-104 relative, for magnitudes between 2^-900 and 2^900.
 *
 * @param high nearest double of the sum
 * @param low what is left, at most half a unit in the last place of {@code high}
 */
record DoubleDouble(double high, double low) {
    static final DoubleDouble ZERO = new DoubleDouble(0, 0);
    static final DoubleDouble ONE = new DoubleDouble(1, 0);

    static DoubleDouble of(double value) {
        return new DoubleDouble(value, 0);
    }

    /** Nearest double, then nearest double of what is left. */
    static DoubleDouble of(BigDecimal value) {
        double high = value.doubleValue();
        return new DoubleDouble(high, value.subtract(new BigDecimal(high)).doubleValue());
    }

    /** Nearest double, then nearest double of what is left. */
    static DoubleDouble of(BigInteger value) {
        return of(new BigDecimal(value));
    }

    /** Nearest double, then what is left: exact but for the last bits of a 63-bit number, which fit the low part. */
    static DoubleDouble of(long value) {
        return of(BigInteger.valueOf(value));
    }

    /** Sum of two doubles, exact. */
    static DoubleDouble sum(double a, double b) {
        double s = a + b;
        double part = s - a;
        return new DoubleDouble(s, (a - (s - part)) + (b - part));
    }

    /** Product of two doubles, exact. */
    static DoubleDouble product(double a, double b) {
        double p = a * b;
        double aTop = Kernels.top(a);
        double aRest = a - aTop;
        double bTop = Kernels.top(b);
        double bRest = b - bTop;
        return new DoubleDouble(p, ((aTop * bTop - p) + aTop * bRest + aRest * bTop) + aRest * bRest);
    }

    DoubleDouble plus(DoubleDouble other) {
        DoubleDouble s = sum(high, other.high);
        DoubleDouble t = sum(low, other.low);
        DoubleDouble first = normal(s.high, s.low + t.high);
        return normal(first.high, first.low + t.low);
    }

    DoubleDouble minus(DoubleDouble other) {
        return plus(other.negated());
    }

    DoubleDouble negated() {
        return new DoubleDouble(-high, -low);
    }

    DoubleDouble times(DoubleDouble other) {
        DoubleDouble p = product(high, other.high);
        return normal(p.high, p.low + (high * other.low + low * other.high));
    }

    DoubleDouble times(double other) {
        DoubleDouble p = product(high, other);
        return normal(p.high, p.low + low * other);
    }

    DoubleDouble over(DoubleDouble other) {
        double first = high / other.high;
        DoubleDouble rest = minus(other.times(first));
        double second = rest.high / other.high;
        double third = rest.minus(other.times(second)).high / other.high;
        DoubleDouble quotient = normal(first, second);
        return normal(quotient.high, quotient.low + third);
    }

    /** Square root of a number that is not negative; one Newton step from the double root (A. H. Karp, P. Markstein 1997). */
    DoubleDouble root() {
        if (high < 0) {
            throw new IllegalArgumentException("root of " + high);
        }
        if (high == 0) {
            return ZERO;
        }
        double first = Math.sqrt(high);
        double correction = minus(product(first, first)).high / (2 * first);
        DoubleDouble better = normal(first, correction);
        double again = minus(better.times(better)).high / (2 * first);
        return normal(better.high, better.low + again);
    }

    DoubleDouble scaledBy(double powerOfTwo) {
        return new DoubleDouble(high * powerOfTwo, low * powerOfTwo);
    }

    private static DoubleDouble normal(double a, double b) {
        double s = a + b;
        return new DoubleDouble(s, b - (s - a));
    }
}
