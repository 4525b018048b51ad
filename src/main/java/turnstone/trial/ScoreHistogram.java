package turnstone.trial;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.Serializable;
import java.util.Collections;
import java.util.SortedMap;
import java.util.TreeMap;
import java.util.function.Predicate;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.plant.Duty;

/**
 * Records of a trial counted by (showing, truth, bin of the score), for one duty, form and side: whole numbers, nothing else.
 *
 * <p>A showing is of one day, so this is by day as well. Records that are never ejected whatever the cut, unfamiliar and without signal, are
 * counted beside the bins. Bounds on memory: 8·({@value ScoreBins#COUNT} + 2) bytes for each showing and truth, about 4.6 kB: 2.5 MB for 12
 * sorters with 11 materials in 4 showings. {@link #merge} is commutative and associative; the JSON form is canonical, with the bins that are
 * not empty. Not thread-safe.
 */
public final class ScoreHistogram implements Serializable {
    private static final long serialVersionUID = 1L;
    private static final int UNFAMILIAR = ScoreBins.COUNT;
    private static final int NO_SIGNAL = ScoreBins.COUNT + 1;
    private static final int PLACES = ScoreBins.COUNT + 2;

    /** Whose records: a showing and the material on its tray. */
    record Key(String showing, String truth) implements Comparable<Key>, Serializable {
        private static final long serialVersionUID = 1L;

        @Override
        public int compareTo(Key other) {
            int byShowing = showing.compareTo(other.showing);
            return byShowing != 0 ? byShowing : truth.compareTo(other.truth);
        }
    }

    private final TreeMap<Key, long[]> counts = new TreeMap<>();

    /** A histogram of nothing. */
    public static ScoreHistogram empty() {
        return new ScoreHistogram();
    }

    /** What a tally says of scores: only which side of the decision for the nearest material a record lies on. */
    static ScoreHistogram ofDecisions(Duty duty, TrialTally tally) {
        ScoreHistogram histogram = empty();
        tally.cells().forEach((cell, records) -> {
            switch (cell.recognition()) {
                case FAMILIAR -> {
                    int bin = Sendings.ejects(duty, cell.decided()) ? ScoreBins.NEAREST : ScoreBins.NEAREST - 1;
                    histogram.add(cell.showing(), cell.truth(), bin, records);
                }
                case UNFAMILIAR -> histogram.addUnfamiliar(cell.showing(), cell.truth(), records);
                case NO_SIGNAL -> histogram.addNoSignal(cell.showing(), cell.truth(), records);
            }
        });
        return histogram;
    }

    /** Counts familiar records in a bin of {@link ScoreBins}. */
    public void add(String showing, String truth, int bin, long records) {
        if (bin < 0 || bin >= ScoreBins.COUNT) {
            throw new IllegalArgumentException("no such bin: " + bin);
        }
        put(new Key(showing, truth), bin, records);
    }

    /** Counts records that are unfamiliar, whatever their score. */
    public void addUnfamiliar(String showing, String truth, long records) {
        put(new Key(showing, truth), UNFAMILIAR, records);
    }

    /** Counts records without signal. */
    public void addNoSignal(String showing, String truth, long records) {
        put(new Key(showing, truth), NO_SIGNAL, records);
    }

    /** Counts what a task has gathered of one showing: {@link ScoreBins#COUNT} bins, and what is beside them. */
    public void add(String showing, String truth, long[] bins, long unfamiliar, long noSignal) {
        if (bins.length != ScoreBins.COUNT) {
            throw new IllegalArgumentException(bins.length + " bins, not " + ScoreBins.COUNT);
        }
        Key key = new Key(showing, truth);
        for (int bin = 0; bin < bins.length; bin++) {
            put(key, bin, bins[bin]);
        }
        put(key, UNFAMILIAR, unfamiliar);
        put(key, NO_SIGNAL, noSignal);
    }

    private void put(Key key, int place, long records) {
        if (records < 0) {
            throw new IllegalArgumentException("a histogram cannot take " + records + " records");
        }
        if (records > 0) {
            long[] row = counts.computeIfAbsent(key, name -> new long[PLACES]);
            row[place] = Math.addExact(row[place], records);
        }
    }

    /** Adds the other's counts to this one; the other does not change. */
    public void merge(ScoreHistogram other) {
        new TreeMap<>(other.counts).forEach((key, row) -> {
            for (int place = 0; place < PLACES; place++) {
                put(key, place, row[place]);
            }
        });
    }

    /** The records of the showings that are wanted, by id. */
    public ScoreHistogram only(Predicate<String> showings) {
        ScoreHistogram some = empty();
        counts.forEach((key, row) -> {
            if (showings.test(key.showing())) {
                some.counts.put(key, row.clone());
            }
        });
        return some;
    }

    /** All records counted. */
    public long records() {
        long sum = 0;
        for (long[] row : counts.values()) {
            sum = Math.addExact(sum, sum(row));
        }
        return sum;
    }

    SortedMap<Key, long[]> rows() {
        return Collections.unmodifiableSortedMap(counts);
    }

    /** Records of a row, all of them. */
    static long sum(long[] row) {
        long sum = 0;
        for (long records : row) {
            sum = Math.addExact(sum, records);
        }
        return sum;
    }

    /** {@code {"bins": 578, "rows": [[showing, truth, unfamiliar, noSignal, [[bin, records], …]], …]}}, in canonical order. */
    public ObjectNode json() {
        ObjectNode node = Json.object().put("bins", ScoreBins.COUNT);
        ArrayNode rows = node.putArray("rows");
        counts.forEach((key, row) -> {
            ArrayNode line = rows.addArray().add(key.showing()).add(key.truth());
            line.add(row[UNFAMILIAR]).add(row[NO_SIGNAL]);
            ArrayNode bins = line.addArray();
            for (int bin = 0; bin < ScoreBins.COUNT; bin++) {
                if (row[bin] > 0) {
                    bins.addArray().add(bin).add(row[bin]);
                }
            }
        });
        return node;
    }

    /** The histogram that {@link #json} wrote; Fault of kind storage where it did not. */
    public static ScoreHistogram read(JsonNode node, String place) {
        ScoreHistogram histogram = empty();
        try {
            if (node.required("bins").intValue() != ScoreBins.COUNT) {
                throw new IllegalArgumentException(node.required("bins") + " bins");
            }
            for (JsonNode row : node.required("rows")) {
                String showing = row.required(0).textValue();
                String truth = row.required(1).textValue();
                histogram.addUnfamiliar(showing, truth, row.required(2).longValue());
                histogram.addNoSignal(showing, truth, row.required(3).longValue());
                for (JsonNode bin : row.required(4)) {
                    histogram.add(
                            showing,
                            truth,
                            bin.required(0).intValue(),
                            bin.required(1).longValue());
                }
            }
        } catch (IllegalArgumentException | NullPointerException e) {
            throw Fault.storage("not a histogram of scores")
                    .at(place)
                    .found(e.getMessage())
                    .expected("rows of showing, truth, unfamiliar, no signal and " + ScoreBins.COUNT + " bins")
                    .because(e);
        }
        return histogram;
    }

    /** SHA-256 of the canonical JSON form. */
    public String fingerprint() {
        return Json.fingerprint(json());
    }
}
