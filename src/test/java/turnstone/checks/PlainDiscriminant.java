package turnstone.checks;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import java.util.TreeSet;
import org.ejml.data.DMatrixRMaj;
import org.ejml.dense.row.CommonOps_DDRM;
import org.ejml.dense.row.factory.DecompositionFactory_DDRM;
import org.ejml.interfaces.decomposition.CholeskyDecomposition_F64;
import org.ejml.interfaces.decomposition.EigenDecomposition_F64;

/**
 * The same analysis in plain doubles by another road: two passes over the table, EJML's Cholesky factor and its eigenvalues of the symmetric
 * L⁻¹BL⁻ᵀ; for sets that are no numerical trial.
 */
final class PlainDiscriminant {
    private final List<String> labels;
    private final double[][] values;
    private final List<String> classes;
    private final double[][] means;
    private final int[] counts;
    private final DMatrixRMaj within;

    private PlainDiscriminant(List<String> labels, double[][] values) {
        this.labels = labels;
        this.values = values;
        this.classes = List.copyOf(new TreeSet<>(labels));
        this.means = new double[classes.size()][channels()];
        this.counts = new int[classes.size()];
        this.within = new DMatrixRMaj(channels(), channels());
        for (int i = 0; i < values.length; i++) {
            int k = classes.indexOf(labels.get(i));
            counts[k]++;
            for (int c = 0; c < channels(); c++) {
                means[k][c] += values[i][c];
            }
        }
        for (int k = 0; k < means.length; k++) {
            for (int c = 0; c < channels(); c++) {
                means[k][c] /= counts[k];
            }
        }
        for (int i = 0; i < values.length; i++) {
            addOuter(within, values[i], means[classes.indexOf(labels.get(i))], 1);
        }
    }

    static PlainDiscriminant of(TextTable table) {
        List<String> labels = new ArrayList<>();
        double[][] values = new double[table.rows().size()][];
        for (int i = 0; i < values.length; i++) {
            List<String> row = table.rows().get(i);
            labels.add(row.get(0));
            values[i] = row.stream().skip(1).mapToDouble(Double::parseDouble).toArray();
        }
        return new PlainDiscriminant(labels, values);
    }

    int channels() {
        return values[0].length;
    }

    List<String> classes() {
        return classes;
    }

    double[] sharesAsCounted() {
        double[] shares = new double[counts.length];
        for (int k = 0; k < shares.length; k++) {
            shares[k] = (double) counts[k] / values.length;
        }
        return shares;
    }

    private static void addOuter(DMatrixRMaj sum, double[] x, double[] centre, double weight) {
        for (int i = 0; i < x.length; i++) {
            for (int j = 0; j < x.length; j++) {
                sum.add(i, j, weight * (x[i] - centre[i]) * (x[j] - centre[j]));
            }
        }
    }

    /**
     * ρ/(1 − ρ) with ρ of Y. Chen, A. Wiesel, Y. C. Eldar and A. O. Hero, IEEE Transactions on Signal Processing 58 (2010), 5016-5029,
     * equation 23, n records.
     */
    double analyticRidge() {
        double p = channels();
        DMatrixRMaj square = new DMatrixRMaj(channels(), channels());
        CommonOps_DDRM.mult(within, within, square);
        double traceOfSquare = CommonOps_DDRM.trace(square);
        double squareOfTrace = Math.pow(CommonOps_DDRM.trace(within), 2);
        double rho = ((1 - 2 / p) * traceOfSquare + squareOfTrace)
                / ((values.length + 1 - 2 / p) * (traceOfSquare - squareOfTrace / p));
        return rho / (1 - rho);
    }

    /** Within scatter with a share of its mean diagonal added. */
    private DMatrixRMaj ridged(double ridge) {
        DMatrixRMaj sum = within.copy();
        double added = ridge * CommonOps_DDRM.trace(within) / channels();
        for (int c = 0; c < channels(); c++) {
            sum.add(c, c, added);
        }
        return sum;
    }

    /**
     * An axis.
     *
     * @param ratio Fisher ratio
     * @param weights d components, unit within variance
     */
    record Axis(double ratio, List<Double> weights) {
        double along(double[] x, double[] from) {
            double sum = 0;
            for (int c = 0; c < x.length; c++) {
                sum += weights.get(c) * (x[c] - from[c]);
            }
            return sum;
        }
    }

    /** Axes of W⁻¹B by falling ratio, B = n·Σ share·(mean − centre)(mean − centre)ᵀ. */
    List<Axis> solve(double[] shares, double ridge) {
        int d = channels();
        double[] centre = new double[d];
        for (int k = 0; k < shares.length; k++) {
            for (int c = 0; c < d; c++) {
                centre[c] += shares[k] * means[k][c];
            }
        }
        DMatrixRMaj between = new DMatrixRMaj(d, d);
        for (int k = 0; k < shares.length; k++) {
            addOuter(between, means[k], centre, shares[k] * values.length);
        }
        CholeskyDecomposition_F64<DMatrixRMaj> factor = DecompositionFactory_DDRM.chol(d, true);
        if (!factor.decompose(ridged(ridge).copy())) {
            throw new IllegalArgumentException("the within scatter is not positive");
        }
        DMatrixRMaj inverse = new DMatrixRMaj(d, d);
        CommonOps_DDRM.invert(factor.getT(null), inverse);
        DMatrixRMaj half = new DMatrixRMaj(d, d);
        CommonOps_DDRM.mult(inverse, between, half);
        DMatrixRMaj whitened = new DMatrixRMaj(d, d);
        CommonOps_DDRM.multTransB(half, inverse, whitened);
        EigenDecomposition_F64<DMatrixRMaj> eigen = DecompositionFactory_DDRM.eig(d, true, true);
        eigen.decompose(whitened);
        return sorted(eigen, inverse, Math.min(d, shares.length - 1));
    }

    private List<Axis> sorted(EigenDecomposition_F64<DMatrixRMaj> eigen, DMatrixRMaj inverse, int rank) {
        List<Axis> axes = new ArrayList<>();
        double unit = Math.sqrt(values.length - classes.size());
        for (int i = 0; i < channels(); i++) {
            DMatrixRMaj axis = new DMatrixRMaj(channels(), 1);
            CommonOps_DDRM.multTransA(unit, inverse, eigen.getEigenVector(i), axis);
            axes.add(new Axis(
                    eigen.getEigenvalue(i).getReal(),
                    Arrays.stream(axis.data).boxed().toList()));
        }
        axes.sort(Comparator.comparingDouble(Axis::ratio).reversed());
        return axes.subList(0, rank);
    }

    /** {@code tally.csv} of the nearest class along the axes, less 2·ln of its prior; refuses a tie within rounding. */
    String tally(List<Axis> axes, double[] priors) {
        long[][] tally = new long[classes.size()][classes.size()];
        for (int i = 0; i < values.length; i++) {
            double[] distance = new double[classes.size()];
            for (int k = 0; k < distance.length; k++) {
                distance[k] = -2 * Math.log(priors[k]);
                for (Axis axis : axes) {
                    double along = axis.along(values[i], means[k]);
                    distance[k] += along * along;
                }
            }
            tally[classes.indexOf(labels.get(i))][nearest(distance)]++;
        }
        StringBuilder text = new StringBuilder("truth,decided,count\n");
        for (int t = 0; t < tally.length; t++) {
            for (int k = 0; k < tally.length; k++) {
                if (tally[t][k] > 0) {
                    text.append(classes.get(t))
                            .append(',')
                            .append(classes.get(k))
                            .append(',')
                            .append(tally[t][k])
                            .append('\n');
                }
            }
        }
        return text.toString();
    }

    private static int nearest(double[] distance) {
        int nearest = 0;
        for (int k = 1; k < distance.length; k++) {
            if (distance[k] < distance[nearest]) {
                nearest = k;
            }
        }
        for (int k = 0; k < distance.length; k++) {
            if (k != nearest && distance[k] - distance[nearest] < 1e-6) {
                throw new IllegalArgumentException("a tie within rounding");
            }
        }
        return nearest;
    }
}
