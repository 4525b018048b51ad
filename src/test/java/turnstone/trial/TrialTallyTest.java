package turnstone.trial;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.json.Json;

class TrialTallyTest {
    private static final TallyCell RIGHT = new TallyCell("s2", "PET", "PET", Recognition.FAMILIAR);
    private static final TallyCell WRONG = new TallyCell("s10", "PET", "PP, clear", Recognition.UNFAMILIAR);

    @Test
    void mergingIsAddingInAnyOrder() {
        TrialTally a = TrialTally.empty();
        a.add(RIGHT, 5);
        a.add(TallyCell.noSignal("s2", "PET"));
        TrialTally b = TrialTally.empty();
        b.add(WRONG, 3);
        b.add(RIGHT);
        TrialTally ab = TrialTally.empty();
        ab.merge(a);
        ab.merge(b);
        TrialTally ba = TrialTally.empty();
        ba.merge(b);
        ba.merge(a);
        assertThat(ab).isEqualTo(ba);
        assertThat(ab.fingerprint()).isEqualTo(ba.fingerprint());
        assertThat(ab.records()).isEqualTo(10);
        assertThat(ab.cells()).containsEntry(RIGHT, 6L).hasSize(3);
        assertThat(b.records()).isEqualTo(4);
        ab.merge(ab);
        assertThat(ab.records()).isEqualTo(20);
    }

    @Test
    void theFormsAreCanonical() {
        TrialTally tally = TrialTally.empty();
        tally.add(RIGHT, 5);
        tally.add(WRONG, 3);
        tally.add(WRONG, 0);
        tally.add(TallyCell.noSignal("s2", "PET"), 2);
        assertThat(tally.csv()).isEqualTo("""
                        showing,truth,decided,recognition,count
                        s10,PET,"PP, clear",unfamiliar,3
                        s2,PET,PET,familiar,5
                        s2,PET,no signal,no signal,2
                        """);
        TrialTally read = TrialTally.read(Json.read(Json.pretty(tally.json()), "tally"), "tally");
        assertThat(read).isEqualTo(tally);
        assertThat(read.fingerprint()).isEqualTo(tally.fingerprint());
    }

    @Test
    void whatIsNoTallyIsRefused() {
        assertThatThrownBy(() -> TrialTally.read(Json.object(), "t.json"))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("t.json: not a tally");
        assertThatThrownBy(() -> TrialTally.empty().add(RIGHT, -1)).isInstanceOf(IllegalArgumentException.class);
        assertThatThrownBy(() -> new TallyCell("s", "PET", "PET", Recognition.NO_SIGNAL))
                .isInstanceOf(IllegalArgumentException.class);
        assertThatThrownBy(() -> new TallyCell("s", "PET", "no signal", Recognition.FAMILIAR))
                .isInstanceOf(IllegalArgumentException.class);
    }
}
