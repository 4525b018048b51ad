package turnstone.measure;

import java.io.Serializable;
import java.math.BigDecimal;
import java.math.BigInteger;
import java.math.MathContext;
import java.math.RoundingMode;
import java.util.ArrayList;
import java.util.List;
import turnstone.fault.Fault;

/**
 * Sees values and proposes a count scale for them: per channel the least and greatest value and the number of decimal places that all values need, exactly. The order of
 * values and merges does not matter. Not thread-safe.
 */
public final class ScaleProposal implements Serializable {
    /** Doubles and their offset below this many steps in size come back from their counts (numerics, "Count scale": 30 million decimals tried). */
    static final double DOUBLE_STEPS = 0x1p49;

    /** As {@link #DOUBLE_STEPS}, for floats. */
    static final double FLOAT_STEPS = 0x1p23;

    /** Decimals with more places or zeros than this are beyond doubles or nearly so: taken as the double they are used as. */
    private static final int MOST_PLACES = 290;

    private static final MathContext TWO_DIGITS_UP = new MathContext(2, RoundingMode.CEILING);
    private static final BigDecimal HEADROOM_OVER_COUNTS = new BigDecimal(4).divide(new BigDecimal(1 << 22));
    private static final BigDecimal CONSTANT_CHANNEL_SHARE = new BigDecimal("0.000001");

    private final Seen[] seen;
    private final DecimalText text = new DecimalText();

    /** What one channel has shown. */
    private static final class Seen implements Serializable {
        private long values;
        private BigDecimal least = BigDecimal.ZERO;
        private BigDecimal greatest = BigDecimal.ZERO;
        private double leastDouble = Double.POSITIVE_INFINITY;
        private double greatestDouble = Double.NEGATIVE_INFINITY;
        private int places = Integer.MIN_VALUE;
        private boolean floats;

        void add(double nearest, BigDecimal exact) {
            boolean first = values == 0;
            if (first || exact.compareTo(least) < 0) {
                least = exact;
                leastDouble = nearest;
            }
            if (first || exact.compareTo(greatest) > 0) {
                greatest = exact;
                greatestDouble = nearest;
            }
            if (exact.signum() != 0) {
                places = Math.max(places, exact.stripTrailingZeros().scale());
            }
            values++;
        }

        void merge(Seen other) {
            if (other.values == 0) {
                return;
            }
            long total = values + other.values;
            add(other.leastDouble, other.least);
            add(other.greatestDouble, other.greatest);
            places = Math.max(places, other.places);
            floats |= other.floats;
            values = total;
        }

        int placesNeeded() {
            return places == Integer.MIN_VALUE ? 0 : places;
        }
    }

    /** Nothing seen yet. */
    public ScaleProposal(int channels) {
        seen = new Seen[channels];
        for (int c = 0; c < channels; c++) {
            seen[c] = new Seen();
        }
    }

    /** Number of channels. */
    public int channels() {
        return seen.length;
    }

    /**
     * Sees a decimal as written.
     *
     * @return whether it is a finite decimal; nothing is added otherwise
     */
    public boolean add(int channel, String decimal) {
        if (!text.read(decimal) || Double.isInfinite(text.value())) {
            return false;
        }
        Seen one = seen[channel];
        double nearest = text.value();
        if (nearest > one.leastDouble && nearest < one.greatestDouble && text.needsNoMoreThan(one.places)) {
            one.values++;
            return true;
        }
        BigDecimal exact = text.exact();
        boolean extreme =
                Math.abs((long) exact.scale()) > MOST_PLACES || Math.abs((long) exact.precision()) > MOST_PLACES;
        one.add(nearest, extreme ? new BigDecimal(DecimalText.shortest(nearest)) : exact);
        return true;
    }

    /**
     * Sees a number of a binary or integer type, taken as the shortest decimal that reads back as it in its own type.
     *
     * @return whether it is finite; nothing is added otherwise
     */
    public boolean add(int channel, double value, SourceType type) {
        if (!(Math.abs(value) <= Double.MAX_VALUE)) {
            return false;
        }
        if (type == SourceType.FLOAT && (double) (float) value != value) {
            throw new IllegalArgumentException("not a float: " + DecimalText.shortest(value));
        }
        Seen one = seen[channel];
        one.floats |= type == SourceType.FLOAT;
        if (value > one.leastDouble && value < one.greatestDouble && needsNoMoreThan(one.places, value, type)) {
            one.values++;
            return true;
        }
        String shortest = type == SourceType.FLOAT ? DecimalText.shortest((float) value) : DecimalText.shortest(value);
        one.add(value, new BigDecimal(shortest));
        return true;
    }

    /** Where some decimal of so many places reads back as the value, the shortest one has no more digits, so no more places. */
    private static boolean needsNoMoreThan(int places, double value, SourceType type) {
        if (places < 0 || places > DecimalText.LARGEST_POWER) {
            return false;
        }
        double power = DecimalText.power(places);
        double whole = Math.rint(value * power);
        double back = whole / power;
        return Math.abs(whole) < 0x1p53 && (type == SourceType.FLOAT ? (float) back == (float) value : back == value);
    }

    /** Takes over what the other has seen; the other does not change. */
    public void merge(ScaleProposal other) {
        if (other.seen.length != seen.length) {
            throw new IllegalArgumentException(
                    "scale proposals of " + seen.length + " and " + other.seen.length + " channels");
        }
        for (int c = 0; c < seen.length; c++) {
            seen[c].merge(other.seen[c]);
        }
    }

    /** Values seen on a channel. */
    public long values(int channel) {
        return seen[channel].values;
    }

    /** The least value seen. */
    public BigDecimal least(int channel) {
        return seen[channel].least;
    }

    /** The greatest value seen. */
    public BigDecimal greatest(int channel) {
        return seen[channel].greatest;
    }

    /** Decimal places that the values need; negative where all are multiples of a power of ten. */
    public int decimalPlaces(int channel) {
        return seen[channel].placesNeeded();
    }

    /**
     * The scale for what was seen.
     *
     * @throws Fault of kind input where a channel has shown no value, or can't be held without loss though that is demanded
     */
    public CountScale propose(ProposalKind kind) {
        List<ChannelScale> scales = new ArrayList<>();
        for (int c = 0; c < seen.length; c++) {
            if (seen[c].values == 0) {
                throw Fault.input("no value to take a count scale from").at("channel " + (c + 1));
            }
            scales.add(kind == ProposalKind.COMPUTED ? computed(seen[c]) : lossless(seen[c], c, kind));
        }
        return CountScale.of(scales);
    }

    private static ChannelScale computed(Seen one) {
        BigDecimal range = one.greatest.subtract(one.least);
        BigDecimal step = range.multiply(HEADROOM_OVER_COUNTS).round(TWO_DIGITS_UP);
        if (range.signum() == 0) {
            BigDecimal size = one.least.signum() == 0 ? BigDecimal.ONE : one.least.abs();
            step = size.multiply(CONSTANT_CHANNEL_SHARE).round(TWO_DIGITS_UP);
        }
        return fitting(one, step);
    }

    private static ChannelScale lossless(Seen one, int channel, ProposalKind kind) {
        BigDecimal step = new BigDecimal(BigInteger.ONE, one.placesNeeded());
        ChannelScale scale = fitting(one, step);
        if (kind == ProposalKind.LOSSLESS_OR_REFUSED && (scale == null || !surelyLossless(one, scale))) {
            throw Fault.input("no count scale holds this channel without loss")
                    .at("channel " + (channel + 1))
                    .found(one.least + " to " + one.greatest + " in steps of " + step.toPlainString())
                    .expected("fewer than 2^43 steps")
                    .remedy("accept the loss, or give a scale");
        }
        while (scale == null) {
            step = step.scaleByPowerOfTen(1);
            scale = fitting(one, step);
        }
        return scale;
    }

    /** Offset mid-range rounded to the step, coarse if that is enough, else fine; null where not even fine is. */
    private static ChannelScale fitting(Seen one, BigDecimal step) {
        BigDecimal middle = one.least.add(one.greatest).divide(BigDecimal.valueOf(2));
        BigDecimal offset = middle.divide(step, 0, RoundingMode.HALF_EVEN).multiply(step);
        BigDecimal reach = one.greatest.subtract(offset).max(offset.subtract(one.least));
        BigDecimal counts = reach.divide(step, 0, RoundingMode.CEILING);
        for (Precision precision : Precision.values()) {
            if (counts.compareTo(BigDecimal.valueOf(precision.limit())) < 0) {
                return new ChannelScale(offset, step, precision);
            }
        }
        return null;
    }

    private static boolean surelyLossless(Seen one, ChannelScale scale) {
        double largest = Math.max(Math.abs(one.leastDouble), Math.abs(one.greatestDouble));
        double step = scale.step().doubleValue();
        return largest < step * (one.floats ? FLOAT_STEPS : DOUBLE_STEPS)
                && Math.abs(scale.offset().doubleValue()) < step * DOUBLE_STEPS;
    }
}
