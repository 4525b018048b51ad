package turnstone.trial;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.Serializable;
import java.util.Collections;
import java.util.SortedMap;
import java.util.TreeMap;
import java.util.stream.StreamSupport;
import turnstone.fault.Fault;
import turnstone.json.Json;

/**
 * Records of a trial counted by (showing, truth, decided, familiar | unfamiliar | no signal): whole numbers, nothing else.
 *
 * <p>{@link #merge} is commutative and associative, so any partitioning of the records gives the same tally. Cells are kept and written
 * in the order of {@link TallyCell}; a cell with count 0 is not there. Not thread-safe.
 */
public final class TrialTally implements Serializable {
    /** The first line of the CSV form. */
    public static final String CSV_HEADER = "showing,truth,decided,recognition,count";

    private static final long serialVersionUID = 1L;

    private final TreeMap<TallyCell, Long> counts = new TreeMap<>();

    /** A tally of nothing. */
    public static TrialTally empty() {
        return new TrialTally();
    }

    /** Counts one record. */
    public void add(TallyCell cell) {
        add(cell, 1);
    }

    /** Counts {@code records} records of one cell; 0 changes nothing. */
    public void add(TallyCell cell, long records) {
        if (records < 0) {
            throw new IllegalArgumentException("a tally cannot take " + records + " records");
        }
        if (records > 0) {
            counts.merge(cell, records, Math::addExact);
        }
    }

    /** Adds the other's counts to this one; the other does not change. */
    public void merge(TrialTally other) {
        new TreeMap<>(other.counts).forEach(this::add);
    }

    /** The counts, in canonical order; a view that cannot be written to. */
    public SortedMap<TallyCell, Long> cells() {
        return Collections.unmodifiableSortedMap(counts);
    }

    /** All records counted. */
    public long records() {
        return counts.values().stream().mapToLong(Long::longValue).reduce(0, Math::addExact);
    }

    /** {@code {"cells": [[showing, truth, decided, recognition, count], …]}}, in canonical order. */
    public ObjectNode json() {
        ObjectNode node = Json.object();
        ArrayNode cells = node.putArray("cells");
        counts.forEach((cell, count) -> cells.addArray()
                .add(cell.showing())
                .add(cell.truth())
                .add(cell.decided())
                .add(cell.recognition().label())
                .add(count.longValue()));
        return node;
    }

    /** The tally that {@link #json} wrote; Fault of kind storage where it did not. */
    public static TrialTally read(JsonNode node, String place) {
        TrialTally tally = empty();
        try {
            JsonNode cells = node.required("cells");
            StreamSupport.stream(cells.spliterator(), false)
                    .forEach(cell -> tally.add(
                            new TallyCell(
                                    cell.required(0).textValue(),
                                    cell.required(1).textValue(),
                                    cell.required(2).textValue(),
                                    Recognition.of(cell.required(3).textValue())),
                            cell.required(4).longValue()));
        } catch (IllegalArgumentException | NullPointerException e) {
            throw Fault.storage("not a tally")
                    .at(place)
                    .found(e.getMessage())
                    .expected("cells of showing, truth, decided, recognition and count")
                    .because(e);
        }
        return tally;
    }

    /** SHA-256 of the canonical JSON form. */
    public String fingerprint() {
        return Json.fingerprint(json());
    }

    /** The CSV form: {@link #CSV_HEADER}, then a line for each cell in canonical order; line feeds, fields quoted where they must be. */
    public String csv() {
        StringBuilder text = new StringBuilder(CSV_HEADER).append('\n');
        counts.forEach((cell, count) -> text.append(quoted(cell.showing()))
                .append(',')
                .append(quoted(cell.truth()))
                .append(',')
                .append(quoted(cell.decided()))
                .append(',')
                .append(cell.recognition().label())
                .append(',')
                .append(count)
                .append('\n'));
        return text.toString();
    }

    private static String quoted(String field) {
        boolean plain = field.chars().noneMatch(c -> c == ',' || c == '"' || c == '\n' || c == '\r');
        return plain ? field : '"' + field.replace("\"", "\"\"") + '"';
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof TrialTally that && counts.equals(that.counts);
    }

    @Override
    public int hashCode() {
        return counts.hashCode();
    }
}
