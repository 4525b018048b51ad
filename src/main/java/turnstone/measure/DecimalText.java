package turnstone.measure;

import com.fasterxml.jackson.core.io.NumberOutput;
import java.io.Serializable;
import java.math.BigDecimal;
import java.util.regex.Pattern;

/**
 * Reads decimal numbers from text, exactly and strictly, and keeps the last one read.
 *
 * <p>Accepted: an optional sign, digits with at most one point, an optional exponent, blanks around. Not accepted, though Java's own parser takes
 * them: {@code NaN}, {@code Infinity}, hexadecimal, a trailing {@code d} or {@code f}. {@link #value} is the nearest double, ties to even: up to 2^53
 * as an integer and 10^22 as a power of ten both are exact doubles and one IEEE operation rounds rightly (W. D. Clinger, How to read floating point
 * numbers accurately, PLDI 1990); else Java's parser. Not thread-safe.
 */
public final class DecimalText implements Serializable {
    private static final int MOST_DIGITS = 18;
    private static final long EXACT_INTEGER = 1L << 53;
    /** 10^22 is the largest power of ten that is a double. */
    static final int LARGEST_POWER = 22;

    private static final Pattern DECIMAL = Pattern.compile("[+-]?(\\d+\\.?\\d*|\\.\\d+)([eE][+-]?\\d{1,9})?");
    private static final double[] POWERS = powers();

    private String text = "0";
    private double value;
    private long unscaled;
    private int scale;
    private Form form = Form.SHORT;

    private enum Form {
        SHORT,
        LONG
    }

    private static double[] powers() {
        double[] powers = new double[LARGEST_POWER + 1];
        powers[0] = 1;
        for (int i = 1; i < powers.length; i++) {
            powers[i] = powers[i - 1] * 10;
        }
        return powers;
    }

    /** 10 to a power from 0 to {@link #LARGEST_POWER}, exactly. */
    static double power(int exponent) {
        return POWERS[exponent];
    }

    /** The shortest decimal that reads back as this double, the same on every JVM. */
    public static String shortest(double value) {
        return NumberOutput.toString(value, true);
    }

    /** The shortest decimal that reads back as this float, the same on every JVM. */
    public static String shortest(float value) {
        return NumberOutput.toString(value, true);
    }

    /**
     * Reads a decimal.
     *
     * @return whether it is one; where it is not, what was read before stays
     */
    public boolean read(String decimal) {
        if (decimal == null) {
            return false;
        }
        int from = 0;
        int to = decimal.length();
        while (from < to && decimal.charAt(from) <= ' ') {
            from++;
        }
        while (to > from && decimal.charAt(to - 1) <= ' ') {
            to--;
        }
        return readShort(decimal, from, to) || readLong(decimal.substring(from, to));
    }

    private boolean readShort(String decimal, int from, int to) {
        int at = from;
        boolean negative = at < to && decimal.charAt(at) == '-';
        if (negative || (at < to && decimal.charAt(at) == '+')) {
            at++;
        }
        long digits = 0;
        int count = 0;
        int point = -1;
        for (; at < to; at++) {
            char character = decimal.charAt(at);
            if (character == '.' && point < 0) {
                point = count;
            } else if (character >= '0' && character <= '9' && count < MOST_DIGITS) {
                digits = digits * 10 + (character - '0');
                count++;
            } else {
                return false;
            }
        }
        int places = point < 0 ? 0 : count - point;
        if (count == 0 || digits > EXACT_INTEGER) {
            return false;
        }
        // -0 reads as 0: a decimal has no signed zero.
        value = digits == 0 ? 0 : (negative ? -(double) digits : (double) digits) / POWERS[places];
        unscaled = negative ? -digits : digits;
        scale = places;
        form = Form.SHORT;
        return true;
    }

    private boolean readLong(String decimal) {
        if (!DECIMAL.matcher(decimal).matches()) {
            return false;
        }
        text = decimal;
        value = Double.parseDouble(decimal) + 0.0;
        form = Form.LONG;
        return true;
    }

    /** The nearest double; infinite where the decimal is beyond all doubles. */
    public double value() {
        return value;
    }

    /** The decimal itself. */
    public BigDecimal exact() {
        return form == Form.SHORT ? BigDecimal.valueOf(unscaled, scale) : new BigDecimal(text);
    }

    /** Whether all digits after this many decimal places (negative: before the point) are zeros. */
    boolean needsNoMoreThan(int places) {
        if (form == Form.SHORT && scale <= places) {
            return true;
        }
        return form == Form.SHORT && unscaled == 0;
    }
}
