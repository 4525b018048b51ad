package turnstone.fisher;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import com.fasterxml.jackson.databind.JsonNode;
import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import turnstone.json.Json;

/** Fits against references computed in rational and 640-bit arithmetic; sources of the data in the NOTICE files beside them. */
class ReferenceFitTest {
    /** The promise of the fit. */
    private static final double RATIO_BOUND = 1e-12;

    /** In within-variance units; the references are written with 17 digits, which costs up to 1e-12 on the meat spectra. */
    private static final double AXIS_BOUND = 1e-10;

    static CheckTable table(String set) {
        return switch (set) {
            case "iris-variant" -> irisVariant();
            case "meat-nir-fat-tertiles" -> CheckTable.csv("data/meat-nir.csv");
            case "meat-nir-fat20" -> meatByFat();
            default -> CheckTable.csv("data/" + set + ".csv");
        };
    }

    /** Records 35 and 38 as in the other circulating copy of the set. */
    private static CheckTable irisVariant() {
        CheckTable iris = CheckTable.csv("data/iris.csv");
        List<List<BigDecimal>> records = new ArrayList<>(iris.records());
        List<BigDecimal> changed = List.of("4.9", "3.1", "1.5", "0.1").stream()
                .map(BigDecimal::new)
                .toList();
        records.set(34, changed);
        records.set(37, changed);
        return CheckTable.of(iris.labels(), records);
    }

    private static CheckTable meatByFat() {
        List<String> reference = CheckTable.lines("data/meat-nir-reference.csv");
        List<String> labels = reference.subList(1, reference.size()).stream()
                .map(line -> new BigDecimal(line.split(",", -1)[1]).compareTo(BigDecimal.valueOf(20)) >= 0
                        ? "fat20plus"
                        : "below20")
                .toList();
        return CheckTable.csv("data/meat-nir.csv").relabelled(labels);
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "iris",
                "iris-variant",
                "wine",
                "breast_cancer",
                "penguins",
                "penguins-measured",
                "meat-nir-fat-tertiles",
                "meat-nir-fat20"
            })
    void ratiosAxesMeansAndTalliesAreThoseOfTheReference(String set) {
        JsonNode reference = CheckTable.json(set + ".json");
        CheckTable table = table(set);
        Fit fit = Fit.of(table.request());
        double error = Expect.largestRelative(fit.fisherRatios(), reference.get("eigenvalues_40_digits"));
        System.out.printf("%s: largest relative error of a Fisher ratio %.1e%n", set, error);
        assertThat(error).isLessThanOrEqualTo(RATIO_BOUND);
        assertThat(Expect.largestRelative(fit.fisherShares(), reference.get("shares")))
                .isLessThanOrEqualTo(RATIO_BOUND);
        Expect.relative("wilks", fit.wilks(), reference.get("wilks").asDouble(), RATIO_BOUND);
        assertThat(fit.withinDegreesOfFreedom())
                .isEqualTo(reference.get("n").asLong() - reference.get("g").asLong());
        Expect.relative(
                "condition",
                1 / fit.reciprocalCondition(),
                reference.get("condition_W_scaled_to_unit_diagonal").asDouble(),
                0.02);
        JsonNode axes = reference.get("axes_rows_unit_Sw_norm");
        for (int i = 0; i < fit.rank(); i++) {
            double[] expected = Json.doubles(axes.get(i));
            assertThat(Expect.apart(fit, fit.axes()[i], expected)).isLessThanOrEqualTo(AXIS_BOUND);
        }
        JsonNode means = reference.get("class_means");
        for (int k = 0; k < means.size(); k++) {
            assertThat(Expect.largestRelative(fit.means()[k], means.get(k))).isLessThanOrEqualTo(4e-16);
        }
        assertThat(Expect.largestRelative(fit.centre(), reference.get("grand_mean")))
                .isLessThanOrEqualTo(4e-16);
        checkTallies(table, fit, reference.get("resubstitution"));
    }

    private static void checkTallies(CheckTable table, Fit fit, JsonNode expected) {
        assertThat(table.tally(fit, fit.rank()))
                .isDeepEqualTo(Expect.matrix(expected.get("confusion_truth_by_decided")));
        for (int rank = 1; rank <= fit.rank(); rank++) {
            assertThat(Expect.errors(table.tally(fit, rank)))
                    .isEqualTo(
                            expected.get("errors_by_rank_1_to_r").get(rank - 1).asInt());
        }
    }

    @ParameterizedTest
    @ValueSource(strings = {"iris", "wine", "meat-nir-fat-tertiles"})
    void axesHaveUnitWithinVarianceAndPositionsAreTheMeansOnThem(String set) {
        Fit fit = Fit.of(table(set).request());
        double[][] products = fit.withinProducts(fit.axes(), fit.axes());
        double[][] means = fit.means();
        for (double[] mean : means) {
            for (int c = 0; c < mean.length; c++) {
                mean[c] -= fit.centre()[c];
            }
        }
        for (int i = 0; i < fit.rank(); i++) {
            for (int j = 0; j < fit.rank(); j++) {
                // Storing the axes as doubles costs what the fit says, and no more.
                assertThat(products[i][j]).isCloseTo(i == j ? 1 : 0, within(4 * fit.axisStorageCost() + 1e-15));
            }
            for (int k = 0; k < means.length; k++) {
                double along = 0;
                for (int c = 0; c < means[k].length; c++) {
                    along += fit.axes()[i][c] * means[k][c];
                }
                assertThat(fit.positions()[k][i]).isCloseTo(along, within(1e-9));
            }
        }
    }
}
