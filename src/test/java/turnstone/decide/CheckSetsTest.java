package turnstone.decide;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import com.fasterxml.jackson.databind.JsonNode;
import java.io.IOException;
import java.io.InputStream;
import java.math.BigDecimal;
import java.math.RoundingMode;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.TreeSet;
import java.util.stream.IntStream;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import turnstone.fisher.Cell;
import turnstone.fisher.Fit;
import turnstone.fisher.FitRequest;
import turnstone.json.Json;
import turnstone.measure.ChannelScale;
import turnstone.measure.CountScale;
import turnstone.measure.Precision;
import turnstone.moments.BlockKernels;
import turnstone.moments.KernelChoice;
import turnstone.moments.RowFolder;

/** Tables decided by their own models against the reference tallies in {@code checks}: sources and method stand in each file there. */
class CheckSetsTest {
    private static final int COARSE_LIMIT = 1 << 21;

    private record Table(List<String> labels, List<BigDecimal[]> rows) {}

    @ParameterizedTest
    @ValueSource(strings = {"iris", "wine", "penguins", "breast_cancer"})
    void resubstitutionTalliesAreThoseOfTheReference(String set) throws IOException {
        JsonNode reference = Json.read(bytes("/checks/" + set + ".json"), set);
        Table table = table("/checks/data/" + set + ".csv");
        List<String> materials = List.copyOf(new TreeSet<>(table.labels()));
        CountScale scale = scale(table);
        int d = scale.channels();
        Fit fit = fit(table, materials, scale);
        double[] priors = IntStream.range(0, materials.size())
                .mapToDouble(
                        k -> (double) fit.recordsPerMaterial()[k] / table.rows().size())
                .toArray();
        List<String> names = IntStream.rangeClosed(1, d).mapToObj(c -> "c" + c).toList();
        MadeFrom from = new MadeFrom(List.of(), List.of(), Optional.empty(), List.of(set));
        Model made = Model.of(fit, ModelContext.of("table", names, scale, from).withDecisionPriors(priors));
        Model model = Model.read(Json.read(Json.pretty(made.json()), set), set);
        assertThat(model.fingerprint()).isEqualTo(made.fingerprint());

        double[] lambda = Json.doubles(reference.path("eigenvalues"));
        for (int a = 0; a < lambda.length; a++) {
            assertThat(model.fisherRatios()[a]).isCloseTo(lambda[a], within(1e-12 * lambda[a]));
        }
        long[][] tally = new long[materials.size()][materials.size()];
        double smallest = decideAll(table, materials, scale, Projector.of(model), tally);
        JsonNode resubstitution = reference.path("resubstitution");
        JsonNode expected = resubstitution.path("confusion_truth_by_decided");
        for (int truth = 0; truth < tally.length; truth++) {
            for (int decided = 0; decided < tally.length; decided++) {
                assertThat(tally[truth][decided])
                        .as("%s decided %s", materials.get(truth), materials.get(decided))
                        .isEqualTo(expected.path(truth).path(decided).asLong());
            }
        }
        // The reference gives three digits.
        double margin = resubstitution.path("smallest_margin").doubleValue();
        assertThat(smallest).isCloseTo(margin, within(5.1e-3 * margin));
        assertThat(ModelPage.of(model).lines()).allMatch(line -> line.length() <= 80);
    }

    private static double decideAll(
            Table table, List<String> materials, CountScale scale, Projector projector, long[][] tally) {
        double smallest = Double.POSITIVE_INFINITY;
        double[] position = new double[projector.rank()];
        Judgement judgement = new Judgement();
        for (int i = 0; i < table.rows().size(); i++) {
            projector.judge(counts(table.rows().get(i), scale), 0, position, judgement);
            tally[materials.indexOf(table.labels().get(i))][judgement.material()]++;
            smallest = Math.min(smallest, judgement.margin());
        }
        return smallest;
    }

    private static Fit fit(Table table, List<String> materials, CountScale scale) {
        List<List<Cell>> cells = new ArrayList<>();
        for (String material : materials) {
            RowFolder folder =
                    new RowFolder(scale.channels(), scale.fineChannels(), BlockKernels.choose(KernelChoice.SCALAR), 64);
            for (int i = 0; i < table.rows().size(); i++) {
                if (table.labels().get(i).equals(material)) {
                    folder.add(counts(table.rows().get(i), scale), 0);
                }
            }
            cells.add(List.of(Cell.asCounted(folder.snapshot())));
        }
        return Fit.of(FitRequest.of(materials, cells, scale));
    }

    private static double[] counts(BigDecimal[] row, CountScale scale) {
        double[] values = new double[row.length];
        for (int c = 0; c < row.length; c++) {
            values[c] = row[c].doubleValue();
        }
        double[] counts = new double[row.length];
        assertThat(scale.toCounts(values, 0, counts, 0)).isEqualTo(-1);
        return counts;
    }

    /** The largest power-of-ten step that loses nothing, offset mid-range rounded to the step, fine where coarse cannot hold it. */
    private static CountScale scale(Table table) {
        List<ChannelScale> scales = new ArrayList<>();
        for (int c = 0; c < table.rows().get(0).length; c++) {
            int channel = c;
            List<BigDecimal> values =
                    table.rows().stream().map(row -> row[channel]).toList();
            int decimals = values.stream()
                    .mapToInt(value -> value.stripTrailingZeros().scale())
                    .max()
                    .orElseThrow();
            BigDecimal low = values.stream().min(BigDecimal::compareTo).orElseThrow();
            BigDecimal high = values.stream().max(BigDecimal::compareTo).orElseThrow();
            BigDecimal offset = low.add(high).divide(BigDecimal.valueOf(2)).setScale(decimals, RoundingMode.HALF_EVEN);
            boolean coarse = high.subtract(offset).scaleByPowerOfTen(decimals).doubleValue() < COARSE_LIMIT - 1;
            BigDecimal step = BigDecimal.ONE.scaleByPowerOfTen(-decimals);
            scales.add(new ChannelScale(offset, step, coarse ? Precision.COARSE : Precision.FINE));
        }
        return CountScale.of(scales);
    }

    private static Table table(String resource) throws IOException {
        List<String> labels = new ArrayList<>();
        List<BigDecimal[]> rows = new ArrayList<>();
        new String(bytes(resource), StandardCharsets.UTF_8).lines().skip(1).forEach(line -> {
            List<String> fields = List.of(line.split(",", -1));
            labels.add(fields.get(0));
            rows.add(fields.stream().skip(1).map(BigDecimal::new).toArray(BigDecimal[]::new));
        });
        return new Table(labels, rows);
    }

    private static byte[] bytes(String resource) throws IOException {
        try (InputStream in = CheckSetsTest.class.getResourceAsStream(resource)) {
            return in.readAllBytes();
        }
    }
}
