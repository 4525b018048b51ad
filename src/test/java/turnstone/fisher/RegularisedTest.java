package turnstone.fisher;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatExceptionOfType;

import com.fasterxml.jackson.databind.JsonNode;
import java.math.BigDecimal;
import java.math.MathContext;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import turnstone.fault.Fault;
import turnstone.json.Json;

/** The exact and the real regularised cases: rational answers, and 640-bit ones for the real sets. */
class RegularisedTest {
    private static final double BOUND = 1e-12;

    /** What a refusal must name, by case. */
    private static final Map<String, String> NAMED = Map.of(
            "wide two classes, d > n-g", "5 channels, 2 degrees of freedom",
            "wide three classes, d = 6 > n-g = 3", "6 channels, 3 degrees of freedom",
            "third channel collinear: c3 = 2 c1 - c2 + 1", "c3 = 2·c1 - c2 (up to a constant)",
            "third channel a copy of the first", "c3 = c1 (up to a constant)",
            "third channel constant 7", "constant in every record: c3",
            "third channel constant within each class, different between classes", "different between them: c3",
            "every class one record", "3 records of 3 materials",
            "one class only", "nothing to tell apart");

    record Case(String name, CheckTable table, JsonNode answer) {
        @Override
        public String toString() {
            return name + ", ridge " + (answer == null ? "0" : answer.get("rho").asText());
        }
    }

    static Stream<Case> exactCases() {
        List<Case> cases = new ArrayList<>();
        for (JsonNode node : CheckTable.json("regularised_exact.json").get("cases")) {
            List<String> labels = new ArrayList<>();
            List<List<BigDecimal>> records = new ArrayList<>();
            for (int i = 0; i < node.get("labels").size(); i++) {
                labels.add(node.get("labels").get(i).asText());
                List<BigDecimal> record = new ArrayList<>();
                node.get("records").get(i).forEach(value -> record.add(decimal(value)));
                records.add(record);
            }
            CheckTable table = CheckTable.of(labels, records);
            if (node.has("answers")) {
                node.get("answers")
                        .forEach(answer -> cases.add(new Case(node.get("name").asText(), table, answer)));
            } else {
                cases.add(new Case(node.get("name").asText(), table, null));
            }
        }
        assertThat(cases.stream().map(Case::name).distinct()).hasSize(16);
        return cases.stream();
    }

    /** A number as written, exactly: decimals, fractions whose denominator is a power of two. */
    private static BigDecimal decimal(JsonNode value) {
        if (value.isTextual() && value.asText().contains("/")) {
            String[] parts = value.asText().split("/", -1);
            return new BigDecimal(parts[0]).divide(new BigDecimal(parts[1]));
        }
        return value.isTextual()
                ? new BigDecimal(value.asText())
                : value.isDouble() ? new BigDecimal(value.asDouble()) : value.decimalValue();
    }

    private static double fraction(String text) {
        String[] parts = text.split("/", -1);
        BigDecimal below = parts.length == 1 ? BigDecimal.ONE : new BigDecimal(parts[1]);
        return new BigDecimal(parts[0]).divide(below, MathContext.DECIMAL64).doubleValue();
    }

    @ParameterizedTest
    @MethodSource("exactCases")
    void exactCasesAreMetOrRefusedByName(Case given) {
        FitRequest request = given.table().request();
        if (given.answer() == null || given.answer().has("status")) {
            assertThatExceptionOfType(Fault.class)
                    .isThrownBy(() -> Fit.of(request))
                    .withMessageContaining(NAMED.get(given.name()))
                    .satisfies(fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT));
            return;
        }
        JsonNode answer = given.answer();
        Fit fit =
                Fit.of(request.withRidge(Ridge.amount(fraction(answer.get("rho").asText()))));
        assertThat(Expect.largestRelative(fit.fisherRatios(), answer.get("lambda")))
                .isLessThanOrEqualTo(BOUND);
        Expect.relative("wilks", fit.wilks(), answer.get("wilks").asDouble(), BOUND);
        assertThat(given.table().tally(fit, fit.rank()))
                .isDeepEqualTo(Expect.matrix(answer.get("confusion_truth_by_decided")));
        if (answer.has("axis_unit_ridged_Sw_norm")) {
            double[] expected = Json.doubles(answer.get("axis_unit_ridged_Sw_norm"));
            // Where channels differ in size by more than the sign rule's share, the reference took the first
            // component's sign.
            double sign = given.name().contains("2^-60") ? -1 : 1;
            for (int c = 0; c < expected.length; c++) {
                Expect.relative("component", sign * fit.axes()[0][c], expected[c], BOUND);
            }
        }
        if (answer.get("lambda").get(0).asDouble() == 0) {
            assertThat(fit.fisherShares()).isEmpty();
            assertThat(fit.axes()[0]).containsOnly(0);
            assertThat(fit.remarks()).anyMatch(remark -> remark.contains("means of the materials are equal"));
        }
    }

    static Stream<JsonNode> realRows() {
        List<JsonNode> rows = new ArrayList<>();
        CheckTable.json("regularised_real.json").get("rows").forEach(rows::add);
        return rows.stream();
    }

    @ParameterizedTest
    @MethodSource("realRows")
    void realSetsWithARidgeAreThoseOfTheReference(JsonNode row) {
        CheckTable table = ReferenceFitTest.table(row.get("set").asText());
        double rho = fraction(row.get("rho").asText());
        Fit fit = Fit.of(table.request().withRidge(Ridge.amount(rho)));
        assertThat(Expect.largestRelative(fit.fisherRatios(), row.get("lambda")))
                .isLessThanOrEqualTo(BOUND);
        Expect.relative("wilks", fit.wilks(), row.get("wilks").asDouble(), BOUND);
        assertThat(table.tally(fit, fit.rank())).isDeepEqualTo(Expect.matrix(row.get("confusion_truth_by_decided")));
        double[] expected = Json.doubles(row.get("first_axis_unit_ridged_Sw_norm"));
        double largest = 0;
        for (double component : expected) {
            largest = Math.max(largest, Math.abs(component));
        }
        for (int c = 0; c < expected.length; c++) {
            assertThat(Math.abs(fit.axes()[0][c] - expected[c]) / largest).isLessThanOrEqualTo(1e-10);
        }
    }

    @Test
    void aLadderOfRidgesIsTheFitsOneByOne() {
        FitRequest request = ReferenceFitTest.table("penguins").request();
        List<Ridge> ridges = List.of(Ridge.amount(1e-8), Ridge.NONE, Ridge.amount(0.1), Ridge.analytic(333));
        List<Fit> ladder = Fit.ladder(request, ridges);
        for (int i = 0; i < ridges.size(); i++) {
            Expect.sameBits(ladder.get(i), Fit.of(request.withRidge(ridges.get(i))));
        }
        assertThat(ladder.get(0).fisherRatios()[0]).isNotEqualTo(ladder.get(1).fisherRatios()[0]);
    }

    /** S = diag(a, b) by hand from equation 23 of Chen, Wiesel, Eldar and Hero 2010: at p = 2 the first term of the numerator vanishes. */
    @Test
    void analyticRidgeFollowsItsFormula() {
        CheckTable table = CheckTable.of(
                List.of("a", "a", "a", "a", "b", "b", "b", "b"),
                Stream.of("3 1", "-3 1", "3 -1", "-3 -1", "13 1", "7 1", "13 -1", "7 -1")
                        .map(line -> Stream.of(line.split(" ", -1))
                                .map(BigDecimal::new)
                                .toList())
                        .toList());
        // W = diag(72, 8): tr(W²) = 5248, tr²(W) = 6400; rho = 6400 / (12·(5248 - 3200)) with 12 units.
        double rho = 6400.0 / (12 * 2048);
        Fit fit = Fit.of(table.request().withRidge(Ridge.analytic(12)));
        Expect.relative("ridge", fit.ridge(), rho / (1 - rho), 1e-15);
        assertThatExceptionOfType(Fault.class)
                .isThrownBy(() -> Fit.of(table.request().withRidge(Ridge.analytic(1))))
                .withMessageContaining("1 independent units for 2 channels");
    }
}
