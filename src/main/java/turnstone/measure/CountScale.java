package turnstone.measure;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.Serializable;
import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.Objects;
import turnstone.fault.Fault;
import turnstone.json.Json;

/**
 * The count scale of a ledger or a model: per channel, offset and step that turn a value into an integer count.
 *
 * <p>q = rint((x − offset)/step): offset and step are the doubles nearest to the decimals written, one IEEE subtraction, one IEEE division, ties
 * to even. A count fits where |q| is below the limit of the channel's {@link Precision}. Immutable.
 */
public final class CountScale implements Serializable {
    private final List<ChannelScale> scales;
    private final double[] offsets;
    private final double[] steps;
    private final double[] limits;

    private CountScale(List<ChannelScale> scales) {
        this.scales = new ArrayList<>(scales);
        int d = scales.size();
        offsets = new double[d];
        steps = new double[d];
        limits = new double[d];
        for (int c = 0; c < d; c++) {
            ChannelScale scale = scales.get(c);
            offsets[c] = scale.offset().doubleValue();
            steps[c] = scale.step().doubleValue();
            limits[c] = scale.precision().limit();
        }
    }

    /** A scale for each channel, in order. */
    public static CountScale of(List<ChannelScale> scales) {
        if (scales.isEmpty()) {
            throw new IllegalArgumentException("a count scale needs at least one channel");
        }
        scales.forEach(Objects::requireNonNull);
        return new CountScale(scales);
    }

    /** The same scale for every channel. */
    public static CountScale uniform(int channels, BigDecimal offset, BigDecimal step, Precision precision) {
        return of(Collections.nCopies(channels, new ChannelScale(offset, step, precision)));
    }

    /** Number of channels. */
    public int channels() {
        return offsets.length;
    }

    /** The scale of a channel, 0-based. */
    public ChannelScale channel(int channel) {
        return scales.get(channel);
    }

    /** The value of count 0. */
    public double offset(int channel) {
        return offsets[channel];
    }

    /** The value between neighbouring counts. */
    public double step(int channel) {
        return steps[channel];
    }

    /** Which channels are fine. */
    public boolean[] fineChannels() {
        boolean[] fine = new boolean[channels()];
        for (int c = 0; c < fine.length; c++) {
            fine[c] = scales.get(c).precision() == Precision.FINE;
        }
        return fine;
    }

    /**
     * Counts one record: d values from {@code values[from]}, d exact integers to {@code counts[to]}.
     *
     * @return −1, or the first channel that is not finite or off the scale; the counts are then of no use
     */
    public int toCounts(double[] values, int from, double[] counts, int to) {
        int d = offsets.length;
        if (from == 0 && to == 0) {
            count(values, counts, offsets, steps, d);
        } else {
            for (int c = 0; c < d; c++) {
                counts[to + c] = Math.rint((values[from + c] - offsets[c]) / steps[c]) + 0.0;
            }
        }
        for (int c = 0; c < d; c++) {
            // Written so that NaN fails as well.
            if (!(Math.abs(counts[to + c]) < limits[c])) {
                return c;
            }
        }
        return -1;
    }

    /** From 0 on, so that compilers make vector code of it. Adding 0 turns -0 into +0: a count has one form. */
    private static void count(double[] values, double[] counts, double[] offsets, double[] steps, int d) {
        for (int c = 0; c < d; c++) {
            counts[c] = Math.rint((values[c] - offsets[c]) / steps[c]) + 0.0;
        }
    }

    /** The reason to quarantine a record whose channel {@link #toCounts} named. */
    public void explain(int channel, double value, HeadTrouble trouble) {
        boolean finite = Math.abs(value) <= Double.MAX_VALUE;
        double edge = offsets[channel] + Math.copySign(steps[channel] * limits[channel], value - offsets[channel]);
        trouble.set(
                finite ? QuarantineReason.OFF_SCALE : QuarantineReason.NON_FINITE,
                channel,
                value,
                finite ? edge : Double.NaN);
    }

    /** The value that a count stands for: offset + step·count. */
    public double value(int channel, double count) {
        return offsets[channel] + steps[channel] * count;
    }

    /** {@code {"channels": [{"offset", "step", "precision"}]}}, the decimals as strings. */
    public JsonNode json() {
        ObjectNode node = Json.object();
        ArrayNode channels = node.putArray("channels");
        for (ChannelScale scale : scales) {
            channels.addObject()
                    .put("offset", scale.offset().toPlainString())
                    .put("step", scale.step().toPlainString())
                    .put("precision", scale.precision().label());
        }
        return node;
    }

    /**
     * Reads what {@link #json} wrote.
     *
     * @throws Fault of kind storage where it is something else
     */
    public static CountScale fromJson(JsonNode node) {
        List<ChannelScale> scales = new ArrayList<>();
        for (JsonNode channel : node.path("channels")) {
            scales.add(channelFrom(channel, scales.size() + 1));
        }
        if (scales.isEmpty()) {
            throw Fault.storage("a count scale without channels").expected("channels with offset, step and precision");
        }
        return of(scales);
    }

    private static ChannelScale channelFrom(JsonNode channel, int number) {
        try {
            return new ChannelScale(
                    new BigDecimal(channel.path("offset").asText()),
                    new BigDecimal(channel.path("step").asText()),
                    precision(channel.path("precision").asText()));
        } catch (IllegalArgumentException e) {
            throw Fault.storage("not a channel of a count scale")
                    .at("channel " + number)
                    .found(channel)
                    .expected("offset and step as decimals, precision coarse or fine")
                    .because(e);
        }
    }

    private static Precision precision(String label) {
        for (Precision precision : Precision.values()) {
            if (precision.label().equals(label)) {
                return precision;
            }
        }
        throw new IllegalArgumentException("no precision is called " + label);
    }

    /** SHA-256 over offsets and steps. Coarse or fine is not in it: it changes no sum. */
    public String fingerprint() {
        ObjectNode node = Json.object();
        ArrayNode offsetTexts = node.putArray("offsets");
        ArrayNode stepTexts = node.putArray("steps");
        for (ChannelScale scale : scales) {
            offsetTexts.add(scale.offset().toPlainString());
            stepTexts.add(scale.step().toPlainString());
        }
        return Json.fingerprint(node);
    }

    /** The fields that differ, for a person: {@code channel 12 step: 0.001 here, 0.0001 there}. Empty where the fingerprints are equal. */
    public List<String> differences(CountScale other) {
        if (channels() != other.channels()) {
            return List.of("channels: " + channels() + " here, " + other.channels() + " there");
        }
        List<String> differences = new ArrayList<>();
        for (int c = 0; c < channels(); c++) {
            ChannelScale here = channel(c);
            ChannelScale there = other.channel(c);
            note(differences, "channel " + (c + 1) + " offset", here.offset(), there.offset());
            note(differences, "channel " + (c + 1) + " step", here.step(), there.step());
        }
        return differences;
    }

    private static void note(List<String> differences, String field, BigDecimal here, BigDecimal there) {
        if (here.compareTo(there) != 0) {
            differences.add(field + ": " + here.toPlainString() + " here, " + there.toPlainString() + " there");
        }
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof CountScale scale && scales.equals(scale.scales);
    }

    @Override
    public int hashCode() {
        return scales.hashCode();
    }
}
