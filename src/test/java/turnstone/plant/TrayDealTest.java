package turnstone.plant;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.Map;
import org.junit.jupiter.api.Test;

class TrayDealTest {
    private static final TrayDeal EIGHT = new TrayDeal(8, Map.of("PP", Map.of("crate 12", 6)));

    @Test
    void theNumberAtTheEndOfTheNameDeals() {
        assertThat(EIGHT.group("PP", "pp-3")).isEqualTo(3);
        assertThat(EIGHT.group("PP", "pp-8")).isZero();
        assertThat(EIGHT.group("PP", "pp-17")).isEqualTo(1);
        assertThat(EIGHT.group("PP", "007")).isEqualTo(7);
        assertThat(new TrayDeal(3, Map.of()).group("PP", "pp-17")).isEqualTo(2);
    }

    @Test
    void aNumberTooLongForAMachineWordDealsToo() {
        // 10^30 + 5: 10^30 is a multiple of 8.
        assertThat(EIGHT.group("PP", "t1000000000000000000000000000005")).isEqualTo(5);
    }

    /** Digests by `printf '%s' 'PS/blue box' | sha256sum` (GNU coreutils 9.1). */
    @Test
    void aNameWithoutANumberIsDealtByItsDigest() {
        assertThat(EIGHT.group("PS", "blue box")).isEqualTo((int) (0x821de029L % 8));
        assertThat(new TrayDeal(7, Map.of()).group("PS", "blue box")).isEqualTo((int) (0x821de029L % 7));
        assertThat(new TrayDeal(7, Map.of()).group("PVC", "blue box")).isEqualTo((int) (0x47342973L % 7));
    }

    @Test
    void aListedTrayGoesWhereTheFileSaysWithinItsMaterialOnly() {
        assertThat(EIGHT.group("PP", "crate 12")).isEqualTo(6);
        assertThat(EIGHT.group("PS", "crate 12")).isEqualTo(4);
    }
}
