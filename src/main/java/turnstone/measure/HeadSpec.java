package turnstone.measure;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.Serializable;
import java.util.ArrayList;
import java.util.List;
import java.util.OptionalDouble;
import java.util.OptionalLong;
import java.util.TreeSet;
import turnstone.fault.Fault;
import turnstone.json.Json;

/**
 * The steps of the pretreatment head and their numbers. Immutable, checked: a senseless combination can't be made.
 *
 * <p>Steps in their order, each optional: checks of raw counts (saturated, dead), dark/white correction, resampling to the axis, floor, no-signal level, log10(1/R),
 * mask, SNV. Made by {@link #builder}; {@link #json} has only the keys of the steps that are there.
 */
public final class HeadSpec implements Serializable {
    final InputKind input;
    final int channels;
    final double[] axis_nm;
    final Resampling resampling;
    final Double saturatedAt;
    final Double deadAtOrBelow;
    final Long maxWhiteAge_ms;
    final Long maxDarkAge_ms;
    final Double floor;
    final Double noSignalBelow;
    final Logarithm logarithm;
    final ArrayList<Drop> mask;
    final Double snvSpreadFloor;
    private final int[] kept;

    /** Whether log10(1/R) is taken. */
    enum Logarithm {
        NONE,
        ABSORBANCE
    }

    /** One masked range, both ends included: channels (0-based) or wavelengths in nm. */
    record Drop(boolean byWavelength, double first, double last) implements Serializable {
        boolean holds(int channel, double[] axis_nm) {
            double position = byWavelength ? axis_nm[channel] : channel;
            return first <= position && position <= last;
        }
    }

    HeadSpec(HeadSpecBuilder from) {
        input = from.inputKind();
        channels = from.channels;
        axis_nm = from.axis_nm.clone();
        resampling = from.resampling;
        saturatedAt = from.saturatedAt;
        deadAtOrBelow = from.deadAtOrBelow;
        maxWhiteAge_ms = from.maxWhiteAge_ms;
        maxDarkAge_ms = from.maxDarkAge_ms;
        floor = from.floor;
        noSignalBelow = from.noSignalBelow;
        logarithm = from.logarithm;
        mask = new ArrayList<>(from.mask);
        snvSpreadFloor = from.snvSpreadFloor;
        HeadSpecChecks.numbers(this);
        HeadSpecChecks.combination(this);
        kept = keptChannels(channels, axis_nm, mask);
        HeadSpecChecks.kept(this, kept.length);
    }

    private static int[] keptChannels(int channels, double[] axis_nm, List<Drop> mask) {
        TreeSet<Integer> kept = new TreeSet<>();
        for (int c = 0; c < channels; c++) {
            int channel = c;
            if (mask.stream().noneMatch(drop -> drop.holds(channel, axis_nm))) {
                kept.add(c);
            }
        }
        return kept.stream().mapToInt(Integer::intValue).toArray();
    }

    /** Starts a head for this many channels: of the axis where records are resampled, of the record otherwise. */
    public static HeadSpecBuilder builder(int channels) {
        return new HeadSpecBuilder(channels);
    }

    /** A head that passes values through unchanged: plain tables. */
    public static HeadSpec none(int channels) {
        return builder(channels).build();
    }

    /** What the channels of a record are when they arrive. */
    public InputKind input() {
        return input;
    }

    /** Channels after resampling, before the mask. */
    public int channels() {
        return channels;
    }

    /** Channels that come out. */
    public int outputs() {
        return kept.length;
    }

    /** Which of {@link #channels} come out, 0-based, ascending. */
    public int[] kept() {
        return kept.clone();
    }

    /** The plant's wavelength axis in nm, or an empty array. */
    public double[] axis_nm() {
        return axis_nm.clone();
    }

    /** Whether records have to be brought to the axis. */
    public Resampling resampling() {
        return resampling;
    }

    /** Whether dark and white are used. */
    public boolean corrects() {
        return maxWhiteAge_ms != null;
    }

    /** Whether log10(1/R) is taken. */
    public boolean takesLogarithm() {
        return logarithm == Logarithm.ABSORBANCE;
    }

    /** Whether SNV is applied. */
    public boolean appliesSnv() {
        return snvSpreadFloor != null;
    }

    /** Whether output values are computed rather than recorded, so that no count scale can hold them without loss. */
    public boolean computes() {
        return corrects() || resampling == Resampling.FROM_INSTRUMENT || takesLogarithm() || appliesSnv();
    }

    /** Whether a record can come out as no signal. */
    public boolean mayFindNoSignal() {
        return noSignalBelow != null || snvSpreadFloor != null;
    }

    /** Mean reflectance below which a record is no signal. */
    public OptionalDouble noSignalBelow() {
        return noSignalBelow == null ? OptionalDouble.empty() : OptionalDouble.of(noSignalBelow);
    }

    /** The raw count from which a channel is saturated. */
    public OptionalDouble saturatedAt() {
        return saturatedAt == null ? OptionalDouble.empty() : OptionalDouble.of(saturatedAt);
    }

    /** The raw count up to which a channel is dead. */
    public OptionalDouble deadAtOrBelow() {
        return deadAtOrBelow == null ? OptionalDouble.empty() : OptionalDouble.of(deadAtOrBelow);
    }

    /** The reflectance that lower ones are raised to. */
    public OptionalDouble floor() {
        return floor == null ? OptionalDouble.empty() : OptionalDouble.of(floor);
    }

    /** The standard deviation over a record's channels below which SNV finds no signal. */
    public OptionalDouble snvSpreadFloor() {
        return snvSpreadFloor == null ? OptionalDouble.empty() : OptionalDouble.of(snvSpreadFloor);
    }

    /** Largest age of a white. */
    public OptionalLong maxWhiteAge_ms() {
        return maxWhiteAge_ms == null ? OptionalLong.empty() : OptionalLong.of(maxWhiteAge_ms);
    }

    /** Largest age of a dark. */
    public OptionalLong maxDarkAge_ms() {
        return maxDarkAge_ms == null ? OptionalLong.empty() : OptionalLong.of(maxDarkAge_ms);
    }

    /** Channel numbers in it count from 1. */
    public JsonNode json() {
        ObjectNode node = Json.object().put("input", input.label()).put("channels", channels);
        if (axis_nm.length > 0) {
            node.set("axis_nm", Json.array(axis_nm));
            node.put("resampled", resampling == Resampling.FROM_INSTRUMENT);
        }
        put(node, "saturatedAt", saturatedAt);
        put(node, "deadAtOrBelow", deadAtOrBelow);
        if (maxWhiteAge_ms != null) {
            node.put("maxWhiteAge_ms", maxWhiteAge_ms).put("maxDarkAge_ms", maxDarkAge_ms);
        }
        put(node, "floor", floor);
        put(node, "noSignalBelow", noSignalBelow);
        if (takesLogarithm()) {
            node.put("logarithm", "log10(1/R)");
        }
        if (!mask.isEmpty()) {
            ArrayNode drops = node.putArray("mask");
            for (Drop drop : mask) {
                ObjectNode range = drops.addObject();
                if (drop.byWavelength) {
                    range.put("from_nm", drop.first).put("to_nm", drop.last);
                } else {
                    range.put("fromChannel", (int) drop.first + 1).put("toChannel", (int) drop.last + 1);
                }
            }
        }
        put(node, "snvSpreadFloor", snvSpreadFloor);
        return node;
    }

    private static void put(ObjectNode node, String key, Double value) {
        if (value != null) {
            node.put(key, value);
        }
    }

    /**
     * Reads what {@link #json} wrote.
     *
     * @throws Fault of kind storage for an unknown or malformed key, of kind usage for a senseless combination
     */
    public static HeadSpec fromJson(JsonNode node) {
        return HeadSpecBuilder.fromJson(node).build();
    }

    /** SHA-256 of the canonical {@link #json}. */
    public String fingerprint() {
        return Json.fingerprint(json());
    }

    /** The fields that differ, for a person: {@code floor: 0.001 here, absent there}. Empty where the fingerprints are equal. */
    public List<String> differences(HeadSpec other) {
        JsonNode here = json();
        JsonNode there = other.json();
        TreeSet<String> keys = new TreeSet<>();
        here.fieldNames().forEachRemaining(keys::add);
        there.fieldNames().forEachRemaining(keys::add);
        List<String> differences = new ArrayList<>();
        for (String key : keys) {
            if (!here.path(key).equals(there.path(key))) {
                differences.add(key + ": " + brief(here.path(key)) + " here, " + brief(there.path(key)) + " there");
            }
        }
        return differences;
    }

    private static String brief(JsonNode value) {
        if (value.isMissingNode()) {
            return "absent";
        }
        if (value.isArray() && value.size() > 4) {
            return value.size() + " numbers from " + value.get(0) + " to " + value.get(value.size() - 1);
        }
        return value.isDouble() ? DecimalText.shortest(value.doubleValue()) : value.toString();
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof HeadSpec spec && json().equals(spec.json());
    }

    @Override
    public int hashCode() {
        return json().hashCode();
    }
}
