package turnstone.measure;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.Serializable;
import java.math.BigDecimal;
import turnstone.json.Json;

/**
 * What a count scale costs on records that it has counted: the largest rounding distance, in steps, and the share of records held without loss.
 *
 * <p>A value is held without loss where offset + q·step, exactly, reads back as the value in its own type; its rounding distance then counts as 0. (offset + q·step in
 * doubles would differ from many a decimal that is held.) Otherwise the distance is |(x − offset)/step − q|. The order of records and merges does not matter.
 * Not thread-safe.
 */
public final class ScaleLoss implements Serializable {
    private static final long EXACT_INTEGER = 1L << 53;

    private final CountScale scale;
    private final SourceType type;
    private final double[] largestDistance;
    private final long[] offsetUnits;
    private final long[] stepUnits;
    private final double[] power;
    private long records;
    private long recordsHeld;

    /** Nothing seen yet. */
    public ScaleLoss(CountScale scale, SourceType type) {
        this.scale = scale;
        this.type = type;
        int d = scale.channels();
        largestDistance = new double[d];
        offsetUnits = new long[d];
        stepUnits = new long[d];
        power = new double[d];
        for (int c = 0; c < d; c++) {
            prepare(c);
        }
    }

    /** Offset and step as integers over one power of ten, where that is exact in a double; power 0 otherwise. */
    private void prepare(int channel) {
        BigDecimal offset = scale.channel(channel).offset();
        BigDecimal step = scale.channel(channel).step();
        int places = Math.max(0, Math.max(offset.scale(), step.scale()));
        BigDecimal limit = BigDecimal.valueOf(EXACT_INTEGER);
        boolean exact = places <= DecimalText.LARGEST_POWER
                && offset.movePointRight(places).abs().compareTo(limit) < 0
                && step.movePointRight(places).compareTo(limit) < 0;
        if (exact) {
            offsetUnits[channel] = offset.movePointRight(places).longValueExact();
            stepUnits[channel] = step.movePointRight(places).longValueExact();
            power[channel] = DecimalText.power(places);
        }
    }

    /** Sees one record and the counts that {@link CountScale#toCounts} made of it. */
    public void add(double[] values, int from, double[] counts, int to) {
        boolean held = true;
        for (int c = 0; c < largestDistance.length; c++) {
            double x = values[from + c];
            double q = counts[to + c];
            if (!isHeld(c, x, q)) {
                held = false;
                double distance = Math.abs((x - scale.offset(c)) / scale.step(c) - q);
                largestDistance[c] = Math.max(largestDistance[c], distance);
            }
        }
        records++;
        if (held) {
            recordsHeld++;
        }
    }

    private boolean isHeld(int channel, double x, double q) {
        if (power[channel] != 0) {
            double units = offsetUnits[channel] + stepUnits[channel] * q;
            if (Math.abs(units) < EXACT_INTEGER && same(units / power[channel], x)) {
                return true;
            }
        }
        BigDecimal exact = scale.channel(channel)
                .offset()
                .add(scale.channel(channel).step().multiply(new BigDecimal(q)));
        return type == SourceType.FLOAT ? exact.floatValue() == (float) x : exact.doubleValue() == x;
    }

    /**
     * For floats a double is rounded once more. Where that lands on x though the decimal itself would not, the decimal is within 2^-53 of a float's midpoint: a
     * decimal of so few digits that is no midpoint is not that near, and a midpoint is no shortest decimal.
     */
    private boolean same(double nearest, double x) {
        return type == SourceType.FLOAT ? (float) nearest == (float) x : nearest == x;
    }

    /** Takes over what the other has seen on the same scale; the other does not change. */
    public void merge(ScaleLoss other) {
        if (!scale.fingerprint().equals(other.scale.fingerprint()) || type != other.type) {
            throw new IllegalArgumentException("scale losses of different scales or types");
        }
        for (int c = 0; c < largestDistance.length; c++) {
            largestDistance[c] = Math.max(largestDistance[c], other.largestDistance[c]);
        }
        records += other.records;
        recordsHeld += other.recordsHeld;
    }

    /** Records seen. */
    public long records() {
        return records;
    }

    /** Records of which every channel is held without loss. */
    public long recordsHeld() {
        return recordsHeld;
    }

    /** Share of records held without loss; 1 where none was seen. */
    public double shareHeld() {
        return records == 0 ? 1 : (double) recordsHeld / records;
    }

    /** Whether nothing was lost. */
    public boolean isLossless() {
        return recordsHeld == records;
    }

    /** Largest rounding distance on a channel, in steps. */
    public double largestDistance(int channel) {
        return largestDistance[channel];
    }

    /** Largest rounding distance on any channel, in steps. */
    public double largestDistance() {
        double largest = 0;
        for (double distance : largestDistance) {
            largest = Math.max(largest, distance);
        }
        return largest;
    }

    /** {@code {"records", "recordsHeld", "largestDistance_steps"}}. */
    public JsonNode json() {
        ObjectNode node = Json.object();
        return node.put("records", records)
                .put("recordsHeld", recordsHeld)
                .put("largestDistance_steps", largestDistance());
    }
}
