package turnstone.fisher;

import java.util.Arrays;
import java.util.List;

/**
 * A fitted discriminant projection: g materials, r axes, d channels of the head's output.
 *
 * <p>λ are the eigenvalues of W⁻¹B, descending, W with its ridge. Axes have unit within variance: a·(W + ridge)·a/(n − g) = 1 in pretreated
 * units. Sign: the first component whose size exceeds 1e-9 of the largest is positive. Axes, means and centre are in head-output units, a
 * tail folded into the axes. Source: R. A. Fisher, Annals of Eugenics 7 (1936), 179–188; C. R. Rao, Journal of the Royal Statistical Society
 * B 10 (1948), 159–203, for more than two materials. Immutable.
 */
public final class Fit {
    private final FitRequest request;
    private final FitNumbers numbers;

    Fit(FitRequest request, FitNumbers numbers) {
        this.request = request;
        this.numbers = numbers;
    }

    /**
     * Fits.
     *
     * @throws turnstone.fault.Fault of kind input where the within scatter is singular (the channels are named) or holds rounding noise that
     *     only a ridge can keep out; where there are fewer than two materials or one has no records
     */
    public static Fit of(FitRequest request) {
        return of(request, ScatterMemo.nothing());
    }

    /**
     * The same fit, the scatter of cells met before taken from a memo.
     *
     * @throws turnstone.fault.Fault as {@link #of(FitRequest)}
     */
    public static Fit of(FitRequest request, ScatterMemo memo) {
        return Scatter.of(request, memo).fit(request.ridge(), request.rank());
    }

    /**
     * One fit per ridge, from the same sums.
     *
     * @throws turnstone.fault.Fault as {@link #of}
     */
    public static List<Fit> ladder(FitRequest request, List<Ridge> ridges) {
        Scatter scatter = Scatter.of(request);
        return ridges.stream().map(ridge -> scatter.fit(ridge, request.rank())).toList();
    }

    /** Names in the order of the request. */
    public List<String> materials() {
        return request.materials();
    }

    /** What was asked for. */
    public FitRequest request() {
        return request;
    }

    /** Axes kept, r. */
    public int rank() {
        return numbers.axes.length;
    }

    /** λ of the axes kept, descending. */
    public double[] fisherRatios() {
        return Arrays.copyOf(numbers.ratios, rank());
    }

    /** λ over the sum of all λ, of the axes kept; empty where all λ are zero and no share is defined. */
    public double[] fisherShares() {
        return numbers.shares.clone();
    }

    /** [r][d]. */
    public double[][] axes() {
        return copy(numbers.axes);
    }

    /** Mean of the material means, weighted as in the between scatter: [d]. */
    public double[] centre() {
        return numbers.centre.clone();
    }

    /** Weighted means of the materials: [g][d]. */
    public double[][] means() {
        return copy(numbers.means);
    }

    /** Means of the materials on the axes kept, about the centre: [g][r]. */
    public double[][] positions() {
        return Arrays.stream(numbers.allPositions)
                .map(row -> Arrays.copyOf(row, rank()))
                .toArray(double[][]::new);
    }

    /** Records of each material, unweighted: [g]. */
    public long[] recordsPerMaterial() {
        return numbers.records.clone();
    }

    /** The ridge used, as a share of the mean diagonal; computed where it was asked to be analytic. */
    public double ridge() {
        return numbers.ridge;
    }

    /** Smallest over largest eigenvalue of the ridged within scatter scaled to unit diagonal, in pretreated units; to about a percent. */
    public double reciprocalCondition() {
        return numbers.reciprocalCondition;
    }

    /** n − g, n being the number of records. */
    public long withinDegreesOfFreedom() {
        return numbers.degreesOfFreedom;
    }

    /** Wilks' Λ: the product of 1/(1 + λ) over all λ, kept or not. */
    public double wilks() {
        return numbers.wilks;
    }

    /** Energy outside the axes; see {@link ResidualNorm}. */
    public ResidualNorm residual() {
        return numbers.residual;
    }

    /** What a person should know: directions as small as rounding on lossless data, axes left at zero. */
    public List<String> remarks() {
        return numbers.remarks;
    }

    /**
     * What storing axes as doubles costs: the largest length, in within-variance units, of the difference between an axis as computed and as
     * stored.
     */
    public double axisStorageCost() {
        return numbers.axisStorageCost;
    }

    /**
     * Squared Mahalanobis distance between the means of two materials in the ridged within scatter over all axes, kept or not (P. C. Mahalanobis 1936).
     */
    public double squaredDistance(int material, int other) {
        double sum = 0;
        for (int i = 0; i < numbers.allPositions[material].length; i++) {
            double apart = numbers.allPositions[material][i] - numbers.allPositions[other][i];
            sum += apart * apart;
        }
        return sum;
    }

    /** Hotelling's T² between two materials: n₁n₂/(n₁ + n₂) times the squared distance (H. Hotelling 1931). */
    public double hotelling(int material, int other) {
        double first = numbers.records[material];
        double second = numbers.records[other];
        return first * second / (first + second) * squaredDistance(material, other);
    }

    /**
     * a·Sw·bᵀ of each two rows, Sw the within scatter over n − g in head-output units, without ridge; sums in double-double.
     *
     * @param a rows of d numbers
     * @param b rows of d numbers
     * @return [rows of a][rows of b]
     */
    public double[][] withinProducts(double[][] a, double[][] b) {
        ExtendedMatrix within = numbers.headWithin;
        ExtendedMatrix right = extended(b, within.columns);
        double[][] products = new double[a.length][b.length];
        for (int i = 0; i < a.length; i++) {
            ExtendedMatrix image = new ExtendedMatrix(1, within.columns);
            for (int c = 0; c < within.columns; c++) {
                image.addRow(0, DoubleDouble.of(a[i][c]), within, c);
            }
            for (int j = 0; j < b.length; j++) {
                products[i][j] = image.dotRows(0, right, j).high() / numbers.degreesOfFreedom;
            }
        }
        return products;
    }

    /** The same fit with its axes turned: ratios stay those of the axes before turning. */
    Fit turned(double[][] rotation) {
        return new Fit(request, numbers.turned(rotation));
    }

    private static ExtendedMatrix extended(double[][] rows, int columns) {
        ExtendedMatrix matrix = new ExtendedMatrix(rows.length, columns);
        for (int i = 0; i < rows.length; i++) {
            System.arraycopy(rows[i], 0, matrix.high[i], 0, columns);
        }
        return matrix;
    }

    private static double[][] copy(double[][] rows) {
        return Arrays.stream(rows).map(double[]::clone).toArray(double[][]::new);
    }
}
