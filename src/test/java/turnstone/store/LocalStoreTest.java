package turnstone.store;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import turnstone.fault.Fault;

class LocalStoreTest extends StoreContract {
    @TempDir
    Path folder;

    @Override
    Store store() {
        return new LocalStore(folder.resolve("not/yet/made"));
    }

    @Test
    void nothingStaysAsideAfterWinningOrLosing() throws IOException {
        store().publish("a/x", bytes("first"));
        store().publish("a/x", bytes("second"));
        assertThat(names(folder.resolve("not/yet/made/a"))).containsExactly("x");
    }

    @Test
    void aWriterThatFailsLeavesNothing() throws IOException {
        assertThatThrownBy(() -> store().write("a/x", out -> {
                    out.write(1);
                    throw new IOException("the source broke");
                }))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("the source broke")
                .hasMessageContaining("nothing was published");
        assertThat(names(folder.resolve("not/yet/made/a"))).isEmpty();
    }

    @Test
    void aFileWhereAFolderShouldBeIsSaidInOneLine() throws IOException {
        Files.writeString(folder.resolve("file"), "in the way");
        Store blocked = new LocalStore(folder.resolve("file/ledger"));
        assertThatThrownBy(() -> blocked.publish("x", bytes("1")))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.STORAGE))
                .hasMessageContaining("a regular file where a folder should be")
                .hasMessageContaining("nothing was published");
        assertThatThrownBy(() -> blocked.read("x"))
                .as("not: nothing there")
                .isInstanceOf(Fault.class)
                .hasMessageContaining("a regular file where a folder should be");
        assertThatThrownBy(() -> blocked.size("x")).isInstanceOf(Fault.class);
    }

    @Test
    void aFolderWhereAFileShouldBeIsNotNothing() {
        store().publish("a/x", bytes("1"));
        assertThatThrownBy(() -> store().read("a"))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("a folder where a file should be");
        assertThat(store().publish("a", bytes("1"))).isEqualTo(Outcome.LOST);
    }

    @Test
    void aDanglingLinkIsNotNothing() throws IOException {
        Files.createSymbolicLink(folder.resolve("x"), folder.resolve("gone"));
        Store store = new LocalStore(folder);
        assertThatThrownBy(() -> store.read("x")).isInstanceOf(Fault.class).hasMessageContaining("target is missing");
        assertThatThrownBy(() -> store.size("x")).isInstanceOf(Fault.class).hasMessageContaining("target is missing");
    }

    private static List<String> names(Path folder) throws IOException {
        try (Stream<Path> files = Files.list(folder)) {
            return files.map(file -> file.getFileName().toString()).sorted().toList();
        }
    }
}
