package turnstone.fisher;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatExceptionOfType;
import static org.assertj.core.api.Assertions.within;

import com.fasterxml.jackson.databind.JsonNode;
import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.json.Json;

/** Published and textbook figures; what is from memory says so in the check files. */
class WorkedExamplesTest {
    private static JsonNode example(int index, String namePart) {
        JsonNode example =
                CheckTable.json("worked_examples.json").get("examples").get(index);
        assertThat(example.get("name").asText()).contains(namePart);
        return example;
    }

    private static List<BigDecimal> decimals(JsonNode row) {
        List<BigDecimal> values = new ArrayList<>();
        row.forEach(value -> values.add(new BigDecimal(value.asText())));
        return values;
    }

    /** Johnson and Wichern, examples 11.10 and 11.13: nine records, from memory, recomputed exactly. */
    @Test
    void threePopulationsOfThree() {
        JsonNode example = example(2, "three populations");
        List<String> labels = new ArrayList<>();
        List<List<BigDecimal>> records = new ArrayList<>();
        example.get("inputs").get("labels").forEach(label -> labels.add(label.asText()));
        example.get("inputs").get("records").forEach(record -> records.add(decimals(record)));
        Fit fit = Fit.of(CheckTable.of(labels, records).request());
        JsonNode expected = example.get("recomputed");
        assertThat(Expect.largestRelative(
                        fit.fisherRatios(), expected.get("eigenvalues_in_this_project_count_weighted_B")))
                .isLessThanOrEqualTo(1e-14);
        for (int i = 0; i < 2; i++) {
            assertThat(Expect.largestRelative(
                            fit.axes()[i],
                            expected.get("axes_unit_Sw_norm_first_component_positive")
                                    .get(i)))
                    .isLessThanOrEqualTo(1e-13);
            double[] printed = Json.doubles(example.get("printed").get("axes").get(i));
            assertThat(fit.axes()[i]).containsExactly(printed, within(2e-3));
        }
        // The book's linear scores, with priors 1/4, 1/4, 1/2: differences of scores are those of −half the squared
        // distances.
        double[] scores = Json.doubles(expected.get("linear_scores_of_record_-2_-1_priors_.25_.25_.5"));
        double[] found = halfDistances(fit, new double[] {-2, -1}, new double[] {0.25, 0.25, 0.5});
        assertThat(found[1] - found[0]).isCloseTo(scores[1] - scores[0], within(1e-12));
        assertThat(found[2] - found[0]).isCloseTo(scores[2] - scores[0], within(1e-12));
    }

    private static double[] halfDistances(Fit fit, double[] x, double[] priors) {
        double[] result = new double[priors.length];
        for (int k = 0; k < result.length; k++) {
            double square = 0;
            for (int i = 0; i < fit.rank(); i++) {
                double position = 0;
                for (int c = 0; c < x.length; c++) {
                    position += fit.axes()[i][c] * (x[c] - fit.centre()[c]);
                }
                square += (position - fit.positions()[k][i]) * (position - fit.positions()[k][i]);
            }
            result[k] = StrictMath.log(priors[k]) - square / 2;
        }
        return result;
    }

    /** Johnson and Wichern, table 11.1: data from memory. */
    @Test
    void ridingMowers() {
        JsonNode example = example(3, "riding mowers");
        List<String> labels = new ArrayList<>();
        List<List<BigDecimal>> records = new ArrayList<>();
        for (String material : List.of("owner", "nonowner")) {
            example.get("inputs").get(material).forEach(record -> {
                labels.add(material);
                records.add(decimals(record));
            });
        }
        CheckTable table = CheckTable.of(labels, records);
        Fit fit = Fit.of(table.request());
        JsonNode expected = example.get("recomputed");
        assertThat(Expect.largestRelative(fit.fisherRatios(), expected.get("lambda")))
                .isLessThanOrEqualTo(1e-14);
        assertThat(Expect.largestRelative(fit.axes()[0], expected.get("axis_unit_ridged_Sw_norm")))
                .isLessThanOrEqualTo(1e-14);
        assertThat(table.tally(fit, 1)).isDeepEqualTo(Expect.matrix(expected.get("confusion_truth_by_decided")));
    }

    /** B. Flury and H. Riedwyl 1988, T² and D² from memory: they must agree through λ as the file says. */
    @Test
    void squaredDistanceAndHotellingGoTogetherWithTheRatio() {
        JsonNode printed = example(5, "Swiss bank notes").get("printed");
        double distance = printed.get("D2").asDouble();
        assertThat(100.0 * 100 / 200 * distance).isCloseTo(printed.get("T2").asDouble(), within(0.1));
        Fit fit = Fit.of(CheckTable.csv("data/iris.csv")
                .only(List.of("setosa", "versicolor"))
                .request());
        // λ = D²·n₁n₂/(n(n − 2)), the same relation on data at hand.
        Expect.relative("ratio", fit.fisherRatios()[0], fit.squaredDistance(0, 1) * 50 * 50 / (100 * 98.0), 1e-14);
        Expect.relative("T²", fit.hotelling(0, 1), 25 * fit.squaredDistance(0, 1), 1e-15);
    }

    /** R. A. Fisher, Annals of Eugenics 7 (1936), 179–188: coefficients as printed, and to 17 digits as recomputed. */
    @Test
    void fishersCoefficientsOf1936() {
        JsonNode expected = CheckTable.json("iris.json").get("extras").get("fisher_1936_two_classes");
        Fit fit = Fit.of(CheckTable.csv("data/iris.csv")
                .only(List.of("setosa", "versicolor"))
                .request());
        double apart = fit.positions()[1][0] - fit.positions()[0][0];
        double[] coefficients = new double[4];
        for (int c = 0; c < 4; c++) {
            // Sw⁻¹δ = a·(a·δ) for two materials; Fisher's uses W = 98·Sw.
            coefficients[c] = fit.axes()[0][c] * apart / 98;
        }
        assertThat(Expect.largestRelative(coefficients, expected.get("coefficients_W_inverse_times_difference")))
                .isLessThanOrEqualTo(1e-14);
        assertThat(coefficients).containsExactly(Json.doubles(expected.get("published_fisher_1936")), within(1e-6));
        Expect.relative(
                "D²",
                fit.squaredDistance(0, 1),
                expected.get("mahalanobis_D2_pooled_98_df").asDouble(),
                1e-14);
        Expect.relative(
                "λ", fit.fisherRatios()[0], expected.get("lambda_W_inverse_B").asDouble(), 1e-14);
    }

    /** G. E. P. Box 1949; figures of the check file, recomputed there to 17 digits. */
    @Test
    void boxTestOnIris() {
        JsonNode expected = CheckTable.json("iris.json").get("extras").get("box_M");
        CheckTable iris = CheckTable.csv("data/iris.csv");
        BoxTest box = BoxTest.of(iris.request());
        Expect.relative("M", box.m(), expected.get("M").asDouble(), 1e-12);
        Expect.relative("χ²", box.chiSquare(), expected.get("chi_square").asDouble(), 1e-12);
        Expect.relative("F", box.f(), expected.get("F").asDouble(), 1e-12);
        assertThat(box.degreesOfFreedom()).isEqualTo(20);
        Expect.relative(
                "F df 2", box.secondDegreesOfFreedom(), expected.get("F_df2").asDouble(), 1e-10);
        assertThatExceptionOfType(Fault.class)
                .isThrownBy(() -> BoxTest.of(CheckTable.csv("data/meat-nir.csv").request()))
                .withMessageContaining("material high")
                .withMessageContaining("at least 100");
    }

    @Test
    void distancesBetweenIrisMaterials() {
        JsonNode expected =
                CheckTable.json("iris.json").get("extras").get("squared_mahalanobis_between_means_three_class_Sw");
        Fit fit = Fit.of(CheckTable.csv("data/iris.csv").request());
        Expect.relative(
                "0-1",
                fit.squaredDistance(0, 1),
                expected.get("setosa-versicolor").asDouble(),
                1e-14);
        Expect.relative(
                "0-2",
                fit.squaredDistance(0, 2),
                expected.get("setosa-virginica").asDouble(),
                1e-14);
        Expect.relative(
                "1-2",
                fit.squaredDistance(1, 2),
                expected.get("versicolor-virginica").asDouble(),
                1e-14);
        Fit first = Fit.of(CheckTable.csv("data/iris.csv").request().withRank(1));
        assertThat(first.rank()).isEqualTo(1);
        assertThat(first.squaredDistance(1, 2)).isEqualTo(fit.squaredDistance(1, 2));
        assertThat(first.fisherShares()[0]).isEqualTo(fit.fisherShares()[0]);
    }
}
