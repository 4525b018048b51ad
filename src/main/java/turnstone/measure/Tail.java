package turnstone.measure;

import java.io.Serializable;
import java.math.BigInteger;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.fault.Fault;

/**
 * The linear tail of the pretreatment as one sparse matrix T of exact fractions, {@link #outputs} × {@link #inputs}. Immutable.
 *
 * <p>Row i is Σ_k numerators(i)[k]/denominator(i) · x[columns(i)[k]], columns ascending, no zero among the numerators, the fraction of the row in lowest terms. Meant for
 * sums: T·P·Tᵀ at refit, Tᵀw for the weights; records never pay for it.
 */
public final class Tail implements Serializable {
    private final int inputs;
    private final int[][] columns;
    private final long[][] numerators;
    private final long[] denominators;

    private Tail(int inputs, List<Row> rows) {
        this.inputs = inputs;
        columns = new int[rows.size()][];
        numerators = new long[rows.size()][];
        denominators = new long[rows.size()];
        for (int i = 0; i < rows.size(); i++) {
            Row row = rows.get(i);
            columns[i] =
                    row.weights.keySet().stream().mapToInt(Integer::intValue).toArray();
            numerators[i] = row.weights.values().stream().mapToLong(Tail::word).toArray();
            denominators[i] = word(row.denominator);
        }
    }

    /** Integer weights by input channel, ascending, over one denominator, in lowest terms. */
    private record Row(SortedMap<Integer, BigInteger> weights, BigInteger denominator) {
        static Row unit(int channel) {
            SortedMap<Integer, BigInteger> weights = new TreeMap<>();
            weights.put(channel, BigInteger.ONE);
            return new Row(weights, BigInteger.ONE);
        }

        /** Σ_k weights[k]·rows[k], over one common denominator and then reduced once. */
        static Row combine(Fraction[] weights, List<Row> rows) {
            BigInteger common = BigInteger.ONE;
            for (int k = 0; k < weights.length; k++) {
                BigInteger one = weights[k].denominator().multiply(rows.get(k).denominator);
                common = common.divide(common.gcd(one)).multiply(one);
            }
            SortedMap<Integer, BigInteger> sum = new TreeMap<>();
            for (int k = 0; k < weights.length; k++) {
                BigInteger one = weights[k].denominator().multiply(rows.get(k).denominator);
                BigInteger factor = weights[k].numerator().multiply(common.divide(one));
                rows.get(k)
                        .weights
                        .forEach((channel, weight) -> sum.merge(channel, weight.multiply(factor), BigInteger::add));
            }
            sum.values().removeIf(weight -> weight.signum() == 0);
            BigInteger shared = common;
            for (BigInteger weight : sum.values()) {
                shared = shared.gcd(weight);
            }
            BigInteger divisor = shared;
            sum.replaceAll((channel, weight) -> weight.divide(divisor));
            return new Row(sum, common.divide(divisor));
        }
    }

    private static long word(BigInteger value) {
        if (value.bitLength() > 63) {
            throw Fault.usage("the exact weights of the tail pass 63 bits")
                    .at("pretreatment tail")
                    .found(value.bitLength() + " bits")
                    .remedy("take a shorter window or a lower order, or fewer steps");
        }
        return value.longValueExact();
    }

    /** T = I. */
    public static Tail identity(int channels) {
        return new Tail(channels, identityRows(channels));
    }

    /**
     * The steps composed in their order.
     *
     * @throws Fault of kind usage where a step doesn't fit the channels that reach it, or exact weights pass 63 bits
     */
    public static Tail of(TailSpec spec, int channels) {
        if (channels < 1) {
            throw new IllegalArgumentException("a tail needs at least one channel, not " + channels);
        }
        spec.outputs(channels);
        List<Row> rows = identityRows(channels);
        for (TailSpec.Step step : spec.steps()) {
            rows = compose(step, rows);
        }
        return new Tail(channels, rows);
    }

    private static List<Row> identityRows(int channels) {
        List<Row> rows = new ArrayList<>();
        for (int c = 0; c < channels; c++) {
            rows.add(Row.unit(c));
        }
        return rows;
    }

    private static List<Row> compose(TailSpec.Step step, List<Row> rows) {
        List<Row> result = new ArrayList<>();
        if (step instanceof TailSpec.SavitzkyGolay smooth) {
            Fraction[] weights = SavitzkyGolayWeights.of(smooth);
            for (int i = 0; i + weights.length <= rows.size(); i++) {
                result.add(Row.combine(weights, rows.subList(i, i + weights.length)));
            }
        } else if (step instanceof TailSpec.Bins bins) {
            for (int i = 0; i < rows.size(); i += bins.width()) {
                List<Row> bin = rows.subList(i, Math.min(i + bins.width(), rows.size()));
                Fraction[] weights = new Fraction[bin.size()];
                Arrays.fill(weights, Fraction.of(1, bin.size()));
                result.add(Row.combine(weights, bin));
            }
        } else if (step instanceof TailSpec.Mask mask) {
            result.addAll(rows.subList(0, mask.first()));
            result.addAll(rows.subList(mask.last() + 1, rows.size()));
        }
        return result;
    }

    /** Channels that go in. */
    public int inputs() {
        return inputs;
    }

    /** Channels that come out. */
    public int outputs() {
        return columns.length;
    }

    /** Whether T = I. */
    public boolean isIdentity() {
        if (inputs != columns.length) {
            return false;
        }
        for (int i = 0; i < inputs; i++) {
            boolean unit =
                    columns[i].length == 1 && columns[i][0] == i && numerators[i][0] == 1 && denominators[i] == 1;
            if (!unit) {
                return false;
            }
        }
        return true;
    }

    /** The input channels of a row, ascending. */
    public int[] columns(int row) {
        return columns[row].clone();
    }

    /** The numerators of a row, in the order of {@link #columns(int)}. */
    public long[] numerators(int row) {
        return numerators[row].clone();
    }

    /** The denominator of a row, above 0. */
    public long denominator(int row) {
        return denominators[row];
    }

    /** T·x in doubles: the products added in the order of the columns, then one division. */
    public double[] apply(double[] x) {
        checkLength(x.length);
        double[] result = new double[outputs()];
        for (int i = 0; i < result.length; i++) {
            double sum = 0;
            for (int k = 0; k < columns[i].length; k++) {
                sum += (double) numerators[i][k] * x[columns[i][k]];
            }
            result[i] = sum / denominators[i];
        }
        return result;
    }

    /** The numerators of T·x, exactly: output i is the result's element i over {@link #denominator}(i). */
    public BigInteger[] applyExactly(BigInteger[] x) {
        checkLength(x.length);
        BigInteger[] result = new BigInteger[outputs()];
        for (int i = 0; i < result.length; i++) {
            BigInteger sum = BigInteger.ZERO;
            for (int k = 0; k < columns[i].length; k++) {
                sum = sum.add(BigInteger.valueOf(numerators[i][k]).multiply(x[columns[i][k]]));
            }
            result[i] = sum;
        }
        return result;
    }

    private void checkLength(int length) {
        if (length != inputs) {
            throw new IllegalArgumentException("a tail of " + inputs + " channels was given " + length);
        }
    }
}
