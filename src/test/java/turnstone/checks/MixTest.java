package turnstone.checks;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import turnstone.decide.Model;
import turnstone.json.Json;
import turnstone.spark.Session;
import turnstone.spark.SharedSession;

/** {@code --mix} and {@code --ridge analytic} against the same analysis by another road, and against published error counts. */
@ExtendWith(SharedSession.class)
class MixTest {
    private static final double BOUND = 1e-9;
    private static final int INPUT = 3;

    @TempDir
    Path folder;

    @BeforeAll
    static void theEngineRunsBeforeTheCommands(Session session) {
        assertThat(session.slots()).isPositive();
    }

    /** A fitted model and the tally of its own table. */
    private record Made(Model model, String tally) {}

    private Made made(TextTable table, Object... more) throws IOException {
        Path csv = table.toCsv(folder.resolve("table.csv"));
        Path fitted = folder.resolve("fitted");
        List<Object> words =
                new ArrayList<>(List.of("fit", "--table", csv, "--label", TextTable.LABEL, "--out", fitted));
        words.addAll(List.of(more));
        CommandRun.of(words.toArray()).done();
        Path projected = folder.resolve("projected");
        CommandRun.of("project", "--model", fitted, "--table", csv, "--label", TextTable.LABEL, "--out", projected)
                .done();
        Path file = fitted.resolve("model.json");
        Model model = Model.read(Json.read(Files.readAllBytes(file), file.toString()), file.toString());
        return new Made(model, Files.readString(projected.resolve("tally.csv")));
    }

    private static void requireSame(Made made, PlainDiscriminant plain, double[] shares, double ridge) {
        List<PlainDiscriminant.Axis> expected =
                plain.solve(shares, ridge).subList(0, made.model().rank());
        for (int r = 0; r < expected.size(); r++) {
            PlainDiscriminant.Axis axis = expected.get(r);
            double[] ratio = {made.model().fisherRatios()[r]};
            Close.relative("ratio", ratio, new double[] {axis.ratio()}, BOUND);
            double[] weights = axis.weights().stream().mapToDouble(w -> w).toArray();
            Close.upToSign("axis " + (r + 1), made.model().axes()[r], weights, BOUND);
        }
        double[] priors = made.model().materials().stream()
                .mapToDouble(material -> material.decisionPrior())
                .toArray();
        Close.relative("priors", priors, shares, 1e-15);
        assertThat(made.tally()).isEqualTo(plain.tally(expected, shares));
    }

    /** The error count with equal priors stands in the set's own reference; with all axes it does not depend on the between scatter. */
    @ParameterizedTest
    @ValueSource(strings = {"breast_cancer", "penguins-measured", "wine"})
    void equalMixWeighsAllMaterialsAlike(String set) throws IOException {
        TextTable table = TextTable.resource(set);
        PlainDiscriminant plain = PlainDiscriminant.of(table);
        double[] shares = new double[plain.classes().size()];
        Arrays.fill(shares, 1.0 / shares.length);
        Made made = made(table, "--mix", "equal");
        requireSame(made, plain, shares, 0);
        int errors = TextTable.of(made.tally()).rows().stream()
                .filter(cells -> !cells.get(0).equals(cells.get(1)))
                .mapToInt(cells -> Integer.parseInt(cells.get(2)))
                .sum();
        var byAxes = Reference.of(set).json().path("resubstitution").path("errors_equal_priors_by_rank");
        assertThat(errors).isEqualTo(byAxes.get(byAxes.size() - 1).intValue());
        assertThat(made.model().balance().path("materials").textValue()).isEqualTo("equal");
    }

    @ParameterizedTest
    @ValueSource(ints = {1, 2})
    void aListedMixSetsWeightsAndPriors(int axes) throws IOException {
        TextTable table = TextTable.resource("penguins");
        Path mix = Files.writeString(folder.resolve("mix.csv"), "Gentoo,0.05\nAdelie,0.15\nChinstrap,0.8\n");
        PlainDiscriminant plain = PlainDiscriminant.of(table);
        assertThat(plain.classes()).containsExactly("Adelie", "Chinstrap", "Gentoo");
        Made made = made(table, "--mix", mix, "--axes", axes);
        assertThat(made.model().rank()).isEqualTo(axes);
        requireSame(made, plain, new double[] {0.15, 0.8, 0.05}, 0);
        String asCounted =
                plain.tally(plain.solve(plain.sharesAsCounted(), 0).subList(0, axes), plain.sharesAsCounted());
        assertThat(made.tally()).isNotEqualTo(asCounted);
    }

    @ParameterizedTest
    @ValueSource(strings = {"iris", "penguins"})
    void theAnalyticRidgeFollowsItsFormula(String set) throws IOException {
        TextTable table = TextTable.resource(set);
        PlainDiscriminant plain = PlainDiscriminant.of(table);
        Made made = made(table, "--ridge", "analytic");
        double ridge = plain.analyticRidge();
        assertThat(ridge).isBetween(1e-6, 1.0);
        Close.relative("ridge", new double[] {made.model().ridge()}, new double[] {ridge}, BOUND);
        requireSame(made, plain, plain.sharesAsCounted(), ridge);
    }

    @Test
    void aMixThatDoesNotFitIsRefused() throws IOException {
        Path csv = TextTable.resource("penguins").toCsv(folder.resolve("penguins.csv"));
        assertThat(refusal(csv, "Adelie,0.5\nGentoo,0.5\n", INPUT))
                .contains("mix.csv: the mix does not list the materials of the table", "none of [Chinstrap]");
        assertThat(refusal(csv, "Adelie,0.5\nGentoo,0.4\nChinstrap,0.2\n", INPUT))
                .contains("do not sum to 1");
        assertThat(refusal(csv, "Adelie,0.5\nGentoo,half\nChinstrap,0.2\n", INPUT))
                .contains("mix.csv line 2: not a line of a mix; found Gentoo,half");
        assertThat(CommandRun.of(
                                "fit",
                                "--table",
                                csv,
                                "--label",
                                "label",
                                "--mix",
                                folder.resolve("no-mix"),
                                "--out",
                                folder.resolve("out"))
                        .refusal(INPUT))
                .contains("no-mix: there is no such mix");
    }

    private String refusal(Path csv, String mix, int code) throws IOException {
        Path file = Files.writeString(folder.resolve("mix.csv"), mix);
        return CommandRun.of("fit", "--table", csv, "--label", "label", "--mix", file, "--out", folder.resolve("out"))
                .refusal(code);
    }
}
