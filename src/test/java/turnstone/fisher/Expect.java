package turnstone.fisher;

import static org.assertj.core.api.Assertions.assertThat;

import com.fasterxml.jackson.databind.JsonNode;
import java.math.BigDecimal;
import turnstone.json.Json;

/** Comparisons of fits with reference values. */
final class Expect {
    private Expect() {}

    static void relative(String what, double found, double expected, double bound) {
        assertThat(Math.abs(found - expected))
                .as("%s: %s for %s", what, found, expected)
                .isLessThanOrEqualTo(bound * Math.abs(expected));
    }

    /** Largest relative distance from numbers or decimal texts. */
    static double largestRelative(double[] found, JsonNode expected) {
        assertThat(found).hasSize(expected.size());
        double largest = 0;
        for (int i = 0; i < found.length; i++) {
            BigDecimal exact = new BigDecimal(expected.get(i).asText());
            double error = Math.abs(new BigDecimal(found[i]).subtract(exact).doubleValue());
            largest = Math.max(largest, exact.signum() == 0 ? error : error / Math.abs(exact.doubleValue()));
        }
        return largest;
    }

    static int[][] matrix(JsonNode rows) {
        int[][] matrix = new int[rows.size()][];
        for (int i = 0; i < matrix.length; i++) {
            double[] row = Json.doubles(rows.get(i));
            matrix[i] = new int[row.length];
            for (int j = 0; j < row.length; j++) {
                matrix[i][j] = (int) row[j];
            }
        }
        return matrix;
    }

    static int errors(int[][] tally) {
        int errors = 0;
        for (int i = 0; i < tally.length; i++) {
            for (int j = 0; j < tally.length; j++) {
                errors += i == j ? 0 : tally[i][j];
            }
        }
        return errors;
    }

    /** Length of the difference of two axes in the within scatter of the fit. */
    static double apart(Fit fit, double[] axis, double[] reference) {
        double[] difference = new double[axis.length];
        for (int i = 0; i < axis.length; i++) {
            difference[i] = axis[i] - reference[i];
        }
        double[][] row = {difference};
        return Math.sqrt(Math.max(0, fit.withinProducts(row, row)[0][0]));
    }

    /** Every number of two fits, bit for bit. */
    static void sameBits(Fit one, Fit other) {
        assertThat(one.fisherRatios()).isEqualTo(other.fisherRatios());
        assertThat(one.fisherShares()).isEqualTo(other.fisherShares());
        assertThat(one.axes()).isDeepEqualTo(other.axes());
        assertThat(one.positions()).isDeepEqualTo(other.positions());
        assertThat(one.means()).isDeepEqualTo(other.means());
        assertThat(one.centre()).isEqualTo(other.centre());
        assertThat(one.wilks()).isEqualTo(other.wilks());
        assertThat(one.ridge()).isEqualTo(other.ridge());
        assertThat(one.reciprocalCondition()).isEqualTo(other.reciprocalCondition());
        assertThat(one.axisStorageCost()).isEqualTo(other.axisStorageCost());
        assertThat(one.residual().expectedEnergy()).isEqualTo(other.residual().expectedEnergy());
        assertThat(one.residual().effectiveDegreesOfFreedom())
                .isEqualTo(other.residual().effectiveDegreesOfFreedom());
        assertThat(one.residual().basis()).isDeepEqualTo(other.residual().basis());
        assertThat(one.remarks()).isEqualTo(other.remarks());
    }
}
