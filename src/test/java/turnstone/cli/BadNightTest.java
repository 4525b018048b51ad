package turnstone.cli;

import static org.assertj.core.api.Assertions.assertThat;
import static turnstone.cli.SmallPlants.FIRST;
import static turnstone.cli.SmallPlants.LAST;

import java.nio.charset.StandardCharsets;
import java.nio.file.Path;
import java.util.Arrays;
import java.util.List;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;

/** Nights on which something is wrong with the records or the places: what is said, which code, and what is not left behind. */
@ExtendWith(SmallPlants.class)
class BadNightTest {
    @TempDir
    private Path folder;

    private PlantOnDisk plant;

    @BeforeEach
    void copy(PlantOnDisk small) {
        plant = small.copy(folder.resolve("plant"));
    }

    private Path lastRecords() {
        List<Path> files = plant.files("records/" + LAST, ".parquet");
        assertThat(files).hasSizeGreaterThan(1);
        return files.get(1);
    }

    private void nothingOfTheNightIsThere() {
        assertThat(plant.posted()).containsExactly(FIRST + " revision 1");
        assertThat(plant.files("runs", "verdict.json")).isEmpty();
        assertThat(plant.files("ledger/days/" + LAST, "")).isEmpty();
    }

    @Test
    void aFileThatIsNotARecordFileIsNamedAndNothingIsPosted() {
        Path broken = lastRecords();
        PlantOnDisk.write(broken, "this was a file of records once");
        Ran ran = plant.run("nightly");
        assertThat(ran.exitCode()).isIn(3, 4);
        ran.refused(ran.exitCode(), broken.getFileName().toString());
        nothingOfTheNightIsThere();
    }

    @Test
    void aFileThatWasCutOffIsNamedAndNothingIsPosted() {
        Path broken = lastRecords();
        byte[] whole = PlantOnDisk.bytes(broken);
        PlantOnDisk.write(broken, Arrays.copyOf(whole, whole.length / 2));
        Ran ran = plant.run("nightly");
        assertThat(ran.exitCode()).isIn(3, 4);
        ran.refused(ran.exitCode(), broken.getFileName().toString());
        nothingOfTheNightIsThere();
    }

    @Test
    void aFileWithDamageInTheMiddleIsNamedAndNothingIsPosted() {
        Path broken = lastRecords();
        byte[] content = PlantOnDisk.bytes(broken);
        // Behind the magic, far before the footer: the pages of the first columns.
        Arrays.fill(content, 8, content.length / 2, (byte) 0x5a);
        PlantOnDisk.write(broken, content);
        Ran ran = plant.run("nightly");
        assertThat(ran.exitCode()).isIn(3, 4);
        ran.refused(ran.exitCode(), broken.getFileName().toString());
        nothingOfTheNightIsThere();
    }

    @Test
    void recordsOfAnUnknownSorterAreCountedApartAndTheNightGoesOn() {
        Ran ran = plant.run("nightly").succeeds();
        assertThat(ran.out()).contains("1 unknown sorter");
        assertThat(ran.out().lines().reduce("", (before, line) -> line)).startsWith("verdict: ");
        assertThat(plant.posted()).containsExactly(FIRST + " revision 1", LAST + " revision 1");
        assertThat(plant.files("runs/" + LAST + "/0001/quarantine.csv", "quarantine.csv"))
                .singleElement()
                .satisfies(file -> assertThat(PlantOnDisk.text(file).lines())
                        .filteredOn(line -> line.contains("unknown sorter"))
                        .singleElement()
                        .satisfies(line -> assertThat(line).contains("heron", ".parquet")));
    }

    @Test
    void moreQuarantineThanAllowedRefusesTheDayAndTellsWhichRecords() {
        plant.with("limitShare: 0.02", "limitShare: 0.0001");
        plant.run("nightly")
                .refused(3, LAST + " is not posted", "1 unknown sorter", "at most 0.01 %", "quarantine.csv");
        nothingOfTheNightIsThere();
        assertThat(plant.files("runs/" + LAST + "/0001/quarantine.csv", "quarantine.csv"))
                .singleElement()
                .satisfies(file -> assertThat(PlantOnDisk.text(file)).contains("unknown sorter"));
    }

    @Test
    void aDayWithoutRecordsIsRefused() {
        plant.run("nightly", "--day", "2026-04-01").refused(3, "2026-04-01");
        nothingOfTheNightIsThere();
    }

    @Test
    void aLedgerBelowARegularFileIsAStorageFault() {
        PlantOnDisk.write(folder.resolve("plant/in-the-way"), "a file".getBytes(StandardCharsets.UTF_8));
        plant.with("ledger: ledger", "ledger: in-the-way/ledger");
        plant.run("post", "--day", LAST.toString())
                .refused(4, "in-the-way/ledger", "a regular file where a folder should be");
    }

    @Test
    void runsBelowARegularFileAreAStorageFaultBeforeAnythingIsPosted() {
        PlantOnDisk.write(folder.resolve("plant/in-the-way"), "a file".getBytes(StandardCharsets.UTF_8));
        plant.with("runs: runs", "runs: in-the-way/runs");
        plant.run("nightly").refused(4, "in-the-way/runs", "can't be written");
        nothingOfTheNightIsThere();
    }

    @Test
    void aJournalThatCannotBeWrittenLeavesTheDayUnpostedAndTheNextRunPostsIt() {
        // The parts are written before the entry; the entry's folder is what fails.
        PlantOnDisk other = new PlantOnDisk(plant.folder()).with("ledger: ledger", "ledger: other");
        Path journal = plant.folder().resolve("other/journal");
        PlantOnDisk.writeIn(journal, "in the way");
        other.run("post", "--day", LAST.toString()).refused(4, "other/journal");
        PlantOnDisk.remove(journal);
        assertThat(other.posted()).isEmpty();
        other.run("post", "--day", LAST.toString()).succeeds();
        other.run("verify").succeeds();
        plant.with("ledger: other", "ledger: ledger")
                .run("post", "--day", LAST.toString())
                .succeeds();
        String sums = plant.sums(LAST);
        assertThat(plant.with("ledger: ledger", "ledger: other").sums(LAST)).isEqualTo(sums);
    }

    @Test
    void aRunThatFailsAfterPostingLeavesNoVerdictAndTheNextOneGoesOn() {
        List<Path> models = plant.files("shelf", ".json").stream()
                .filter(path -> path.getParent().endsWith("models"))
                .toList();
        assertThat(models).hasSize(1);
        byte[] model = PlantOnDisk.bytes(models.get(0));
        PlantOnDisk.remove(models.get(0));
        plant.run("nightly").refused(4, "shelf");
        assertThat(plant.files("runs", "verdict.json")).isEmpty();
        PlantOnDisk.write(models.get(0), model);
        assertThat(plant.run("nightly").succeeds().out()).contains("verdict: ");
        assertThat(plant.files("runs", "verdict.json")).hasSize(1);
    }
}
