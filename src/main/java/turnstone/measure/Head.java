package turnstone.measure;

import java.io.Serializable;
import java.util.Map;
import java.util.TreeMap;

/**
 * The pretreatment head of one instrument: raw channels in, pretreated channels out, record by record, without allocation.
 *
 * <p>Order of operations, each one IEEE operation, no fused ones: checks of the raw channels that any output needs; R = (x − dark)/(white − dark); resampling a +
 * w·(b − a); max(R, floor); mean = lane sum / n, {@code NO_SIGNAL} where below the level; {@link LaneMath#absorbance}; SNV: mean = lane sum / n, deviations, spread =
 * √(lane dot of the deviations / (n − 1)), {@code NO_SIGNAL} where below the floor, deviation/spread. n counts the channels that come out. A masked channel that no
 * output needs is never looked at.
 *
 * <p>Not thread-safe: it has scratch space of its own. {@link #copy} shares everything else.
 */
public final class Head implements Serializable {
    private static final double ABSENT = Double.NEGATIVE_INFINITY;

    private final int inputs;
    private final int outputs;
    private final boolean corrects;
    private final boolean copiesRun;
    private final boolean resamples;
    private final double saturatedAt;
    private final double deadAtOrBelow;
    private final double maxWhiteAge_ms;
    private final double maxDarkAge_ms;
    private final double floor;
    private final double noSignalBelow;
    private final boolean takesLogarithm;
    private final double snvSpreadFloor;
    private final HeadMaps maps;
    private final HeadColumns columns;
    private final double[] reflectance;
    private final Absorbances absorbances;

    private Head(HeadSpec spec, int inputs, HeadMaps maps, HeadColumns columns) {
        this.inputs = inputs;
        this.outputs = spec.outputs();
        this.corrects = spec.corrects();
        this.resamples = spec.resampling() == Resampling.FROM_INSTRUMENT;
        this.maps = maps;
        this.columns = columns;
        copiesRun = !resamples && maps.main().copiesRun();
        saturatedAt = spec.saturatedAt().orElse(Double.POSITIVE_INFINITY);
        deadAtOrBelow = spec.deadAtOrBelow().orElse(Double.NEGATIVE_INFINITY);
        maxWhiteAge_ms = spec.maxWhiteAge_ms().orElse(0);
        maxDarkAge_ms = spec.maxDarkAge_ms().orElse(0);
        floor = spec.floor().orElse(ABSENT);
        noSignalBelow = spec.noSignalBelow().orElse(ABSENT);
        takesLogarithm = spec.takesLogarithm();
        snvSpreadFloor = spec.snvSpreadFloor().orElse(ABSENT);
        reflectance = new double[corrects ? inputs : 0];
        absorbances = new Absorbances(takesLogarithm ? outputs : 0);
    }

    private Head(Head other) {
        inputs = other.inputs;
        outputs = other.outputs;
        corrects = other.corrects;
        resamples = other.resamples;
        copiesRun = other.copiesRun;
        saturatedAt = other.saturatedAt;
        deadAtOrBelow = other.deadAtOrBelow;
        maxWhiteAge_ms = other.maxWhiteAge_ms;
        maxDarkAge_ms = other.maxDarkAge_ms;
        floor = other.floor;
        noSignalBelow = other.noSignalBelow;
        takesLogarithm = other.takesLogarithm;
        snvSpreadFloor = other.snvSpreadFloor;
        maps = other.maps;
        columns = other.columns;
        reflectance = new double[other.reflectance.length];
        absorbances = new Absorbances(other.absorbances.most());
    }

    /**
     * The head of an instrument.
     *
     * @param instrument null for a table that has none
     * @param references null where the head corrects nothing
     * @throws turnstone.fault.Fault of kind usage where instrument, references and head don't fit
     */
    public static Head of(HeadSpec spec, Instrument instrument, ReferenceTable references) {
        HeadMaps maps = HeadMaps.of(spec, instrument);
        int inputs = spec.resampling() == Resampling.FROM_INSTRUMENT ? instrument.channels() : spec.channels();
        Map<Integer, ReferenceSeries> series =
                spec.corrects() ? HeadColumns.series(instrument, references, inputs) : new TreeMap<>();
        return new Head(spec, inputs, maps, new HeadColumns(series, maps));
    }

    /** A head for another thread. */
    public Head copy() {
        return new Head(this);
    }

    /** Channels of a raw record. */
    public int inputs() {
        return inputs;
    }

    /** Channels that come out. */
    public int outputs() {
        return outputs;
    }

    /**
     * Pretreats one record.
     *
     * @param raw the record at {@code from}, {@link #inputs} values; not changed
     * @param beltColumn of no matter where neither references nor bands are used
     * @param time_ms on the clock of the references; of no matter where they are not used
     * @param out {@link #outputs} values at {@code to}, of use only where accepted; must not be {@code raw}
     * @param trouble says why where quarantined, else unchanged
     */
    public HeadOutcome apply(
            double[] raw, int from, int beltColumn, long time_ms, double[] out, int to, HeadTrouble trouble) {
        ResampleMap map = maps.of(beltColumn);
        if (!rawIsSound(raw, from, map, trouble)) {
            return HeadOutcome.QUARANTINED;
        }
        if (corrects) {
            if (!correct(raw, from, beltColumn, time_ms, trouble)) {
                return HeadOutcome.QUARANTINED;
            }
            arrange(map, reflectance, 0, out, to);
        } else {
            arrange(map, raw, from, out, to);
        }
        return pretreat(out, to, trouble);
    }

    private void arrange(ResampleMap map, double[] in, int from, double[] out, int to) {
        if (copiesRun) {
            System.arraycopy(in, from + map.left[0], out, to, outputs);
        } else if (resamples) {
            map.apply(in, from, out, to);
        } else {
            map.copy(in, from, out, to);
        }
    }

    /** One comparison each way: NaN and the infinities fail it too, whatever the limits. */
    private boolean rawIsSound(double[] raw, int from, ResampleMap map, HeadTrouble trouble) {
        int[] used = map.used;
        for (int i = 0; i < used.length; i++) {
            double x = raw[from + used[i]];
            if (!(x > deadAtOrBelow && x < saturatedAt)) {
                blame(used[i], x, trouble);
                return false;
            }
        }
        return true;
    }

    private void blame(int channel, double x, HeadTrouble trouble) {
        if (!(Math.abs(x) <= Double.MAX_VALUE)) {
            trouble.set(QuarantineReason.NON_FINITE, channel, x, Double.NaN);
        } else if (x >= saturatedAt) {
            trouble.set(QuarantineReason.SATURATED, channel, x, saturatedAt);
        } else {
            trouble.set(QuarantineReason.DEAD_PIXEL, channel, x, deadAtOrBelow);
        }
    }

    private boolean correct(double[] raw, int from, int beltColumn, long time_ms, HeadTrouble trouble) {
        int column = columns.index(beltColumn);
        if (column < 0) {
            trouble.set(QuarantineReason.STALE_WHITE, -1, Double.POSITIVE_INFINITY, maxWhiteAge_ms);
            return false;
        }
        ReferenceSeries series = columns.series(column);
        int span = series.span(time_ms);
        double[] white = span < 0 ? null : series.white(span);
        double[] dark = span < 0 ? null : series.dark(span);
        // Differences of times as doubles: exact below 2^53 ms, and they can't wrap around.
        double whiteAge = white == null ? Double.POSITIVE_INFINITY : (double) time_ms - series.whiteTime_ms(span);
        double darkAge = dark == null ? Double.POSITIVE_INFINITY : (double) time_ms - series.darkTime_ms(span);
        if (whiteAge > maxWhiteAge_ms) {
            trouble.set(QuarantineReason.STALE_WHITE, -1, whiteAge, maxWhiteAge_ms);
            return false;
        }
        if (darkAge > maxDarkAge_ms) {
            trouble.set(QuarantineReason.STALE_WHITE, -1, darkAge, maxDarkAge_ms);
            return false;
        }
        int bad = columns.badChannel(column, span);
        if (bad >= 0) {
            trouble.set(QuarantineReason.BAD_WHITE, bad, white[bad], dark[bad]);
            return false;
        }
        System.arraycopy(raw, from, reflectance, 0, inputs);
        reflectances(reflectance, dark, white, inputs);
        return true;
    }

    /** In place and from 0 on, so that compilers make vector code of it. Channels that no output needs may come out as anything. */
    private static void reflectances(double[] values, double[] dark, double[] white, int n) {
        for (int c = 0; c < n; c++) {
            values[c] = (values[c] - dark[c]) / (white[c] - dark[c]);
        }
    }

    private HeadOutcome pretreat(double[] out, int to, HeadTrouble trouble) {
        int n = outputs;
        if (floor != ABSENT) {
            raise(out, to, n, floor);
        }
        if (noSignalBelow != ABSENT) {
            double mean = LaneMath.laneSum(out, to, n) / n;
            if (mean < noSignalBelow) {
                return HeadOutcome.NO_SIGNAL;
            }
        }
        if (takesLogarithm) {
            absorbances.apply(out, to, n);
        }
        return snvSpreadFloor == ABSENT ? HeadOutcome.ACCEPTED : standardise(out, to, trouble);
    }

    private static void raise(double[] values, int from, int n, double floor) {
        for (int i = from; i < from + n; i++) {
            values[i] = Math.max(values[i], floor);
        }
    }

    private HeadOutcome standardise(double[] out, int to, HeadTrouble trouble) {
        int n = outputs;
        double mean = LaneMath.laneSum(out, to, n) / n;
        for (int i = to; i < to + n; i++) {
            out[i] -= mean;
        }
        double spread = Math.sqrt(LaneMath.laneDot(out, to, out, to, n) / (n - 1));
        if (spread < snvSpreadFloor) {
            return HeadOutcome.NO_SIGNAL;
        }
        if (!(spread <= Double.MAX_VALUE)) {
            trouble.set(QuarantineReason.NON_FINITE, -1, spread, Double.NaN);
            return HeadOutcome.QUARANTINED;
        }
        for (int i = to; i < to + n; i++) {
            out[i] /= spread;
        }
        return HeadOutcome.ACCEPTED;
    }
}
