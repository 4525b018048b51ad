package turnstone.store;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static turnstone.store.StoreContract.bytes;

import java.io.IOException;
import java.nio.file.AccessDeniedException;
import java.nio.file.FileSystemException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.Arguments;
import org.junit.jupiter.params.provider.EnumSource;
import org.junit.jupiter.params.provider.MethodSource;
import turnstone.fault.Fault;

class LocalStoreFaultsTest {
    @TempDir
    Path folder;

    @ParameterizedTest
    @EnumSource(names = {"WRITE", "SYNC", "LINK", "CREATE_FOLDER"})
    void aCertainFailureLeavesNothingAndTheNextTryWorks(FaultyDisk.Step step) throws IOException {
        FaultyDisk disk = disk(step, 1);
        Store store = new LocalStore(folder.resolve("ledger"), disk);
        assertThatThrownBy(() -> store.publish("x", bytes("1")))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.STORAGE))
                .hasMessageContaining("it broke")
                .hasMessageContaining("nothing was published");
        assertThat(disk.fired()).isEqualTo(1);
        assertThat(filesUnder(folder)).isZero();
        assertThat(store.publish("x", bytes("1"))).isEqualTo(Outcome.PUBLISHED);
    }

    @Test
    void aLinkThatWasMadeThoughTheAnswerSaysOtherwiseIsPublished() throws IOException {
        FaultyDisk disk = disk(FaultyDisk.Step.LINK_AFTER, 1);
        assertThat(new LocalStore(folder, disk).publish("x", bytes("1"))).isEqualTo(Outcome.PUBLISHED);
        assertThat(disk.fired()).isEqualTo(1);
        assertThat(filesUnder(folder)).isEqualTo(1);
    }

    @Test
    void aLinkThatFailedWhereSomebodyElsesEqualFileIsThereIsLost() {
        new LocalStore(folder).publish("x", bytes("1"));
        FaultyDisk disk = disk(FaultyDisk.Step.LINK, 1);
        assertThat(new LocalStore(folder, disk).publish("x", bytes("1"))).isEqualTo(Outcome.LOST);
        assertThat(disk.fired()).isEqualTo(1);
    }

    @Test
    void aFolderThatSyncsOnTheSecondTryIsFine() {
        FaultyDisk disk = disk(FaultyDisk.Step.SYNC_FOLDER, 1);
        assertThat(new LocalStore(folder, disk).publish("x", bytes("1"))).isEqualTo(Outcome.PUBLISHED);
        assertThat(disk.fired()).isEqualTo(1);
    }

    @Test
    void aFolderThatNeverSyncsIsCalledNeitherPublishedNorFailed() {
        FaultyDisk disk = disk(FaultyDisk.Step.SYNC_FOLDER, 2);
        Store store = new LocalStore(folder, disk);
        assertThatThrownBy(() -> store.publish("x", bytes("1")))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("not certain")
                .hasMessageContaining("it broke");
        assertThat(disk.fired()).isEqualTo(2);
        assertThat(store.read("x")).as("an uncertain file is not cleaned up").isPresent();
    }

    @Test
    void whatCantBeTakenAwayAfterPublishingDoesNoHarm() {
        FaultyDisk disk = disk(FaultyDisk.Step.DELETE, 1);
        Store store = new LocalStore(folder, disk);
        assertThat(store.publish("x", bytes("1"))).isEqualTo(Outcome.PUBLISHED);
        assertThat(disk.fired()).isEqualTo(1);
        assertThat(store.read("x")).isPresent();
    }

    @ParameterizedTest
    @EnumSource(names = {"OPEN", "READ"})
    void aReadThatFailsIsNotNothing(FaultyDisk.Step step) {
        Written written = new LocalStore(folder).write("x", out -> out.write(1));
        FaultyDisk disk = disk(step, 3);
        Store store = new LocalStore(folder, disk);
        assertThatThrownBy(() -> store.read("x")).isInstanceOf(Fault.class).hasMessageContaining("it broke");
        assertThatThrownBy(() -> Content.<byte[]>read(store, written, in -> in.readAllBytes()))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("it broke")
                .hasMessageContaining("/x");
        assertThat(disk.fired()).isGreaterThanOrEqualTo(2);
    }

    @Test
    void readingBackNoticesAFileThatCantBeRead() {
        Written written = new LocalStore(folder).write("x", out -> out.write(1));
        FaultyDisk disk = disk(FaultyDisk.Step.READ, 1);
        assertThatThrownBy(() -> Content.readBack(new LocalStore(folder, disk), written))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("unreadable")
                .hasMessageContaining("it broke");
        assertThat(disk.fired()).isEqualTo(1);
    }

    static Stream<Arguments> reasons() {
        return Stream.of(
                Arguments.of(new AccessDeniedException("x"), "no permission"),
                Arguments.of(new FileSystemException("x", null, "No space left on device"), "the disk is full"),
                Arguments.of(new IOException("No space left on device"), "the disk is full"),
                Arguments.of(new IOException("Disk quota exceeded"), "the disk is full"),
                Arguments.of(new FileSystemException("x", null, "Read-only file system"), "a read-only file system"));
    }

    @ParameterizedTest
    @MethodSource("reasons")
    void eachUsualReasonHasItsOwnWords(IOException failure, String words) {
        FaultyDisk disk = new FaultyDisk(FaultyDisk.Step.WRITE, 1, () -> failure);
        assertThatThrownBy(() -> new LocalStore(folder, disk).publish("x", bytes("1")))
                .isInstanceOf(Fault.class)
                .hasMessageContaining(words)
                .hasMessageContaining(folder.toString());
        assertThat(disk.fired()).isEqualTo(1);
    }

    @Test
    void aFileSystemWithoutHardLinksIsRefused() {
        Store store = new LocalStore(folder, new Disk() {
            @Override
            void link(Path name, Path file) {
                throw new UnsupportedOperationException();
            }
        });
        assertThatThrownBy(() -> store.publish("x", bytes("1")))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("no hard links");
    }

    private static FaultyDisk disk(FaultyDisk.Step step, int times) {
        return new FaultyDisk(step, times, () -> new IOException("it broke"));
    }

    private static long filesUnder(Path folder) throws IOException {
        try (Stream<Path> files = Files.walk(folder)) {
            return files.filter(Files::isRegularFile).count();
        }
    }
}
