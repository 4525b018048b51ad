package turnstone.measure;

import com.fasterxml.jackson.databind.JsonNode;
import java.util.ArrayList;
import java.util.List;
import java.util.TreeSet;
import turnstone.fault.Fault;
import turnstone.json.Json;

/** Collects the steps of a head; {@link #build} checks them together. */
public final class HeadSpecBuilder {
    final int channels;
    double[] axis_nm = new double[0];
    Resampling resampling = Resampling.NONE;
    Double saturatedAt;
    Double deadAtOrBelow;
    Long maxWhiteAge_ms;
    Long maxDarkAge_ms;
    Double floor;
    Double noSignalBelow;
    HeadSpec.Logarithm logarithm = HeadSpec.Logarithm.NONE;
    final List<HeadSpec.Drop> mask = new ArrayList<>();
    Double snvSpreadFloor;
    private InputKind input;

    HeadSpecBuilder(int channels) {
        this.channels = channels;
    }

    /** Says what the channels are. Left out, it follows from the steps: counts where they are checked or corrected, reflectance where a step needs it, else values. */
    public HeadSpecBuilder input(InputKind kind) {
        input = kind;
        return this;
    }

    InputKind inputKind() {
        if (input != null) {
            return input;
        }
        if (saturatedAt != null || deadAtOrBelow != null || maxWhiteAge_ms != null) {
            return InputKind.COUNTS;
        }
        boolean needsReflectance = floor != null || noSignalBelow != null || logarithm == HeadSpec.Logarithm.ABSORBANCE;
        return needsReflectance ? InputKind.REFLECTANCE : InputKind.VALUES;
    }

    /** The plant's wavelength axis in nm, one per channel, ascending, and whether records have to be brought to it. */
    public HeadSpecBuilder axis(double[] wavelength_nm, Resampling how) {
        axis_nm = wavelength_nm.clone();
        resampling = how;
        return this;
    }

    /** A raw count at or above this is saturated. */
    public HeadSpecBuilder saturatedAt(double count) {
        saturatedAt = count;
        return this;
    }

    /** A raw count at or below this is a dead pixel. */
    public HeadSpecBuilder deadAtOrBelow(double count) {
        deadAtOrBelow = count;
        return this;
    }

    /** R = (count − dark)/(white − dark); neither reference may be older than this. */
    public HeadSpecBuilder correct(long maxAge_ms) {
        return correct(maxAge_ms, maxAge_ms);
    }

    /** R = (count − dark)/(white − dark), with a largest age for each reference. */
    public HeadSpecBuilder correct(long whiteAge_ms, long darkAge_ms) {
        maxWhiteAge_ms = whiteAge_ms;
        maxDarkAge_ms = darkAge_ms;
        return this;
    }

    /** Lower reflectances are raised to this. */
    public HeadSpecBuilder floor(double reflectance) {
        floor = reflectance;
        return this;
    }

    /** A record whose mean reflectance over the kept channels (after the floor) is below this is no signal. */
    public HeadSpecBuilder noSignalBelow(double meanReflectance) {
        noSignalBelow = meanReflectance;
        return this;
    }

    /** Takes log10(1/R). */
    public HeadSpecBuilder absorbance() {
        logarithm = HeadSpec.Logarithm.ABSORBANCE;
        return this;
    }

    /** Masks the axis between two wavelengths, both included. */
    public HeadSpecBuilder dropWavelengths(double from_nm, double to_nm) {
        mask.add(new HeadSpec.Drop(true, from_nm, to_nm));
        return this;
    }

    /** Masks channels by 0-based index, both included. */
    public HeadSpecBuilder dropChannels(int first, int last) {
        mask.add(new HeadSpec.Drop(false, first, last));
        return this;
    }

    /** Standard normal variate: less the record's mean, over its standard deviation (divisor n − 1). A deviation below the floor is no signal. */
    public HeadSpecBuilder snv(double spreadFloor) {
        snvSpreadFloor = spreadFloor;
        return this;
    }

    /**
     * The checked head.
     *
     * @throws Fault of kind usage for a number out of range or a senseless combination, with the reason
     */
    public HeadSpec build() {
        return new HeadSpec(this);
    }

    static HeadSpecBuilder fromJson(JsonNode node) {
        Keys keys = new Keys(node);
        HeadSpecBuilder builder =
                new HeadSpecBuilder((int) keys.whole("channels").longValue());
        builder.input(inputKind(keys.text("input")));
        if (keys.has("axis_nm")) {
            boolean resampled = keys.take("resampled").asBoolean();
            builder.axis(Json.doubles(keys.take("axis_nm")), resampled ? Resampling.FROM_INSTRUMENT : Resampling.NONE);
        }
        builder.saturatedAt = keys.number("saturatedAt");
        builder.deadAtOrBelow = keys.number("deadAtOrBelow");
        if (keys.has("maxWhiteAge_ms")) {
            builder.correct(keys.whole("maxWhiteAge_ms"), keys.whole("maxDarkAge_ms"));
        }
        builder.floor = keys.number("floor");
        builder.noSignalBelow = keys.number("noSignalBelow");
        if (keys.has("logarithm")) {
            keys.take("logarithm");
            builder.absorbance();
        }
        if (keys.has("mask")) {
            for (JsonNode range : keys.take("mask")) {
                builder.drop(new Keys(range));
            }
        }
        builder.snvSpreadFloor = keys.number("snvSpreadFloor");
        keys.finish();
        return builder;
    }

    private void drop(Keys range) {
        if (range.has("from_nm")) {
            dropWavelengths(range.number("from_nm"), range.number("to_nm"));
        } else {
            dropChannels((int) (range.whole("fromChannel") - 1), (int) (range.whole("toChannel") - 1));
        }
        range.finish();
    }

    private static InputKind inputKind(String label) {
        for (InputKind kind : InputKind.values()) {
            if (kind.label().equals(label)) {
                return kind;
            }
        }
        throw Fault.storage("an unknown kind of input in a pretreatment head").found(label);
    }

    /** Reads keys one by one and refuses those that nobody asked for. */
    static final class Keys {
        private final JsonNode node;
        private final TreeSet<String> left = new TreeSet<>();

        Keys(JsonNode node) {
            this.node = node;
            node.fieldNames().forEachRemaining(left::add);
        }

        boolean has(String key) {
            return node.has(key);
        }

        JsonNode take(String key) {
            left.remove(key);
            JsonNode value = node.path(key);
            if (value.isMissingNode() || value.isNull()) {
                throw Fault.storage("a pretreatment without " + key).found(node);
            }
            return value;
        }

        String text(String key) {
            return take(key).asText();
        }

        Long whole(String key) {
            JsonNode value = take(key);
            if (!value.canConvertToExactIntegral()) {
                throw Fault.storage("a pretreatment with a bad " + key)
                        .found(value)
                        .expected("a whole number");
            }
            return value.longValue();
        }

        /** The number, or null where the key is absent. */
        Double number(String key) {
            if (!has(key)) {
                return null;
            }
            JsonNode value = take(key);
            if (!value.isNumber()) {
                throw Fault.storage("a pretreatment with a bad " + key)
                        .found(value)
                        .expected("a number");
            }
            return value.doubleValue();
        }

        void finish() {
            if (!left.isEmpty()) {
                throw Fault.storage("a pretreatment with an unknown key").found(left.first());
            }
        }
    }
}
