package turnstone.decide;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import turnstone.json.Json;

/**
 * What a model was made from: its lineage.
 *
 * @param days ledger days, ascending; empty for a table without a plant
 * @param parts records and showings by instrument and material; a table has no instrument and no showings
 * @param momentsFingerprint of the summed moments, where the maker states it
 * @param inputs names of files, for the reader only: they are no part of the model's fingerprint
 */
public record MadeFrom(List<Day> days, List<Part> parts, Optional<String> momentsFingerprint, List<String> inputs) {
    /**
     * A ledger day.
     *
     * @param day as written, {@code 2026-03-01}
     * @param revision of the day, from 1
     * @param fingerprint of its moments
     */
    public record Day(String day, int revision, String fingerprint) {}

    /**
     * Records of one material on one instrument.
     *
     * @param instrument empty for a table
     * @param material its name
     * @param records that were fitted
     * @param showings they came from; 0 for a table
     */
    public record Part(String instrument, String material, long records, long showings) {}

    /** Keeps copies. */
    public MadeFrom {
        days = List.copyOf(days);
        parts = List.copyOf(parts);
        inputs = List.copyOf(inputs);
    }

    /** All records. */
    public long records() {
        return parts.stream().mapToLong(Part::records).sum();
    }

    /** All showings. */
    public long showings() {
        return parts.stream().mapToLong(Part::showings).sum();
    }

    ObjectNode json() {
        ObjectNode node = Json.object();
        ArrayNode dayList = node.putArray("days");
        days.forEach(day -> dayList.addObject()
                .put("day", day.day())
                .put("revision", day.revision())
                .put("fingerprint", day.fingerprint()));
        node.put("records", records()).put("showings", showings());
        ArrayNode partList = node.putArray("parts");
        parts.forEach(part -> partList.addObject()
                .put("instrument", part.instrument())
                .put("material", part.material())
                .put("records", part.records())
                .put("showings", part.showings()));
        momentsFingerprint.ifPresent(fingerprint -> node.put("momentsFingerprint", fingerprint));
        ArrayNode names = node.putArray("inputs");
        inputs.forEach(names::add);
        return node;
    }

    static MadeFrom fromJson(JsonNode node) {
        List<Day> days = new ArrayList<>();
        node.required("days")
                .forEach(day -> days.add(new Day(
                        day.required("day").textValue(),
                        day.required("revision").intValue(),
                        day.required("fingerprint").textValue())));
        List<Part> parts = new ArrayList<>();
        node.required("parts")
                .forEach(part -> parts.add(new Part(
                        part.required("instrument").textValue(),
                        part.required("material").textValue(),
                        part.required("records").longValue(),
                        part.required("showings").longValue())));
        List<String> inputs = new ArrayList<>();
        node.path("inputs").forEach(name -> inputs.add(name.textValue()));
        return new MadeFrom(
                days, parts, Optional.ofNullable(node.path("momentsFingerprint").textValue()), inputs);
    }
}
