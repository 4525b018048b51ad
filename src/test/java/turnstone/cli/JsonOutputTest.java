package turnstone.cli;

import static org.assertj.core.api.Assertions.assertThat;
import static turnstone.cli.SmallPlants.FIRST;
import static turnstone.cli.SmallPlants.LAST;

import com.fasterxml.jackson.core.JsonProcessingException;
import com.fasterxml.jackson.databind.DeserializationFeature;
import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import java.nio.file.Path;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;

/** With {@code --json} a command's standard output is one JSON text and nothing else, whatever the command. */
@ExtendWith(SmallPlants.class)
class JsonOutputTest {
    private static final ObjectMapper STRICT =
            new ObjectMapper().enable(DeserializationFeature.FAIL_ON_TRAILING_TOKENS);

    @TempDir
    private Path folder;

    private static JsonNode json(String... arguments) {
        Ran ran = Ran.command(
                Stream.concat(Stream.of(arguments), Stream.of("--json")).toArray(String[]::new));
        ran.succeeds();
        try {
            return STRICT.readTree(ran.out());
        } catch (JsonProcessingException notJson) {
            throw new AssertionError(String.join(" ", arguments) + " printed:\n" + ran.out(), notJson);
        }
    }

    @Test
    void ofTheCommandsOnAPlant(PlantOnDisk small) {
        PlantOnDisk plant = small.copy(folder.resolve("plant"));
        String file = plant.file();
        String last = LAST.toString();
        JsonNode dry = json("nightly", "--plant", file, "--dry-run");
        assertThat(dry.path("day").asText()).isEqualTo(last);
        assertThat(dry.path("read").asLong()).isEqualTo(529);
        assertThat(dry.path("postedRevision").asLong()).isZero();
        JsonNode night = json("nightly", "--plant", file);
        assertThat(night.path("verdict").path("verdict").asText()).isIn("hold", "release");
        assertThat(json("nightly", "--plant", file).path("day").isNull()).isTrue();
        JsonNode posted = json("post", "--plant", file, "--day", last);
        assertThat(posted.path("outcome").asText()).isEqualTo("same records");
        assertThat(posted.path("quarantined").path("unknown sorter").asLong()).isEqualTo(1);
        String candidate = night.path("candidate").asText();
        assertThat(json("show", candidate, "--plant", file).path("fingerprint").asText())
                .isEqualTo(candidate);
        JsonNode refit = json("refit", "--plant", file, "--until", FIRST.toString(), "--ridge", "1e-3,1e-2");
        assertThat(refit).hasSize(2);
        String rung = refit.get(0).path("fingerprint").asText();
        assertThat(json("trial", "--plant", file, "--day", last, "--candidate", rung)
                        .path("duties"))
                .hasSize(2);
        assertThat(json("release", rung, "--plant", file, "--reason", "try")
                        .path("to")
                        .asText())
                .isEqualTo(rung);
        assertThat(json("revert", "--plant", file, "--reason", "back")
                        .path("from")
                        .asText())
                .isEqualTo(rung);
        assertThat(json("history", "--plant", file)).hasSize(3);
        assertThat(json("verify", "--plant", file).path("problems")).isEmpty();
        assertThat(json("scale", "--plant", file, "--day", last)
                        .path("countScale")
                        .isMissingNode())
                .isFalse();
        Path positions = folder.resolve("positions");
        assertThat(json("project", "--model", rung, "--plant", file, "--day", last, "--out", positions.toString())
                        .path("read")
                        .asLong())
                .isEqualTo(529);
    }

    @Test
    void ofVerifyWhenItFindsSomething(PlantOnDisk small) throws JsonProcessingException {
        PlantOnDisk plant = small.copy(folder.resolve("plant"));
        PlantOnDisk.remove(plant.files("ledger", "moments").get(0));
        Ran ran = plant.run("verify", "--json");
        assertThat(ran.exitCode()).isEqualTo(4);
        assertThat(STRICT.readTree(ran.out()).path("problems")).hasSize(1);
    }

    @Test
    void ofTheCommandsOnATable(PlantOnDisk forItsEngine) {
        assertThat(forItsEngine.posted()).hasSize(1);
        String table = table();
        String model = folder.resolve("model").toString();
        assertThat(json("scale", "--table", table, "--label", "kind")
                        .path("countScale")
                        .isMissingNode())
                .isFalse();
        assertThat(json("fit", "--table", table, "--label", "kind", "--out", model)
                        .path("fisherRatios"))
                .hasSize(1);
        String positions = folder.resolve("positions").toString();
        assertThat(json("project", "--model", model, "--table", table, "--label", "kind", "--out", positions)
                        .path("decidedOtherwise")
                        .asLong())
                .isZero();
    }

    /** Two kinds of invented records far apart. */
    private String table() {
        StringBuilder text = new StringBuilder("kind,width,height\n");
        for (int i = 0; i < 20; i++) {
            text.append("round,")
                    .append(1 + i % 3)
                    .append('.')
                    .append(i % 7)
                    .append(',')
                    .append(i % 5)
                    .append('\n');
            text.append("flat,")
                    .append(60 + i % 4)
                    .append(".5,")
                    .append(9 + i % 6)
                    .append('\n');
        }
        Path table = folder.resolve("table.csv");
        PlantOnDisk.write(table, text.toString());
        return table.toString();
    }
}
