package turnstone.store;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.BufferedReader;
import java.io.IOException;
import java.io.Writer;
import java.net.URI;
import java.nio.file.Path;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.Timeout;
import org.junit.jupiter.api.io.TempDir;

class RacingProcessesTest {
    private static final int ROUNDS = 50;

    @TempDir
    Path folder;

    @Test
    @Timeout(120)
    void ofTwoProcessesExactlyOneWinsEachRound() throws IOException {
        Process one = start("one");
        Process two = start("two");
        try (Writer toOne = one.outputWriter();
                Writer toTwo = two.outputWriter();
                BufferedReader fromOne = one.inputReader();
                BufferedReader fromTwo = two.inputReader()) {
            Store store = new LocalStore(folder);
            for (int round = 0; round < ROUNDS; round++) {
                String name = "race/" + round;
                toOne.write(name + "\n");
                toTwo.write(name + "\n");
                toOne.flush();
                toTwo.flush();
                String ofOne = fromOne.readLine();
                String ofTwo = fromTwo.readLine();
                assertThat(List.of(String.valueOf(ofOne), String.valueOf(ofTwo)))
                        .as("round " + round)
                        .containsExactlyInAnyOrder("PUBLISHED", "LOST");
                assertThat(store.read(name).orElseThrow())
                        .isEqualTo(StoreContract.bytes("PUBLISHED".equals(ofOne) ? "one" : "two"));
            }
        } finally {
            one.destroyForcibly();
            two.destroyForcibly();
        }
    }

    private Process start(String name) throws IOException {
        String classes = String.join(
                System.getProperty("path.separator"),
                folderOf(RacingProcess.class),
                folderOf(LocalStore.class),
                System.getProperty("java.class.path"));
        return new ProcessBuilder(
                        Path.of(System.getProperty("java.home"), "bin", "java").toString(),
                        "-Xmx64m",
                        "-XX:TieredStopAtLevel=1",
                        "-cp",
                        classes,
                        RacingProcess.class.getName(),
                        folder.toString(),
                        name)
                .redirectErrorStream(true)
                .start();
    }

    private static String folderOf(Class<?> type) {
        return Path.of(URI.create(
                        type.getProtectionDomain().getCodeSource().getLocation().toString()))
                .toString();
    }
}
