package turnstone.cli;

import static org.assertj.core.api.Assertions.assertThat;
import static turnstone.cli.SmallPlants.FIRST;
import static turnstone.cli.SmallPlants.LAST;

import java.nio.file.Path;
import java.util.Arrays;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

/** Posting again, in other form, without a showing; and finding what is not what was written. */
@ExtendWith(SmallPlants.class)
class LedgerCareTest {
    @TempDir
    private Path folder;

    private PlantOnDisk plant;

    @BeforeEach
    void copy(PlantOnDisk small) {
        plant = small.copy(folder.resolve("plant"));
    }

    @Test
    void postingTheSameRecordsAgainDoesNothingAndSaysSo() {
        Ran again = plant.run("post", "--day", FIRST.toString()).succeeds();
        assertThat(again.out()).contains("already posted with the same records", "revision 1");
        assertThat(plant.files("ledger/journal", ".json")).hasSize(1);
        assertThat(plant.files("ledger/days", "moments")).hasSize(1);
    }

    @Test
    void otherRecordsOfAPostedDayNeedReplace() {
        String before = plant.sums(FIRST);
        PlantOnDisk.remove(plant.files("records/" + FIRST, ".parquet").get(0));
        plant.run("post", "--day", FIRST.toString())
                .refused(3, "posted with other records", FIRST.toString(), "--replace");
        assertThat(plant.posted()).containsExactly(FIRST + " revision 1");
        Ran replaced = plant.run("post", "--day", FIRST.toString(), "--replace").succeeds();
        assertThat(replaced.out()).contains("revision 2");
        assertThat(plant.posted()).containsExactly(FIRST + " revision 2");
        assertThat(plant.sums(FIRST)).isNotEqualTo(before);
        assertThat(plant.run("verify").succeeds().out()).contains("is what was written");
    }

    @Test
    void aShowingCanBeLeftOut() {
        String showing = FIRST + ".avocet.pp-1";
        String record = PlantOnDisk.text(plant.files("ledger/journal", ".json").get(0));
        assertThat(record).contains(showing);
        plant.run("post", "--day", FIRST.toString(), "--without", "no-such-showing")
                .refused(3, "no-such-showing");
        Ran without = plant.run("post", "--day", FIRST.toString(), "--without", showing, "--json")
                .succeeds();
        assertThat(without.out()).contains("\"revision\" : 2").contains("\"posted\"");
        assertThat(plant.posted()).containsExactly(FIRST + " revision 2");
        assertThat(plant.run("refit").succeeds().out()).contains("87 showings");
    }

    @ParameterizedTest
    @ValueSource(strings = {"moments", "showings", "00000001.json", "ledger.json"})
    void anAlteredFileIsNamed(String name) {
        Path file = only(name);
        byte[] content = PlantOnDisk.bytes(file);
        content[content.length / 2] ^= 1;
        PlantOnDisk.write(file, content);
        isNamed(file);
    }

    @ParameterizedTest
    @ValueSource(strings = {"moments", "showings", "00000001.json", "ledger.json"})
    void aTruncatedFileIsNamed(String name) {
        Path file = only(name);
        byte[] content = PlantOnDisk.bytes(file);
        PlantOnDisk.write(file, Arrays.copyOf(content, content.length - 7));
        isNamed(file);
    }

    @ParameterizedTest
    @ValueSource(strings = {"moments", "showings", "ledger.json"})
    void aRemovedFileIsNamed(String name) {
        Path file = only(name);
        PlantOnDisk.remove(file);
        isNamed(file);
    }

    @Test
    void aRemovedEntryBeforeAnotherIsNamed() {
        plant.run("post", "--day", LAST.toString()).succeeds();
        Path first = plant.folder().resolve("ledger/journal/00000001.json");
        PlantOnDisk.remove(first);
        isNamed(first);
    }

    private Path only(String name) {
        assertThat(plant.files("ledger", name)).hasSize(1);
        return plant.files("ledger", name).get(0);
    }

    private void isNamed(Path file) {
        Ran ran = plant.run("verify");
        assertThat(ran.exitCode()).as(ran.out() + ran.talk()).isEqualTo(4);
        assertThat(ran.out() + ran.talk()).contains(file.getFileName().toString());
        assertThat(ran.talk().lines().filter(line -> line.startsWith("turnstone: ")))
                .hasSize(1);
    }
}
