package turnstone.spark;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import com.fasterxml.jackson.databind.JsonNode;
import java.io.IOException;
import java.io.InputStream;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Optional;
import java.util.SortedMap;
import java.util.stream.Stream;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import turnstone.decide.MadeFrom;
import turnstone.decide.Model;
import turnstone.decide.ModelContext;
import turnstone.decide.Projector;
import turnstone.fault.Fault;
import turnstone.fisher.Cell;
import turnstone.fisher.Fit;
import turnstone.fisher.FitRequest;
import turnstone.json.Json;
import turnstone.measure.HeadSpec;
import turnstone.moments.Moments;

/**
 * Tables from text to tally through the whole path, against the references in {@code checks}: sources and method stand in each file there.
 */
@ExtendWith(SharedSession.class)
class TableJobsTest {
    @TempDir
    Path folder;

    private static byte[] resource(String name) throws IOException {
        try (InputStream in = TableJobsTest.class.getResourceAsStream(name)) {
            return in.readAllBytes();
        }
    }

    private RecordSource source(Session session, String set) throws IOException {
        Path file = folder.resolve(set + ".csv");
        Files.write(file, resource("/checks/data/" + set + ".csv"));
        ColumnNames columns = ColumnNames.allBut("label").carryingOthers();
        return RecordSource.open(session, new TableSpec(List.of(file.toString()), TableSpec.Form.CSV, columns));
    }

    private static Model model(RecordSource source, IntakeSpec intake, FoldResult folded) {
        SortedMap<String, Moments> sums = folded.byMaterial();
        List<String> labels = List.copyOf(sums.keySet());
        List<List<Cell>> cells =
                sums.values().stream().map(m -> List.of(new Cell(m, 1))).toList();
        Fit fit = Fit.of(FitRequest.of(labels, cells, intake.scale()));
        double[] priors = sums.values().stream()
                .mapToDouble(m -> (double) m.records() / folded.counts().accepted())
                .toArray();
        MadeFrom from = new MadeFrom(List.of(), List.of(), Optional.empty(), List.of());
        return Model.of(
                fit,
                ModelContext.of("table", source.channelNames(), intake.scale(), from)
                        .withDecisionPriors(priors));
    }

    @ParameterizedTest
    @ValueSource(strings = {"iris", "wine", "breast_cancer"})
    void ratiosAndTalliesAreThoseOfTheReferences(String set, Session session) throws IOException {
        JsonNode reference = Json.read(resource("/checks/" + set + ".json"), set);
        RecordSource source = source(session, set);
        ScaleJob.Finding finding = ScaleJob.propose(source);
        IntakeSpec intake = IntakeSpec.table(HeadSpec.none(source.channels()), finding.scale());
        assertThat(ScaleJob.loss(source, intake).isLossless()).isTrue();
        FoldResult folded = FoldJob.run(source, intake, FoldSettings.usual());
        assertThat(folded.counts().accepted()).isEqualTo(source.rows());
        Model model = model(source, intake, folded);
        double[] lambda = Json.doubles(reference.path("eigenvalues"));
        for (int a = 0; a < lambda.length; a++) {
            assertThat(model.fisherRatios()[a]).isCloseTo(lambda[a], within(1e-12 * lambda[a]));
        }
        Path out = folder.resolve("out");
        ProjectResult projected = ProjectJob.run(
                source,
                intake,
                Projector.of(model),
                new ProjectSettings(out.toString(), TableSpec.Form.CSV, 0.05, 100));
        JsonNode expected = reference.path("resubstitution").path("confusion_truth_by_decided");
        List<String> labels = List.copyOf(folded.byMaterial().keySet());
        for (int t = 0; t < labels.size(); t++) {
            for (int k = 0; k < labels.size(); k++) {
                assertThat(projected.tally().count(labels.get(t), labels.get(k)))
                        .isEqualTo(expected.path(t).path(k).asLong());
            }
        }
        assertThat(out.resolve("tally.csv"))
                .content()
                .isEqualTo(projected.tally().csv());
        assertThat(lines(out.resolve("positions"))).hasSize((int) source.rows());
        assertThatThrownBy(() -> ProjectJob.run(
                        source,
                        intake,
                        Projector.of(model),
                        new ProjectSettings(out.toString(), TableSpec.Form.CSV, 0.05, 100)))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("the output folder is not empty");
        try (Stream<Path> left = Files.list(folder)) {
            assertThat(left.filter(path -> path.getFileName().toString().startsWith(".out")))
                    .isEmpty();
        }
    }

    private static List<String> lines(Path positions) throws IOException {
        try (Stream<Path> files = Files.list(positions)) {
            return files.filter(file -> file.toString().endsWith(".csv"))
                    .flatMap(file -> {
                        try {
                            return Files.readAllLines(file).stream().skip(1);
                        } catch (IOException e) {
                            throw new java.io.UncheckedIOException(e);
                        }
                    })
                    .toList();
        }
    }
}
