package turnstone.shelf;

import static org.assertj.core.api.Assertions.assertThat;
import static turnstone.shelf.Shelves.READER;
import static turnstone.shelf.Shelves.model;

import java.io.IOException;
import java.net.URI;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.concurrent.TimeUnit;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.Timeout;
import org.junit.jupiter.api.io.TempDir;
import turnstone.store.HaltingDisk;
import turnstone.store.LocalStore;

/** A process killed at each step of a release on a local disk. */
class KilledReleaseTest {
    private static final int MOST_STEPS = 60;

    @TempDir
    Path folder;

    @Test
    @Timeout(120)
    void afterAKillAtAnyStepTheOldModelOrTheNewIsInService() throws Exception {
        List<String> left = new ArrayList<>();
        int code = HaltingDisk.HALTED;
        // Steps before the entry is written only read: every third of them will do, all from there on.
        for (int step = 1; code == HaltingDisk.HALTED && step < MOST_STEPS; step += left.size() < 2 ? 3 : 1) {
            Path place = folder.resolve("step-" + step);
            Shelf shelf = Shelf.open(new LocalStore(place), new Shelves.Hands(), READER);
            String a = shelf.put(model(1));
            String b = shelf.put(model(2));
            shelf.release(a, Optional.empty(), "first", "x");
            code = killed(place, step, b);
            Shelf after = Shelf.open(new LocalStore(place), new Shelves.Hands(), READER);
            String found = after.running().orElseThrow().fleet();
            assertThat(found).as("killed at step %s", step).isIn(a, b);
            assertThat(after.verify()).as("killed at step %s", step).isEmpty();
            left.add(found.equals(a) ? "old" : "new");
            if (found.equals(a)) {
                after.release(b, Optional.empty(), "again", "x");
            }
        }
        assertThat(code).as("the last one got through").isZero();
        // Old up to the step that links the entry's name, new from there on: never anything else, never back again.
        assertThat(String.join(" ", left)).matches("old( old)*( new)+");
        assertThat(left.size()).isGreaterThan(6);
    }

    private static int killed(Path place, int step, String model) throws IOException, InterruptedException {
        String classes = String.join(
                System.getProperty("path.separator"),
                folderOf(KilledRelease.class),
                folderOf(Shelf.class),
                System.getProperty("java.class.path"));
        Process process = new ProcessBuilder(
                        Path.of(System.getProperty("java.home"), "bin", "java").toString(),
                        "-Xmx64m",
                        "-XX:TieredStopAtLevel=1",
                        "-XX:+UseSerialGC",
                        "-cp",
                        classes,
                        KilledRelease.class.getName(),
                        place.toString(),
                        String.valueOf(step),
                        model)
                .redirectErrorStream(true)
                .redirectOutput(ProcessBuilder.Redirect.DISCARD)
                .start();
        try {
            assertThat(process.waitFor(30, TimeUnit.SECONDS)).isTrue();
            return process.exitValue();
        } finally {
            process.destroyForcibly();
        }
    }

    private static String folderOf(Class<?> type) {
        return Path.of(URI.create(
                        type.getProtectionDomain().getCodeSource().getLocation().toString()))
                .toString();
    }
}
