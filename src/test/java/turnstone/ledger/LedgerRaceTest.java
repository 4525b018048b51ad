package turnstone.ledger;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.nio.file.Path;
import java.time.LocalDate;
import java.util.List;
import java.util.concurrent.Callable;
import java.util.concurrent.CyclicBarrier;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import turnstone.fault.Fault;
import turnstone.store.LocalStore;
import turnstone.store.MemoryStore;
import turnstone.store.Outcome;

class LedgerRaceTest {
    private static final int ROUNDS = 50;

    @TempDir
    Path folder;

    /** Somebody else does something in the instant before the journal entry is published. */
    private static final class InterruptedStore extends MemoryStore {
        private Runnable before = () -> {};
        private int fired;

        @Override
        public Outcome publish(String name, byte[] content) {
            if (name.startsWith("journal/")) {
                Runnable now = before;
                before = () -> {};
                fired++;
                now.run();
            }
            return super.publish(name, content);
        }
    }

    private final InterruptedStore store = new InterruptedStore();
    private final Ledger ledger = Days.ledger(store);

    @Test
    void whoLosesToTheSameDayIsBusyAndLeavesNothing() {
        store.before = () -> ledger.post(Days.draft(Days.MONDAY, "m", 2), Replace.NO);
        assertThatThrownBy(() -> ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.BUSY))
                .hasMessageContaining("2026-03-02");
        assertThat(store.fired).isEqualTo(2);
        assertThat(store.files()).as("description, entry, two parts").hasSize(4);
        assertThat(ledger.load(ledger.day(Days.MONDAY).orElseThrow()).moments())
                .isEqualTo(Days.draft(Days.MONDAY, "m", 2).moments().moments());
    }

    @Test
    void whoLosesToAnotherDayTakesTheNextNumber() {
        store.before = () -> ledger.post(Days.draft(Days.TUESDAY, "t", 2), Replace.NO);
        assertThat(ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO)).isEqualTo(PostOutcome.POSTED);
        assertThat(ledger.days()).extracting(DayEntry::number).containsExactly(2L, 1L);
        assertThat(ledger.verify()).isEmpty();
    }

    @Test
    void whoLosesToAnotherDayWithTheSameShowingIsRefused() {
        store.before = () -> ledger.post(Days.draft(Days.TUESDAY, "m", 2), Replace.NO);
        assertThatThrownBy(() -> ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT))
                .hasMessageContaining("showing m-0");
        assertThat(store.files()).hasSize(4);
    }

    @Test
    void ofTwoWhoPostOneDayAtOnceExactlyOneWins() throws Exception {
        CyclicBarrier start = new CyclicBarrier(2);
        ExecutorService racers = Executors.newFixedThreadPool(2);
        try {
            for (int round = 0; round < ROUNDS; round++) {
                LocalDate day = Days.MONDAY.plusDays(round);
                DayDraft one = Days.draft(day, "r" + round, 1);
                DayDraft two = Days.draft(day, "r" + round, 2);
                List<Future<String>> results = racers.invokeAll(List.of(racer(start, one), racer(start, two)));
                String first = results.get(0).get();
                String second = results.get(1).get();
                // The slower one may come so late that it sees the day posted: refused then, not busy.
                assertThat(List.of(first, second)).as("round " + round).containsOnlyOnce("POSTED");
                assertThat(first.equals("POSTED") ? second : first).isIn("BUSY", "INPUT");
                Ledger ledgerNow = Days.ledger(new LocalStore(folder));
                assertThat(ledgerNow.load(ledgerNow.day(day).orElseThrow()).moments())
                        .isEqualTo(
                                (first.equals("POSTED") ? one : two).moments().moments());
            }
        } finally {
            racers.shutdownNow();
        }
        assertThat(Days.ledger(new LocalStore(folder)).days()).hasSize(ROUNDS);
    }

    private Callable<String> racer(CyclicBarrier start, DayDraft draft) {
        Ledger mine = Days.ledger(new LocalStore(folder));
        return () -> {
            start.await();
            try {
                return mine.post(draft, Replace.NO).name();
            } catch (Fault fault) {
                return fault.kind().name();
            }
        };
    }
}
