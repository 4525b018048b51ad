package turnstone.checks;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.stream.Stream;
import turnstone.decide.Model;
import turnstone.json.Json;
import turnstone.spark.ProjectSettings;
import turnstone.spark.Session;
import turnstone.spark.TableSpec;
import turnstone.table.Mix;
import turnstone.table.Table;
import turnstone.table.TableFit;
import turnstone.table.TableProject;

/**
 * The path of a plain table: count scale, fold, fit, {@code model.json}, projection, {@code tally.csv}.
 *
 * @param session the engine
 * @param folder where files go
 */
record WholePath(Session session, Path folder) {
    private static final double UNFAMILIAR_SHARE = 0.01;
    private static final double MOST_QUARANTINED = 0;
    private static final int QUARANTINE_KEPT = 100;
    static final int ALL_AXES = 0;

    /** Fits a file or folder, writes {@code model.json} and reads it back. */
    Model fit(Path table, double ridge, int axes) throws IOException {
        return fitted(table, ridge, axes).model();
    }

    /** The same, with the fingerprint of the sums. */
    TableFit.Result fitted(Path table, double ridge, int axes) throws IOException {
        TableFit.Result result = TableFit.run(
                session,
                new TableFit.Order(
                        new Table(table.toString(), Optional.of(TextTable.LABEL), List.of(), Optional.empty()),
                        OptionalDouble.of(ridge),
                        axes,
                        new Mix.AsCounted(),
                        Optional.empty(),
                        UNFAMILIAR_SHARE,
                        MOST_QUARANTINED));
        Path file = Files.createTempFile(folder, "model", ".json");
        Files.write(file, Json.pretty(result.model().json()));
        Model model = Model.read(Json.read(Files.readAllBytes(file), file.toString()), file.toString());
        return new TableFit.Result(model, result.counts(), result.loss(), result.momentsFingerprint());
    }

    /** Projects a labelled file or folder; the folder that was made. */
    Path project(Model model, Path table) throws IOException {
        Path out = Files.createTempDirectory(folder, "projected");
        TableProject.run(
                session,
                model,
                new Table(table.toString(), Optional.of(TextTable.LABEL), model.channels(), Optional.empty()),
                new ProjectSettings(out.toString(), TableSpec.Form.CSV, MOST_QUARANTINED, QUARANTINE_KEPT));
        return out;
    }

    /** The text of {@code tally.csv}. */
    String tally(Model model, Path table) throws IOException {
        return Files.readString(project(model, table).resolve("tally.csv"));
    }

    /** Rows of the table of positions, each a map from column to cell. */
    static List<Map<String, String>> positions(Path projected) throws IOException {
        List<Map<String, String>> rows = new ArrayList<>();
        try (Stream<Path> files = Files.list(projected.resolve("positions"))) {
            files.filter(file -> file.toString().endsWith(".csv")).sorted().forEach(file -> {
                TextTable table = TextTable.of(read(file));
                for (List<String> cells : table.rows()) {
                    Map<String, String> row = new HashMap<>();
                    for (int c = 0; c < cells.size(); c++) {
                        row.put(table.header().get(c), cells.get(c));
                    }
                    rows.add(row);
                }
            });
        }
        return rows;
    }

    private static String read(Path file) {
        try {
            return Files.readString(file);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
