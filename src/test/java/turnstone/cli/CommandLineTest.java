package turnstone.cli;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.ByteArrayOutputStream;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Path;
import java.util.List;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.junit.jupiter.params.provider.ValueSource;

/** What the command line takes and refuses, before any engine starts. */
class CommandLineTest {
    @TempDir
    private Path folder;

    static Stream<String> commands() {
        PrintStream nowhere = new PrintStream(new ByteArrayOutputStream(), true, StandardCharsets.UTF_8);
        return Commands.line(new Console(nowhere, new Talk(nowhere, Talk.Screen.PLAIN)))
                .getSubcommands()
                .keySet()
                .stream();
    }

    @Test
    void hasTheCommandsThatArePromised() {
        assertThat(commands())
                .contains(
                        "sample", "scale", "post", "refit", "trial", "nightly", "fit", "project", "release", "revert",
                        "show", "verify");
    }

    @ParameterizedTest
    @MethodSource("commands")
    void everyCommandHasHelpWithAnExampleOfItself(String command) {
        Ran ran = Ran.command(command, "--help");
        assertThat(ran.exitCode()).isZero();
        assertThat(ran.talk()).isEmpty();
        assertThat(ran.out()).contains("Example", "turnstone " + command, "--json", "--trace");
        assertThat(ran.out().lines())
                .allSatisfy(line -> assertThat(line.length()).isLessThanOrEqualTo(100));
    }

    @Test
    void theProgramsHelpNamesEveryCommandAndEveryExitCode() {
        Ran ran = Ran.command("--help");
        assertThat(ran.exitCode()).isZero();
        assertThat(ran.out()).contains(commands().toArray(String[]::new));
        assertThat(ran.out()).contains("0 done", "2 command line", "3 input", "4 storage", "5 ", "70 ", "130 ");
    }

    @Test
    void aMisspeltCommandIsAnsweredWithTheNearest() {
        Ran ran = Ran.command("nigthly", "--sample");
        ran.refused(2, "nigthly");
        assertThat(ran.talk()).contains("did you mean", "nightly");
    }

    @Test
    void aMisspeltOptionIsAnsweredWithTheNearest() {
        Ran ran = Ran.command("post", "--plant", "plant.yaml", "--day", "2026-03-02", "--replase");
        ran.refused(2, "--replase");
        assertThat(ran.talk()).contains("did you mean", "--replace");
    }

    @Test
    void noCommandIsRefusedWithTheWayToTheHelp() {
        Ran ran = Ran.command();
        ran.refused(2, "no command");
        assertThat(ran.talk()).contains("--help");
    }

    @ParameterizedTest
    @ValueSource(strings = {"yesterday", "2026-3-2", "2026-02-30", "20260302"})
    void aDayInAnotherFormIsRefused(String day) {
        Ran.command("post", "--plant", "plant.yaml", "--day", day).refused(2, day, "2026-03-01");
    }

    @Test
    void aMissingOptionIsNamed() {
        Ran.command("post", "--plant", "plant.yaml").refused(2, "--day");
        Ran.command("verify").refused(2, "--plant");
        Ran.command("release", "0123abcd", "--plant", "plant.yaml").refused(2, "--reason");
    }

    @Test
    void choicesThatExcludeEachOtherAreRefused() {
        Ran.command("nightly").refused(2, "--plant", "--sample");
        Ran.command("nightly", "--plant", "plant.yaml", "--sample").refused(2, "--plant", "--sample");
        Ran.command("scale").refused(2, "--table", "--plant");
        Ran.command("project", "--model", "m", "--out", "o").refused(2, "--table", "--day");
    }

    @Test
    void aPlantFileThatIsNotThereIsNamed() {
        Path file = folder.resolve("none.yaml");
        Ran ran = Ran.command("verify", "--plant", file.toString());
        assertThat(ran.exitCode()).isIn(2, 4);
        ran.refused(ran.exitCode(), file.toString());
    }

    @Test
    void aWrongKeyOfThePlantFileIsNamedWithItsLineAndTheNearestKey() {
        Path example = Path.of(System.getProperty("turnstone.basedir"), "conf", "plant.yaml");
        List<String> lines = PlantOnDisk.text(example).lines().toList();
        int number = lines.indexOf("ledger: ledger") + 1;
        assertThat(number).isPositive();
        Path file = folder.resolve("plant.yaml");
        PlantOnDisk.write(file, PlantOnDisk.text(example).replace("\nledger: ledger\n", "\nledgre: ledger\n"));
        Ran.command("verify", "--plant", file.toString())
                .refused(2, file.toString(), String.valueOf(number), "ledgre", "ledger");
    }

    @Test
    void aModelThatIsNotThereIsRefused() {
        Ran.command("show", folder.resolve("nothing").toString()).refused(3, "no such model");
        Ran.command("show", "0123456789abcdef").refused(2, "--plant");
        Ran.command("show", folder.toString()).refused(3, "model.json");
    }
}
