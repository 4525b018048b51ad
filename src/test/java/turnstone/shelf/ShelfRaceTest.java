package turnstone.shelf;

import static org.assertj.core.api.Assertions.assertThat;
import static turnstone.shelf.Shelves.READER;
import static turnstone.shelf.Shelves.assertRefused;
import static turnstone.shelf.Shelves.model;

import java.nio.file.Path;
import java.util.List;
import java.util.Optional;
import java.util.concurrent.Callable;
import java.util.concurrent.CyclicBarrier;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import turnstone.fault.Fault;
import turnstone.store.LocalStore;

class ShelfRaceTest {
    private static final int ROUNDS = 50;

    @TempDir
    Path folder;

    private final Shelves.InterruptedStore store = new Shelves.InterruptedStore();
    private final Shelves.Hands clock = new Shelves.Hands();
    private final Shelf shelf = Shelf.open(store, clock, Shelves.READER);

    @Test
    void whoLosesTheRaceIsBusyAndChangesNothing() {
        String a = shelf.put(model(1));
        String b = shelf.put(model(2));
        store.before = () -> shelf.release(b, Optional.empty(), "mine", "winner");
        assertRefused(Fault.Kind.BUSY, () -> shelf.release(a, Optional.empty(), "mine", "loser"), "by winner");
        assertThat(store.fired).isEqualTo(2);
        shelf.release(a, Optional.empty(), "now", "x");
        store.before = () -> shelf.revert("mine", "winner");
        assertRefused(Fault.Kind.BUSY, () -> shelf.revert("mine", "loser"), "by winner");
        assertThat(shelf.history()).hasSize(3);
    }

    @Test
    void aDecisionThatRestsOnAnOlderStateIsBusy() {
        String a = shelf.put(model(1));
        String b = shelf.put(model(2));
        shelf.releaseAfter(0, a, Optional.empty(), "first", "x");
        assertRefused(Fault.Kind.BUSY, () -> shelf.releaseAfter(0, b, Optional.empty(), "late", "y"), "entry 1");
        assertThat(shelf.releaseAfter(1, b, Optional.empty(), "in time", "y").number())
                .isEqualTo(2);
    }

    @Test
    void ofTwoReleasesAtOnceExactlyOneWins() throws Exception {
        Shelf one = Shelf.open(new LocalStore(folder), clock, READER);
        Shelf two = Shelf.open(new LocalStore(folder), clock, READER);
        String a = one.put(model(1));
        String b = one.put(model(2));
        String c = one.put(model(3));
        CyclicBarrier start = new CyclicBarrier(2);
        ExecutorService racers = Executors.newFixedThreadPool(2);
        try {
            for (int round = 0; round < ROUNDS; round++) {
                one.release(c, Optional.empty(), "base", "x");
                long last = one.inService().orElseThrow().number();
                List<Future<String>> results =
                        racers.invokeAll(List.of(racer(one, start, a, last), racer(two, start, b, last)));
                String first = results.get(0).get();
                String second = results.get(1).get();
                assertThat(List.of(first, second)).as("round " + round).containsExactlyInAnyOrder("won", "BUSY");
                assertThat(two.inService().orElseThrow().to()).isEqualTo(first.equals("won") ? a : b);
            }
        } finally {
            racers.shutdownNow();
        }
        assertThat(two.verify()).isEmpty();
    }

    private static Callable<String> racer(Shelf shelf, CyclicBarrier start, String model, long last) {
        return () -> {
            start.await();
            try {
                shelf.releaseAfter(last, model, Optional.empty(), "race", "x");
                return "won";
            } catch (Fault fault) {
                return fault.kind().name();
            }
        };
    }
}
