package turnstone.shelf;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static turnstone.shelf.Shelves.NIGHT;
import static turnstone.shelf.Shelves.READER;
import static turnstone.shelf.Shelves.assertRefused;
import static turnstone.shelf.Shelves.model;

import com.fasterxml.jackson.databind.JsonNode;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.store.Problem;

class ShelfTest {

    private final Shelves.InterruptedStore store = new Shelves.InterruptedStore();
    private final Shelves.Hands clock = new Shelves.Hands();
    private final Shelf shelf = Shelf.open(store, clock, READER);

    @Test
    void anEmptyShelfHasNothingInService() {
        assertThat(shelf.inService()).isEmpty();
        assertThat(shelf.history()).isEmpty();
        assertThat(shelf.asOf(NIGHT)).isEmpty();
        assertThat(shelf.verify()).isEmpty();
        assertThat(store.files()).isEmpty();
    }

    @Test
    void aModelIsPutOnceAndFoundByItsFirstDigits() {
        JsonNode model = model(1);
        String fingerprint = shelf.put(model);
        assertThat(shelf.put(model)).isEqualTo(fingerprint);
        assertThat(store.files()).hasSize(2);
        assertThat(shelf.model(fingerprint.substring(0, 8))).contains(model);
        assertThat(shelf.model(fingerprint)).contains(model);
        assertThat(shelf.model("0".repeat(8))).isEmpty();
        for (String bad : List.of("", fingerprint.substring(0, 7), "ABCDEF12", "../../etc", fingerprint + "0")) {
            assertThatThrownBy(() -> shelf.model(bad))
                    .isInstanceOfSatisfying(
                            Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.USAGE));
        }
    }

    @Test
    void digitsThatTwoModelsShareAreRefused() {
        String shared = "abcdef12";
        ModelReader reader = (model, place) -> model.path("fingerprint").asText();
        Shelf lax = Shelf.open(store, clock, reader);
        lax.put(Json.object().put("fingerprint", shared + "0".repeat(56)));
        lax.put(Json.object().put("fingerprint", shared + "1".repeat(56)));
        assertThatThrownBy(() -> lax.model(shared))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.USAGE))
                .hasMessageContaining("more than one");
        assertThat(lax.model(shared + "0")).isPresent();
    }

    @Test
    void aModelThatIsNotWhatItSaysIsNotPut() {
        JsonNode forged = model(1).put("seed", 2);
        assertThatThrownBy(() -> shelf.put(forged)).isInstanceOf(Fault.class);
        assertThat(store.files()).isEmpty();
    }

    @Test
    void aReleaseIsAnEntryWithItsLineage() {
        String a = shelf.put(model(1));
        String b = shelf.put(model(2));
        VerdictReference verdict = new VerdictReference("night/verdict.json", "a".repeat(64));
        shelf.release(a, Optional.empty(), "first model, by hand", "engineer");
        clock.now = NIGHT.plusSeconds(60);
        shelf.release(b.substring(0, 10), Optional.of(verdict), "better by 1.2 points", "nightly");
        assertThat(shelf.history())
                .containsExactly(
                        new ShelfEntry(
                                1,
                                NIGHT,
                                "engineer",
                                Action.RELEASE,
                                Optional.empty(),
                                a,
                                Optional.empty(),
                                "first model, by hand"),
                        new ShelfEntry(
                                2,
                                clock.now,
                                "nightly",
                                Action.RELEASE,
                                Optional.of(a),
                                b,
                                Optional.of(verdict),
                                "better by 1.2 points"));
        assertThat(shelf.inService().orElseThrow().to()).isEqualTo(b);
    }

    @Test
    void whatWasInServiceThenIsTold() {
        String a = shelf.put(model(1));
        String b = shelf.put(model(2));
        shelf.release(a, Optional.empty(), "first", "x");
        clock.now = NIGHT.plusSeconds(60);
        shelf.release(b, Optional.empty(), "second", "x");
        assertThat(shelf.asOf(NIGHT.minusMillis(1))).isEmpty();
        assertThat(shelf.asOf(NIGHT).orElseThrow().to()).isEqualTo(a);
        assertThat(shelf.asOf(NIGHT.plusSeconds(59)).orElseThrow().to()).isEqualTo(a);
        assertThat(shelf.asOf(NIGHT.plusSeconds(60)).orElseThrow().to()).isEqualTo(b);
        clock.now = NIGHT.minusSeconds(3600);
        assertThat(shelf.revert("a clock that is behind", "x").at()).isEqualTo(NIGHT.plusSeconds(60));
        assertThat(shelf.asOf(NIGHT.plusSeconds(60)).orElseThrow().to()).isEqualTo(a);
    }

    @Test
    void revertsGoBackStepByStepAndNoFurther() {
        assertThatThrownBy(() -> shelf.revert("why not", "x"))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT))
                .hasMessageContaining("nothing in service");
        List<String> models = new ArrayList<>();
        for (int i = 0; i < 4; i++) {
            models.add(shelf.put(model(i)));
        }
        for (String model : models.subList(0, 3)) {
            shelf.release(model, Optional.empty(), "on", "x");
        }
        ShelfEntry back = shelf.revert("worse", "x");
        assertThat(back.from()).contains(models.get(2));
        assertThat(back.to()).isEqualTo(models.get(1));
        assertThat(shelf.revert("worse too", "x").to()).isEqualTo(models.get(0));
        assertThatThrownBy(() -> shelf.revert("again", "x"))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT))
                .hasMessageContaining("no earlier model");
        shelf.release(models.get(3), Optional.empty(), "on", "x");
        assertThat(shelf.revert("no good", "x").to()).isEqualTo(models.get(0));
        assertThat(shelf.history()).hasSize(7);
    }

    @Test
    void changesThatMakeNoSenseAreRefused() {
        String a = shelf.put(model(1));
        shelf.release(a, Optional.empty(), "first", "x");
        assertRefused(Fault.Kind.INPUT, () -> shelf.release(a, Optional.empty(), "again", "x"), "in service already");
        assertRefused(Fault.Kind.INPUT, () -> shelf.release("12345678", Optional.empty(), "r", "x"), "no such model");
        String b = shelf.put(model(2));
        assertRefused(Fault.Kind.USAGE, () -> shelf.release(b, Optional.empty(), " ", "x"), "reason");
        assertRefused(Fault.Kind.USAGE, () -> shelf.release(b, Optional.empty(), "r", ""), "by");
        assertThat(shelf.history()).hasSize(1);
    }

    @Test
    void verifyNamesEachFileThatIsNotWhatWasWritten() {
        String a = shelf.put(model(1));
        String b = shelf.put(model(2));
        shelf.release(a, Optional.empty(), "first", "x");
        shelf.release(b, Optional.empty(), "second", "x");
        assertThat(shelf.verify()).isEmpty();
        for (String name : List.copyOf(store.files().keySet())) {
            byte[] kept = store.files().get(name);
            byte[] altered = kept.clone();
            altered[kept.length / 2] ^= 1;
            store.files().put(name, altered);
            assertOnly(name, Problem.Trouble.ALTERED);
            store.files().put(name, (new String(kept, StandardCharsets.UTF_8) + " ").getBytes(StandardCharsets.UTF_8));
            assertOnly(name, Problem.Trouble.ALTERED);
            store.files().remove(name);
            if (!name.contains("00000002")) {
                assertOnly(name, Problem.Trouble.MISSING);
            }
            store.files().put(name, kept);
        }
    }

    @Test
    void aModelThatIsNoLongerWhatItWasIsNotPutInService() {
        String a = shelf.put(model(1));
        store.files().put("models/" + a + ".json", Json.pretty(model(2)));
        assertRefused(Fault.Kind.STORAGE, () -> shelf.release(a, Optional.empty(), "r", "x"), "altered");
        assertRefused(Fault.Kind.STORAGE, () -> shelf.model(a), "altered");
        store.files().remove("models/" + a + ".json");
        assertRefused(Fault.Kind.STORAGE, () -> shelf.model(a), "missing");
        assertThat(shelf.history()).isEmpty();
    }

    @Test
    void aCrashBetweenModelAndCatalogueIsMendedByPuttingItAgain() {
        JsonNode model = model(1);
        String fingerprint = shelf.put(model);
        store.files().remove("catalogue/00000001.json");
        assertThat(shelf.model(fingerprint)).isEmpty();
        shelf.put(model);
        assertThat(shelf.model(fingerprint)).contains(model);
    }

    private void assertOnly(String name, Problem.Trouble trouble) {
        assertThat(shelf.verify()).as(name).singleElement().satisfies(problem -> {
            assertThat(problem.file()).isEqualTo(name);
            assertThat(problem.trouble()).isEqualTo(trouble);
        });
    }
}
