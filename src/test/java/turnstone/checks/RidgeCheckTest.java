package turnstone.checks;

import static org.assertj.core.api.Assertions.assertThat;

import com.fasterxml.jackson.databind.JsonNode;
import java.io.IOException;
import java.math.BigDecimal;
import java.math.BigInteger;
import java.math.MathContext;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.stream.Stream;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.junit.jupiter.params.provider.ValueSource;
import turnstone.decide.Model;
import turnstone.json.Json;
import turnstone.spark.Session;
import turnstone.spark.SharedSession;

/**
 * {@code fit --ridge} and what it refuses, as commands: real sets of regularised_real.json and small exact cases of regularised_exact.json,
 * both computed apart from this program; each file says how.
 */
@ExtendWith(SharedSession.class)
class RidgeCheckTest {
    private static final double BOUND = 1e-12;

    @TempDir
    Path folder;

    @BeforeAll
    static void theEngineRunsBeforeTheCommands(Session session) {
        assertThat(session.slots()).isPositive();
    }

    /** A share p/q as the option takes it. */
    private static String decimal(String fraction) {
        String[] parts = fraction.split("/", -1);
        BigDecimal denominator = parts.length == 1 ? BigDecimal.ONE : new BigDecimal(parts[1]);
        return new BigDecimal(parts[0]).divide(denominator).toPlainString();
    }

    private static Model model(Path out) throws IOException {
        Path file = out.resolve("model.json");
        return Model.read(Json.read(Files.readAllBytes(file), file.toString()), file.toString());
    }

    static Stream<JsonNode> rows() throws IOException {
        return Reference.file("regularised_real").path("rows").valueStream();
    }

    @ParameterizedTest(name = "row {index}")
    @MethodSource("rows")
    void aRidgeOnARealSetGivesItsFigures(JsonNode row) throws IOException {
        String csv = row.path("csv").asText().replaceAll("data/(.*)\\.csv", "$1");
        Path table = TextTable.resource(csv).toCsv(folder.resolve(csv + ".csv"));
        Path fitted = folder.resolve("fitted");
        String ridge = decimal(row.path("rho").textValue());
        CommandRun.of("fit", "--table", table, "--label", TextTable.LABEL, "--ridge", ridge, "--out", fitted)
                .done();
        Model model = model(fitted);
        String name = row.path("set").asText() + " with ridge " + ridge;
        Close.relative(name, model.fisherRatios(), Json.doubles(row.path("lambda")), BOUND);
        double[] wilks = {model.json().path("wilks").doubleValue()};
        Close.relative(name, wilks, new double[] {row.path("wilks").doubleValue()}, BOUND);
        Path projected = folder.resolve("projected");
        CommandRun.of("project", "--model", fitted, "--table", table, "--label", TextTable.LABEL, "--out", projected)
                .done();
        List<String> materials =
                model.materials().stream().map(material -> material.name()).toList();
        assertThat(projected.resolve("tally.csv"))
                .content()
                .isEqualTo(Reference.tally(materials, row.path("confusion_truth_by_decided")));
    }

    private static JsonNode exact(String beginning) throws IOException {
        return Reference.file("regularised_exact")
                .path("cases")
                .valueStream()
                .filter(node -> node.path("name").asText().startsWith(beginning))
                .findFirst()
                .orElseThrow();
    }

    private Path table(JsonNode exact) throws IOException {
        List<String> header = new ArrayList<>(List.of(TextTable.LABEL));
        for (int c = 1; c <= exact.path("d").intValue(); c++) {
            header.add("c" + c);
        }
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < exact.path("n").intValue(); i++) {
            List<String> row =
                    new ArrayList<>(List.of(exact.path("labels").get(i).asText()));
            exact.path("records").get(i).forEach(value -> row.add(value.asText()));
            rows.add(row);
        }
        return new TextTable(header, rows).toCsv(folder.resolve("exact.csv"));
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "wide two classes",
                "base, two channels",
                "third channel collinear",
                "third channel constant 7",
                "third channel constant within each class",
                "offset 1e9 on both channels",
            })
    void aSmallCaseGivesItsExactFigures(String beginning) throws IOException {
        JsonNode exact = exact(beginning);
        Path table = table(exact);
        for (JsonNode answer :
                List.of(exact.path("answers").get(1), exact.path("answers").get(3))) {
            Path out = folder.resolve("at-" + answer.path("rho").asText().replace('/', '-'));
            String ridge = decimal(answer.path("rho").asText());
            CommandRun.of("fit", "--table", table, "--label", TextTable.LABEL, "--ridge", ridge, "--out", out)
                    .done();
            Model model = model(out);
            Close.relative(
                    beginning, model.fisherRatios(), new double[] {fraction(answer.path("lambda_exact"))}, BOUND);
            Close.upToSign(beginning, model.axes()[0], Json.doubles(answer.path("axis_unit_ridged_Sw_norm")), BOUND);
        }
    }

    private static double fraction(JsonNode exact) {
        String[] parts = exact.asText().split("/", -1);
        BigDecimal over = new BigDecimal(new BigInteger(parts[0]));
        return parts.length == 1
                ? over.doubleValue()
                : over.divide(new BigDecimal(new BigInteger(parts[1])), MathContext.DECIMAL128)
                        .doubleValue();
    }

    private String refused(String beginning) throws IOException {
        Path out = folder.resolve("refused");
        CommandRun run =
                CommandRun.of("fit", "--table", table(exact(beginning)), "--label", TextTable.LABEL, "--out", out);
        assertThat(out.resolve("model.json")).doesNotExist();
        return run.refusal(3);
    }

    /** Shares of nothing are no numbers; they must not stand in the model as if they were. */
    @Test
    void equalMeansHaveNoShare() throws IOException {
        Path out = folder.resolve("equal-means");
        Path table = table(exact("equal class means"));
        CommandRun run = CommandRun.of("fit", "--table", table, "--label", TextTable.LABEL, "--out", out)
                .done();
        assertThat(run.err()).contains("the Fisher ratio is 0, shares are undefined");
        Model model = model(out);
        assertThat(model.fisherRatios()).containsExactly(0);
        assertThat(model.fisherShares()).isEmpty();
        assertThat(model.json().path("wilks").doubleValue()).isEqualTo(1);
        assertThat(CommandRun.of("show", out).done().out()).contains("undefined");
        Path projected = folder.resolve("projected");
        CommandRun.of("project", "--model", out, "--table", table, "--label", TextTable.LABEL, "--out", projected)
                .done();
        assertThat(projected.resolve("tally.csv")).content().isEqualTo("truth,decided,count\na,a,4\nb,a,4\n");
    }

    /** Only the plane of the axes is determined, and with it the ratios and the decisions. */
    @Test
    void tiedRatiosAreBothGiven() throws IOException {
        JsonNode exact = exact("tied eigenvalues");
        Path out = folder.resolve("tied");
        CommandRun.of("fit", "--table", table(exact), "--label", TextTable.LABEL, "--out", out)
                .done();
        Close.relative("tied", model(out).fisherRatios(), new double[] {16, 16}, BOUND);
    }

    @Test
    void withoutARidgeASingularTableIsRefusedNamingTheChannels() throws IOException {
        assertThat(refused("wide two classes"))
                .contains(
                        "more channels than degrees of freedom",
                        "5 channels, 2 degrees of freedom",
                        "a ridge, such as");
        assertThat(refused("third channel collinear")).contains("within each material c3 = 2·c1 - c2", "give a ridge");
        assertThat(refused("third channel a copy")).contains("within each material c3 = c1");
        assertThat(refused("third channel constant 7")).contains("constant in every record: c3");
        assertThat(refused("third channel constant within each class"))
                .contains("constant within each material, but different between them: c3", "infinite");
        assertThat(refused("every class one record"))
                .contains("nothing is known of the scatter", "3 records of 3 materials");
        assertThat(refused("one class only")).contains("at least two labels", "found a only");
    }
}
