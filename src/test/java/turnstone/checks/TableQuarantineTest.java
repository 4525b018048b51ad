package turnstone.checks;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import turnstone.json.Json;
import turnstone.spark.Session;
import turnstone.spark.SharedSession;

/** Rows of a plain table that are no measurements: counted by reason, listed with their place, and refused where there are too many. */
@ExtendWith(SharedSession.class)
class TableQuarantineTest {
    private static final int BROKEN = 4;
    private static final String ALLOWED = "0.05";

    @TempDir
    Path folder;

    @BeforeAll
    static void theEngineRunsBeforeTheCommands(Session session) {
        assertThat(session.slots()).isPositive();
    }

    /** Iris with four more rows, at 11, 62, 103 and 154. */
    private Path brokenIris() throws IOException {
        List<String> lines =
                new ArrayList<>(TextTable.resource("iris").csv().lines().toList());
        lines.add(11, "setosa,5.1,x,1.4,0.2");
        lines.add(62, "virginica,6.1,2.8");
        lines.add(103, ",6.1,2.8,4.7,1.2");
        lines.add("setosa,5.1,3.5,1.4,0.2,9.9");
        return Files.write(folder.resolve("broken.csv"), lines);
    }

    private CommandRun fit(Path table, Path out, String most) {
        return CommandRun.of(
                "fit", "--json", "--table", table, "--label", "label", "--max-quarantine", most, "--out", out);
    }

    private CommandRun project(Path model, Path table, Path out, String most) {
        return CommandRun.of(
                "project",
                "--json",
                "--model",
                model,
                "--table",
                table,
                "--label",
                "label",
                "--max-quarantine",
                most,
                "--out",
                out);
    }

    private static void requireListed(Path quarantine) throws IOException {
        TextTable listed = TextTable.of(Files.readString(quarantine));
        assertThat(listed.header()).startsWith("file", "row", "reason");
        assertThat(listed.rows()).hasSize(BROKEN).allMatch(row -> row.get(0).endsWith("broken.csv"));
        assertThat(listed.rows().stream().map(row -> row.get(1) + " " + row.get(2)))
                .containsExactly(
                        "11 not a number", "62 wrong channel count", "103 missing key", "154 wrong channel count");
        assertThat(listed.rows().get(0).subList(3, 5)).containsExactly("2", "x");
    }

    @Test
    void brokenRowsAreCountedListedAndLeaveTheFitAsItIsWithoutThem() throws IOException {
        Path whole = TextTable.resource("iris").toCsv(folder.resolve("iris.csv"));
        Path broken = brokenIris();
        CommandRun clean = fit(whole, folder.resolve("clean"), "0").done();
        CommandRun found = fit(broken, folder.resolve("fitted"), ALLOWED).done();
        String fingerprint = fingerprint(found);
        assertThat(fingerprint).isEqualTo(fingerprint(clean));
        assertThat(folder.resolve("clean/quarantine.csv")).doesNotExist();
        requireListed(folder.resolve("fitted/quarantine.csv"));

        Path projected = folder.resolve("projected");
        CommandRun run =
                project(folder.resolve("fitted"), broken, projected, ALLOWED).done();
        assertThat(run.out())
                .contains("\"read\" : 154", "\"accepted\" : 150", "\"noSignal\" : 0", "\"quarantined\" : 4");
        requireListed(projected.resolve("quarantine.csv"));
        assertThat(projected.resolve("tally.csv"))
                .content()
                .isEqualTo(Reference.of("iris").tally("resubstitution"));
        assertThat(WholePath.positions(projected)).hasSize(150);
    }

    private static String fingerprint(CommandRun run) {
        return Json.read(run.out().getBytes(java.nio.charset.StandardCharsets.UTF_8), "result")
                .path("fingerprint")
                .textValue();
    }

    @Test
    void moreThanTheLimitIsRefusedAndNothingIsWritten() throws IOException {
        Path broken = brokenIris();
        String tooMuch = fit(broken, folder.resolve("refused"), "0.025").refusal(3);
        assertThat(tooMuch)
                .contains(
                        "too many records are quarantined",
                        "4 of 154 {missing key=1, not a number=1, wrong channel count=2}",
                        "broken.csv,11,not a number,2,x",
                        "a share of at most 0.025");
        assertThat(folder.resolve("refused/model.json")).doesNotExist();

        Path whole = TextTable.resource("iris").toCsv(folder.resolve("iris.csv"));
        fit(whole, folder.resolve("clean"), "0").done();
        Path out = folder.resolve("positions-refused");
        String again = project(folder.resolve("clean"), broken, out, "0.025").refusal(3);
        assertThat(again).contains("too many records are quarantined", "4 of 154");
        assertThat(out).doesNotExist();
    }
}
