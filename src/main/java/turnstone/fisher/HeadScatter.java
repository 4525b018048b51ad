package turnstone.fisher;

import java.math.BigDecimal;
import turnstone.measure.CountScale;

/**
 * Within scatter and means of a request in head-output units, before any tail.
 *
 * <p>W is d × d, symmetric, full; deviations are g × d: mean of each material less the mean of all records; everything in double-double.
 * With cells of unequal weights the scatter of a material is that of its weighted records about their weighted mean.
 */
final class HeadScatter {
    private final CountScale scale;
    private final Parts parts;
    private final ExtendedMatrix within;
    private final ExtendedMatrix deviations;

    private HeadScatter(CountScale scale, Parts parts, ExtendedMatrix within, ExtendedMatrix deviations) {
        this.scale = scale;
        this.parts = parts;
        this.within = within;
        this.deviations = deviations;
    }

    static HeadScatter of(CountScale scale, Parts parts, ScatterMemo memo) {
        int d = scale.channels();
        ExtendedMatrix within = new ExtendedMatrix(d, d);
        ExtendedMatrix deviations = new ExtendedMatrix(parts.materials(), d);
        for (int k = 0; k < parts.materials(); k++) {
            addMaterial(parts, k, memo, within, deviations);
        }
        scaleToUnits(scale, within, deviations);
        return new HeadScatter(scale, parts, within, deviations);
    }

    /** Scatter of one material about its own mean, symmetric and full. */
    ExtendedMatrix ofMaterial(int material) {
        int d = scale.channels();
        ExtendedMatrix alone = new ExtendedMatrix(d, d);
        ExtendedMatrix unused = new ExtendedMatrix(parts.materials(), d);
        addMaterial(parts, material, ScatterMemo.nothing(), alone, unused);
        scaleToUnits(scale, alone, unused);
        return alone;
    }

    private static void addMaterial(
            Parts parts, int k, ScatterMemo memo, ExtendedMatrix within, ExtendedMatrix deviations) {
        DoubleDouble all = DoubleDouble.of(parts.weightedRecords(k));
        for (Part part : parts.of(k)) {
            memo.of(part.moments()).addTo(within, part.weight());
            DoubleDouble share = DoubleDouble.of(part.weightedRecords()).over(all);
            ExactDeviations.addMean(part.moments(), parts.total(), deviations, k, share);
        }
        if (parts.of(k).size() > 1) {
            for (Part part : parts.of(k)) {
                addBetweenParts(part, parts, k, deviations, within);
            }
        }
    }

    /** weighted records · (mean of the part − mean of the material)(…)ᵀ onto the lower triangle. */
    private static void addBetweenParts(
            Part part, Parts parts, int k, ExtendedMatrix deviations, ExtendedMatrix within) {
        int d = deviations.columns;
        ExtendedMatrix apart = new ExtendedMatrix(1, d);
        ExactDeviations.addMean(part.moments(), parts.total(), apart, 0, DoubleDouble.ONE);
        apart.addRow(0, DoubleDouble.ONE.negated(), deviations, k);
        for (int i = 0; i < d; i++) {
            DoubleDouble factor = apart.at(0, i).times(part.weightedRecords());
            Kernels.multiplyAdd(
                    factor.high(), factor.low(), apart.high[0], apart.low[0], within.high[i], within.low[i], 0, i + 1);
        }
    }

    private static void scaleToUnits(CountScale scale, ExtendedMatrix within, ExtendedMatrix deviations) {
        int d = scale.channels();
        ExtendedMatrix steps = steps(scale);
        for (int i = 0; i < d; i++) {
            DoubleDouble step = steps.at(0, i);
            Kernels.multiply(steps.high[0], steps.low[0], within.high[i], within.low[i], 0, i + 1);
            Kernels.scale(step.high(), step.low(), within.high[i], within.low[i], 0, i + 1);
        }
        within.mirrorLower();
        for (int k = 0; k < deviations.rows; k++) {
            Kernels.multiply(steps.high[0], steps.low[0], deviations.high[k], deviations.low[k], 0, d);
        }
    }

    /** The steps as written, 1 × d. */
    static ExtendedMatrix steps(CountScale scale) {
        ExtendedMatrix steps = new ExtendedMatrix(1, scale.channels());
        for (int i = 0; i < scale.channels(); i++) {
            steps.set(0, i, DoubleDouble.of(scale.channel(i).step()));
        }
        return steps;
    }

    /** Mean of all records, as counted, in head-output units: 1 × d. */
    ExtendedMatrix mean() {
        ExtendedMatrix mean = new ExtendedMatrix(1, scale.channels());
        DoubleDouble n = DoubleDouble.of(parts.total().records());
        for (int i = 0; i < scale.channels(); i++) {
            DoubleDouble counts =
                    DoubleDouble.of(new BigDecimal(parts.total().sum(i))).over(n);
            DoubleDouble offset = DoubleDouble.of(scale.channel(i).offset());
            mean.set(
                    0,
                    i,
                    offset.plus(counts.times(DoubleDouble.of(scale.channel(i).step()))));
        }
        return mean;
    }

    CountScale scale() {
        return scale;
    }

    Parts parts() {
        return parts;
    }

    ExtendedMatrix within() {
        return within;
    }

    ExtendedMatrix deviations() {
        return deviations;
    }
}
