package turnstone.ledger;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import turnstone.fault.Fault;
import turnstone.store.ContentWriter;
import turnstone.store.MemoryStore;
import turnstone.store.Outcome;
import turnstone.store.Written;

class LedgerCrashTest {
    /** A store that dies at a file whose name contains a text, or writes it wrong. */
    private static final class DyingStore extends MemoryStore {
        private String at = "nothing";
        private boolean damages;
        private boolean publishesFirst;
        private int fired;

        @Override
        public Outcome publish(String name, byte[] content) {
            if (!damages && name.contains(at)) {
                fired++;
                if (publishesFirst) {
                    super.publish(name, content);
                }
                throw Fault.storage("the machine stopped").at(name);
            }
            return super.publish(name, content);
        }

        @Override
        public Written write(String name, ContentWriter content) {
            Written written = super.write(name, content);
            if (damages && name.contains(at)) {
                fired++;
                files().get(name)[20] ^= 1;
            }
            return written;
        }
    }

    private final DyingStore store = new DyingStore();
    private final Ledger ledger = Days.ledger(store);

    @ParameterizedTest
    @ValueSource(strings = {"/moments", "/showings", "journal/00000002"})
    void aCrashBeforeTheEntryLeavesTheOldState(String at) {
        ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO);
        store.at = at;
        assertThatThrownBy(() -> ledger.post(Days.draft(Days.MONDAY, "m", 2), Replace.YES))
                .hasMessageContaining("the machine stopped");
        assertThat(store.fired).isEqualTo(1);
        store.at = "nothing";
        Ledger after = Days.ledger(store);
        assertThat(after.days()).extracting(DayEntry::revision).containsExactly(1);
        assertThat(after.verify()).isEmpty();
        assertThat(after.load(after.day(Days.MONDAY).orElseThrow()).moments())
                .isEqualTo(Days.draft(Days.MONDAY, "m", 1).moments().moments());
        assertThat(after.post(Days.draft(Days.MONDAY, "m", 2), Replace.YES)).isEqualTo(PostOutcome.POSTED);
        assertThat(after.verify()).isEmpty();
    }

    @Test
    void anUncertainEntryKeepsItsPartsAndIsFoundByTheNextRun() {
        store.at = "journal/00000001";
        store.publishesFirst = true;
        assertThatThrownBy(() -> ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO))
                .isInstanceOf(Fault.class);
        assertThat(store.fired).isEqualTo(1);
        store.at = "nothing";
        assertThat(ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO)).isEqualTo(PostOutcome.SAME_RECORDS);
        assertThat(ledger.verify()).isEmpty();
        assertThat(ledger.load(ledger.day(Days.MONDAY).orElseThrow()).moments())
                .isEqualTo(Days.draft(Days.MONDAY, "m", 1).moments().moments());
    }

    @ParameterizedTest
    @ValueSource(strings = {"/moments", "/showings"})
    void aPartThatIsNotReadBackAsWrittenIsNotPosted(String part) {
        store.at = part;
        store.damages = true;
        assertThatThrownBy(() -> ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO))
                .isInstanceOf(Fault.class)
                .hasMessageContaining(part)
                .hasMessageContaining("not what was written");
        assertThat(store.fired).isEqualTo(1);
        assertThat(ledger.days()).isEmpty();
        assertThat(store.files()).as("a certain failure is cleaned up").containsOnlyKeys("ledger.json");
    }
}
