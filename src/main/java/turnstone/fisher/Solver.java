package turnstone.fisher;

import java.util.ArrayList;
import java.util.List;

/** One fit from a {@link Scatter}: ridge, equilibration, factor, whitened means, singular values, axes. Used once. */
final class Solver {
    private final FitRequest request;
    private final Scatter scatter;
    private final List<String> remarks = new ArrayList<>();

    Solver(FitRequest request, Scatter scatter) {
        this.request = request;
        this.scatter = scatter;
    }

    FitNumbers solve() {
        FitNumbers numbers = new FitNumbers();
        WithinFactor factor = WithinFactor.of(request, scatter);
        numbers.degreesOfFreedom = scatter.degreesOfFreedom();
        numbers.ridge = factor.ridge();
        numbers.reciprocalCondition = factor.reciprocalCondition();
        remarks.addAll(factor.remarks());
        fillMeans(numbers);
        fillAxes(numbers, factor);
        numbers.remarks = List.copyOf(remarks);
        return numbers;
    }

    /** Share of each material in the between scatter. */
    private DoubleDouble[] shares() {
        Parts parts = scatter.head().parts();
        double[] given = request.betweenShares();
        DoubleDouble n = DoubleDouble.of(parts.total().records());
        DoubleDouble[] shares = new DoubleDouble[parts.materials()];
        for (int k = 0; k < shares.length; k++) {
            shares[k] =
                    given == null ? DoubleDouble.of(parts.weightedRecords(k)).over(n) : DoubleDouble.of(given[k]);
        }
        return shares;
    }

    private void fillMeans(FitNumbers numbers) {
        Parts parts = scatter.head().parts();
        ExtendedMatrix all = scatter.head().mean();
        ExtendedMatrix means = scatter.head().deviations().copy();
        DoubleDouble[] shares = shares();
        ExtendedMatrix centre = all.copy();
        numbers.records = new long[parts.materials()];
        for (int k = 0; k < parts.materials(); k++) {
            numbers.records[k] = parts.records(k);
            centre.addRow(0, shares[k], means, k);
            means.addRow(k, DoubleDouble.ONE, all, 0);
        }
        numbers.centre = centre.rounded(0);
        numbers.means = means.rounded();
    }

    /** Rows m_k − m in pretreated units, m the share-weighted centre. */
    private ExtendedMatrix centredMeans() {
        ExtendedMatrix deviations = scatter.tail().apply(scatter.head().deviations());
        DoubleDouble[] shares = shares();
        ExtendedMatrix centre = new ExtendedMatrix(1, deviations.columns);
        for (int k = 0; k < deviations.rows; k++) {
            centre.addRow(0, shares[k], deviations, k);
        }
        for (int k = 0; k < deviations.rows; k++) {
            deviations.addRow(k, DoubleDouble.ONE.negated(), centre, 0);
        }
        return deviations;
    }

    private void fillAxes(FitNumbers numbers, WithinFactor factor) {
        int g = numbers.records.length;
        ExtendedMatrix whitened = factor.whiten(centredMeans());
        ExtendedMatrix weighted = whitened.copy();
        DoubleDouble n = DoubleDouble.of(scatter.head().parts().total().records());
        DoubleDouble[] shares = shares();
        for (int k = 0; k < g; k++) {
            weighted.scaleRow(k, shares[k].times(n).root());
        }
        SmallSingularValues small = SmallSingularValues.of(weighted);
        int all = Math.min(g - 1, whitened.columns);
        fillRatios(numbers, small, all);
        int kept = kept(numbers, all);
        DoubleDouble root = DoubleDouble.of(numbers.degreesOfFreedom).root();
        ExtendedMatrix directions = rows(small.directions(), kept);
        ExtendedMatrix axes = factor.unwhiten(directions);
        for (int i = 0; i < kept; i++) {
            axes.scaleRow(i, root);
        }
        axes = scatter.tail().fold(axes);
        double[] signs = new double[all];
        for (int i = 0; i < all; i++) {
            signs[i] = i < kept ? AxisSign.of(axes.rounded(i)) : 1;
        }
        for (int i = 0; i < kept; i++) {
            axes.scaleRow(i, DoubleDouble.of(signs[i]));
        }
        numbers.shares = sharesOf(numbers.ratios, kept);
        numbers.axes = axes.rounded();
        numbers.allPositions = new double[g][all];
        for (int k = 0; k < g; k++) {
            for (int i = 0; i < all; i++) {
                DoubleDouble along = whitened.dotRows(k, small.directions(), i).times(root);
                numbers.allPositions[k][i] = signs[i] * along.high() + 0.0;
            }
        }
        numbers.headWithin = scatter.head().within();
        WithinEnergy energy = new WithinEnergy(numbers.headWithin, numbers.degreesOfFreedom);
        numbers.residual = energy.outside(numbers.axes);
        numbers.axisStorageCost = energy.storageCost(axes);
    }

    private static void fillRatios(FitNumbers numbers, SmallSingularValues small, int all) {
        numbers.ratios = new double[all];
        DoubleDouble wilks = DoubleDouble.ONE;
        for (int i = 0; i < all; i++) {
            DoubleDouble ratio = small.value(i).times(small.value(i));
            numbers.ratios[i] = ratio.high();
            wilks = wilks.over(ratio.plus(DoubleDouble.ONE));
        }
        numbers.wilks = wilks.high();
    }

    /** Axes along which no material differs are left out, unless nothing would be left: then one axis of zeros says so. */
    private int kept(FitNumbers numbers, int all) {
        int different = 0;
        while (different < all && numbers.ratios[different] > 0) {
            different++;
        }
        if (different < all) {
            remarks.add(
                    different == 0
                            ? "the means of the materials are equal: the Fisher ratio is 0, shares are undefined, and axis 1 is left at zero"
                            : "the means of the materials differ along " + different + " of " + all + " axes only");
        }
        int kept = Math.max(1, different);
        return request.rank() == 0 ? kept : Math.min(kept, request.rank());
    }

    private static double[] sharesOf(double[] ratios, int kept) {
        double sum = 0;
        for (double ratio : ratios) {
            sum += ratio;
        }
        double[] shares = new double[sum > 0 ? kept : 0];
        for (int i = 0; i < shares.length; i++) {
            shares[i] = ratios[i] / sum;
        }
        return shares;
    }

    private static ExtendedMatrix rows(ExtendedMatrix matrix, int count) {
        ExtendedMatrix result = new ExtendedMatrix(count, matrix.columns);
        for (int i = 0; i < count; i++) {
            result.addRow(i, DoubleDouble.ONE, matrix, i);
        }
        return result;
    }
}
