package turnstone.cli;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.measure.TailSpec;

class TailTextTest {
    @Test
    void stepsAreReadInTheirOrder() {
        assertThat(TailText.read("savitzky-golay:9/2/1, bins:2,mask:1-4"))
                .isEqualTo(TailSpec.of(
                        new TailSpec.SavitzkyGolay(9, 2, 1), new TailSpec.Bins(2), new TailSpec.Mask(0, 3)));
        assertThat(TailText.read("none")).isEqualTo(TailSpec.none());
    }

    @Test
    void anythingElseIsRefusedByName() {
        for (String text : new String[] {"", "bins", "bins:x", "smooth:3", "none,bins:2", "bins:2;mask:1-2"}) {
            assertThatThrownBy(() -> TailText.read(text))
                    .isInstanceOf(Fault.class)
                    .hasMessageContaining("--tail")
                    .hasMessageContaining("savitzky-golay:WINDOW/ORDER/DERIVATIVE");
        }
    }
}
