package turnstone.night;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.attribute.PosixFilePermissions;
import java.time.Clock;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.plant.Plant;
import turnstone.shelf.PublicKeyFile;
import turnstone.shelf.Release;
import turnstone.shelf.Shelf;
import turnstone.shelf.ShelfEntry;
import turnstone.shelf.SigningKey;
import turnstone.shelf.SigningRule;
import turnstone.shelf.VerdictReference;
import turnstone.store.MemoryStore;
import turnstone.trial.Decision;
import turnstone.trial.Verdict;

/** What a night puts in service by itself. */
class NightReleaseTest {
    private static final String A = "a".repeat(64);
    private static final String B = "b".repeat(64);
    private static final VerdictReference REFERENCE = new VerdictReference("verdict.json", "c".repeat(64));

    @TempDir
    Path folder;

    private final List<String> remarks = new ArrayList<>();
    private Shelf shelf;

    private final Progress progress = new Progress() {
        @Override
        public void phase(String name, long records) {}

        @Override
        public void records(long done) {}

        @Override
        public void done(String summary) {}

        @Override
        public void remark(String line) {
            remarks.add(line);
        }
    };

    @BeforeEach
    void releaseTheFirst() {
        shelf = Shelf.open(
                new MemoryStore(),
                Clock.systemUTC(),
                (model, place) -> model.path("fingerprint").asText());
        shelf.put(Json.object().put("fingerprint", A));
        shelf.put(Json.object().put("fingerprint", B));
        shelf.release(A, Optional.empty(), "first", "x");
        SigningKey.make(folder.resolve("shore"));
    }

    private Plant plant(String release, String signing) throws IOException {
        Path example = Path.of(System.getProperty("turnstone.basedir", "."), "conf", "plant.yaml");
        String text = Files.readString(example)
                .replace("release: by hand ", "release: " + release + " ")
                .replace("  unsigned: allowed ", signing + " ");
        Path file = folder.resolve("plant.yaml");
        Files.writeString(file, text);
        return Plant.read(file);
    }

    private Plant automatic() throws IOException {
        return plant("automatic", "  privateKey: shore");
    }

    private Optional<ShelfEntry> night(Plant plant, Decision decision) {
        return NightRelease.prepare(plant, shelf, "night").make(verdict(decision), REFERENCE, progress);
    }

    private static Verdict verdict(Decision decision) {
        return new Verdict(decision, "better by 1 point", List.of(), List.of(), 4, B, Optional.of(A));
    }

    @Test
    void aReleaseIsMadeAndSignedWhereThePlantFileLetsTheNight() throws IOException {
        assertThat(night(plant("by hand", "  privateKey: shore"), Decision.RELEASE))
                .isEmpty();
        assertThat(night(automatic(), Decision.HOLD)).isEmpty();
        ShelfEntry entry = night(automatic(), Decision.RELEASE).orElseThrow();
        assertThat(entry.to()).isEqualTo(B);
        assertThat(entry.by()).isEqualTo("night");
        assertThat(entry.reason()).isEqualTo("better by 1 point");
        assertThat(entry.verdict()).contains(REFERENCE);
        assertThat(entry.signature().orElseThrow().holdsFor(B)).isTrue();
        assertThat(remarks).isEmpty();
    }

    @Test
    void neitherASplitNorAWithdrawalIsOverruled() throws IOException {
        shelf.release(Release.of(B, "try", "x").withSorters(Set.of("avocet")));
        assertThat(night(automatic(), Decision.RELEASE)).isEmpty();
        assertThat(remarks).singleElement().asString().contains("end the split by hand");
        shelf.withdraw(B, "mislabelled tray", "engineer");
        assertThat(night(automatic(), Decision.RELEASE)).isEmpty();
        assertThat(remarks).hasSize(2).last().asString().contains("mislabelled tray");
        assertThat(shelf.running().orElseThrow().fleet()).isEqualTo(A);
    }

    @Test
    void aChangeMadeDuringTheNightStands() throws IOException {
        NightRelease prepared = NightRelease.prepare(automatic(), shelf, "night");
        shelf.release(B, Optional.empty(), "meanwhile", "engineer");
        shelf.revert("and back", "engineer");
        assertThatThrownBy(() -> prepared.make(verdict(Decision.RELEASE), REFERENCE, progress))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.BUSY));
        assertThat(shelf.history()).hasSize(3);
    }

    @Test
    void aKeyThatCannotSignIsRefusedBeforeTheNightsWork() throws IOException {
        SigningKey.make(folder.resolve("other"));
        PublicKeyFile expected = PublicKeyFile.read(folder.resolve("other.public"));
        Shelf strict = shelf.withRule(new SigningRule(SigningRule.Unsigned.REFUSED, Optional.of(expected)));
        Plant plant = automatic();
        assertThatThrownBy(() -> NightRelease.prepare(plant, strict, "night"))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("is not the public key's");
        Files.setPosixFilePermissions(folder.resolve("shore"), PosixFilePermissions.fromString("rw-r--r--"));
        assertThatThrownBy(() -> NightRelease.prepare(plant, shelf, "night"))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("rw-r--r--");
    }
}
