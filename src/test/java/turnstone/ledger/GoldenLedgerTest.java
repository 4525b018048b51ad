package turnstone.ledger;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.math.BigInteger;
import java.net.URISyntaxException;
import java.nio.file.Path;
import java.time.Instant;
import java.time.LocalDate;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;
import org.junit.jupiter.api.Test;
import turnstone.moments.Moments;
import turnstone.store.LocalStore;

/** The ledger in the resources is of version 1 and has to be readable for ever: records (1, -2) and (3, 5), sums by hand. */
class GoldenLedgerTest {
    @Test
    void aLedgerOfVersionOneIsRead() throws IOException, URISyntaxException {
        Path folder = Path.of(GoldenLedgerTest.class
                .getResource("/golden/ledger-1/ledger.json")
                .toURI());
        Ledger ledger = Ledger.existing(new LocalStore(folder.getParent())).orElseThrow();
        assertThat(ledger.verify()).isEmpty();
        assertThat(ledger.countScale().step(1)).isEqualTo(0.001);
        assertThat(ledger.countScale().offset(0)).isEqualTo(0.5);
        assertThat(ledger.head().channels()).isEqualTo(2);
        DayEntry day = ledger.day(LocalDate.of(2026, 3, 2)).orElseThrow();
        assertThat(day.number()).isEqualTo(1);
        assertThat(day.revision()).isEqualTo(1);
        assertThat(day.inputs())
                .containsExactly(new InputFile(
                        "records/2026-03-02.parquet",
                        1234,
                        Instant.parse("2026-03-02T22:00:00Z"),
                        Optional.of("c".repeat(64))));
        assertThat(day.counts()).isEqualTo(new DayCounts(10, 2, 7, new TreeMap<>(Map.of("saturated", 1L))));
        assertThat(day.showings()).containsExactly("s1");
        assertThat(day.without()).containsExactly("s9");
        DayMoments loaded = ledger.load(day);
        Moments moments = loaded.moments().get(new LedgerKey("avocet@2026-01-01", "PP", 0));
        assertThat(moments.product(1, 0)).isEqualTo(BigInteger.valueOf(13));
        assertThat(loaded.showings().get("s1").sums()).isEqualTo(List.of(BigInteger.valueOf(4), BigInteger.valueOf(3)));
        assertThat(day.momentsFingerprint()).isEqualTo(DayFingerprints.moments(loaded));
        assertThat(day.fingerprint())
                .isEqualTo(DayFingerprints.day(
                        day.day(),
                        loaded,
                        day.counts(),
                        ledger.countScale().fingerprint(),
                        ledger.head().fingerprint()));
    }
}
