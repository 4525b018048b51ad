package turnstone.shelf;

import static org.assertj.core.api.Assertions.assertThat;

import java.net.URISyntaxException;
import java.nio.file.Path;
import java.time.Clock;
import java.time.Instant;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import turnstone.store.LocalStore;

/** The shelf in the resources is of version 1 and has to be readable for ever. */
class GoldenShelfTest {
    private static final String FIRST = "955020d81dc1be2a8f514feb514db71ea03fa5fd217866b317f36939e18f546f";
    private static final String SECOND = "c00dea982f2983db7d22b1a4fe028d0b11726aef720da6b322acbde23720807f";

    @Test
    void aShelfOfVersionOneIsRead() throws URISyntaxException {
        Path entry = Path.of(GoldenShelfTest.class
                .getResource("/golden/shelf-1/journal/00000001.json")
                .toURI());
        Shelf shelf = Shelf.open(
                new LocalStore(entry.getParent().getParent()),
                Clock.systemUTC(),
                (model, place) -> model.path("fingerprint").asText());
        Instant night = Instant.parse("2026-03-02T23:00:00Z");
        VerdictReference verdict = new VerdictReference("night/verdict.json", "a".repeat(64));
        assertThat(shelf.history())
                .containsExactly(
                        new ShelfEntry(
                                1,
                                night,
                                "engineer",
                                Action.RELEASE,
                                Optional.empty(),
                                FIRST,
                                Optional.empty(),
                                "first model, by hand"),
                        new ShelfEntry(
                                2,
                                night,
                                "engineer",
                                Action.RELEASE,
                                Optional.of(FIRST),
                                SECOND,
                                Optional.of(verdict),
                                "better"),
                        new ShelfEntry(
                                3,
                                night,
                                "engineer",
                                Action.REVERT,
                                Optional.of(SECOND),
                                FIRST,
                                Optional.empty(),
                                "worse on PVC"));
        assertThat(shelf.model(SECOND.substring(0, 8))
                        .orElseThrow()
                        .path("seed")
                        .asInt())
                .isEqualTo(2);
        assertThat(shelf.verify()).isEmpty();
    }
}
