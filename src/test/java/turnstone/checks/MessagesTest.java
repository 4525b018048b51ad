package turnstone.checks;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import turnstone.json.Json;
import turnstone.spark.Session;
import turnstone.spark.SharedSession;

/** What {@code fit} and {@code project} print, and the one line with which each refuses. */
@ExtendWith(SharedSession.class)
class MessagesTest {
    private static final int USAGE = 2;
    private static final int INPUT = 3;
    private static final int STORAGE = 4;

    @TempDir
    Path folder;

    private Path iris;

    @BeforeAll
    static void theEngineRunsBeforeTheCommands(Session session) {
        assertThat(session.slots()).isPositive();
    }

    @BeforeEach
    void writeIris() throws IOException {
        iris = TextTable.resource("iris").toCsv(folder.resolve("iris.csv"));
    }

    private CommandRun fit(Path table, Path out, Object... more) {
        return run(List.of("fit", "--table", table, "--out", out), more);
    }

    private CommandRun project(Object model, Path table, Path out, Object... more) {
        return run(List.of("project", "--model", model, "--table", table, "--out", out), more);
    }

    private static CommandRun run(List<Object> words, Object... more) {
        List<Object> all = new java.util.ArrayList<>(words);
        all.addAll(List.of(more));
        return CommandRun.of(all.toArray());
    }

    private Path fitted() {
        Path out = folder.resolve("model-of-iris");
        fit(iris, out, "--label", "label").done();
        return out;
    }

    @Test
    void fitAndProjectPrintWhatTheyFound() throws IOException {
        Path model = folder.resolve("fitted");
        CommandRun fitted = fit(iris, model, "--label", "label").done();
        String fingerprint = Json.read(Files.readAllBytes(model.resolve("model.json")), "model")
                .path("fingerprint")
                .textValue();
        assertThat(fitted.out())
                .contains("model " + fingerprint.substring(0, 8))
                .contains("150 read = 150 accepted + 0 no signal + 0 quarantined")
                .containsPattern("axis 1 +Fisher ratio 32\\.19192\\d+ +share 99\\.1")
                .containsPattern("axis 2 +Fisher ratio 0\\.28539\\d+ +share 0\\.88")
                .contains("within degrees of freedom 147")
                .contains("count scale: every value is held without loss");
        assertThat(fitted.err()).doesNotContain("\r");
        Path out = folder.resolve("positions-of-iris");
        CommandRun projected = project(model, iris, out, "--label", "label").done();
        assertThat(projected.out())
                .contains("150 positions in", "3 of 150 decided otherwise than their label; see tally.csv");
        assertThat(out.resolve("tally.csv"))
                .content()
                .isEqualTo(Reference.of("iris").tally("resubstitution"));
    }

    @Test
    void projectWritesParquetToo(Session session) throws IOException {
        Path out = folder.resolve("parquet");
        project(fitted(), iris, out, "--label", "label", "--form", "parquet").done();
        assertThat(session.spark()
                        .read()
                        .parquet(out.resolve("positions").toString())
                        .count())
                .isEqualTo(150);
        assertThat(out.resolve("tally.csv"))
                .content()
                .isEqualTo(Reference.of("iris").tally("resubstitution"));
    }

    @Test
    void withoutALabelThereIsNoTally() throws IOException {
        Path out = folder.resolve("unlabelled");
        CommandRun run = project(fitted(), iris, out).done();
        assertThat(run.out()).contains("150 positions").doesNotContain("tally");
        assertThat(out.resolve("tally.csv")).doesNotExist();
        assertThat(WholePath.positions(out)).allMatch(row -> !row.get("label").isEmpty());
    }

    @Test
    void aMissingFileIsNamed() {
        Path missing = folder.resolve("nothing.csv");
        assertThat(fit(missing, folder.resolve("out"), "--label", "label").refusal(INPUT))
                .contains("nothing.csv: no files", "check the path");
        assertThat(project(fitted(), missing, folder.resolve("out")).refusal(INPUT))
                .contains("nothing.csv: no files");
    }

    @Test
    void aFolderIsReadByTheNamesOfItsFiles(Session session) throws IOException {
        TextTable table = TextTable.resource("iris");
        Path files = table.toFiles(folder.resolve("files"), 3);
        CommandRun run =
                fit(files, folder.resolve("of-three"), "--label", "label").done();
        assertThat(run.out()).contains("150 read = 150 accepted");
        table.toParquet(session, files.resolve("more"));
        assertThat(fit(files, folder.resolve("of-both"), "--label", "label").refusal(INPUT))
                .contains("files: files of two forms; found 3 of 4 are CSV by their names");
    }

    @Test
    void aMissingLabelColumnIsNamed() {
        assertThat(fit(iris, folder.resolve("out"), "--label", "species").refusal(INPUT))
                .contains("iris.csv", "column \"species\" is missing", "columns label, c1, c2, c3, c4");
    }

    @Test
    void oneLabelOnlyIsRefused() throws IOException {
        Path one = TextTable.resource("iris").records(1, 50).toCsv(folder.resolve("one.csv"));
        assertThat(fit(one, folder.resolve("out"), "--label", "label").refusal(INPUT))
                .contains("one.csv: a projection needs records of at least two labels; found setosa only");
    }

    @Test
    void anOutputInUseIsLeftAlone() throws IOException {
        Path model = fitted();
        byte[] before = Files.readAllBytes(model.resolve("model.json"));
        assertThat(fit(iris, model, "--label", "label").refusal(INPUT))
                .contains("there is a model already", "name another folder");
        assertThat(Files.readAllBytes(model.resolve("model.json"))).isEqualTo(before);
        Path used = Files.createDirectory(folder.resolve("used"));
        Files.writeString(used.resolve("notes.txt"), "kept");
        assertThat(project(model, iris, used).refusal(INPUT)).contains("the output folder is not empty", "used");
        assertThat(used.toFile().list()).containsExactly("notes.txt");
        Path file = Files.writeString(folder.resolve("file"), "kept");
        assertThat(fit(iris, file, "--label", "label").refusal(INPUT))
                .contains("file: there is a file where the folder should be");
    }

    @Test
    void aMissingModelIsNamed() throws IOException {
        assertThat(project(folder.resolve("no-model"), iris, folder.resolve("out"))
                        .refusal(INPUT))
                .contains("no-model: there is no such model", "a folder with model.json");
        Path empty = Files.createDirectory(folder.resolve("empty"));
        assertThat(project(empty, iris, folder.resolve("out")).refusal(INPUT))
                .contains("model.json: there is no model");
        assertThat(project("0123456789ab", iris, folder.resolve("out")).refusal(USAGE))
                .contains("add --plant FILE");
    }

    @Test
    void aModelThatIsNotWhatWasWrittenIsRefused() throws IOException {
        Path model = fitted();
        Path file = model.resolve("model.json");
        String text = Files.readString(file);
        Files.writeString(file, text.replaceFirst("(\"fisherRatios\" : \\[ )3", "$14"));
        assertThat(Files.readString(file)).isNotEqualTo(text);
        assertThat(project(model, iris, folder.resolve("out")).refusal(STORAGE)).contains("model.json");
    }

    @Test
    void anotherNumberOfChannelsIsRefused() throws IOException {
        Path narrow = Files.writeString(folder.resolve("narrow.csv"), "label,c1,c2,c3\nsetosa,5.1,3.5,1.4\n");
        assertThat(project(fitted(), narrow, folder.resolve("out")).refusal(INPUT))
                .contains("narrow.csv", "channel column \"c4\" is missing", "columns label, c1, c2, c3");
        Path array = Files.writeString(folder.resolve("array.csv"), "label,v\nsetosa,5.1 3.5 1.4\n");
        assertThat(project(fitted("again"), array, folder.resolve("out"), "--array", "v")
                        .refusal(INPUT))
                .contains("another number of channels than the model; found 3, expected 4");
    }

    private Path fitted(String name) {
        Path out = folder.resolve(name);
        fit(iris, out, "--label", "label").done();
        return out;
    }

    @Test
    void optionsThatMakeNoSenseAreUsage() {
        assertThat(fit(iris, folder.resolve("a"), "--label", "label", "--ridge", "-1")
                        .refusal(USAGE))
                .contains("--ridge: not a ridge; found -1");
        assertThat(fit(iris, folder.resolve("c"), "--label", "label", "--axes", "-1")
                        .refusal(USAGE))
                .contains("--axes: out of range; found -1");
        assertThat(fit(iris, folder.resolve("d"), "--label", "label", "--max-quarantine", "2")
                        .refusal(USAGE))
                .contains("--max-quarantine: out of range; found 2");
        assertThat(project(fitted(), iris, folder.resolve("d"), "--max-quarantine", "-0.1")
                        .refusal(USAGE))
                .contains("--max-quarantine: out of range; found -0.1");
        assertThat(CommandRun.of("fit", "--table", iris, "--out", folder.resolve("e"))
                        .refusal(USAGE))
                .contains("--label");
    }
}
