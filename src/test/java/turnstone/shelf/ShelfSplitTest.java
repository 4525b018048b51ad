package turnstone.shelf;

import static org.assertj.core.api.Assertions.assertThat;
import static turnstone.shelf.Shelves.NIGHT;
import static turnstone.shelf.Shelves.READER;
import static turnstone.shelf.Shelves.assertRefused;
import static turnstone.shelf.Shelves.model;

import java.util.Map;
import java.util.Set;
import java.util.TreeMap;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;

/** A release to some sorters first. */
class ShelfSplitTest {
    private final Shelves.InterruptedStore store = new Shelves.InterruptedStore();
    private final Shelves.Hands clock = new Shelves.Hands();
    private final Shelf shelf = Shelf.open(store, clock, READER);
    private String a;
    private String b;
    private String c;

    @BeforeEach
    void putThree() {
        a = shelf.put(model(1));
        b = shelf.put(model(2));
        c = shelf.put(model(3));
    }

    private ShelfEntry release(String model, String... sorters) {
        clock.now = clock.now.plusSeconds(60);
        return shelf.release(Release.of(model, "because", "x").withSorters(Set.of(sorters)));
    }

    private void assertRuns(String fleet, Map<String, String> sorters) {
        assertThat(shelf.running()).contains(new Service(fleet, new TreeMap<>(sorters)));
    }

    @Test
    void theJournalSaysWhichSorterRunsWhich() {
        release(a);
        ShelfEntry entry = release(b, "curlew", "avocet");
        assertThat(entry.from()).contains(a);
        assertThat(entry.to()).isEqualTo(b);
        assertThat(entry.sorters()).containsExactly("avocet", "curlew");
        assertRuns(a, Map.of("avocet", b, "curlew", b));
        assertThat(shelf.inService().orElseThrow().to()).isEqualTo(a);
        assertThat(shelf.inService("avocet")).contains(entry);
        assertThat(shelf.inService("dunlin").orElseThrow().number()).isEqualTo(1);
        release(c, "avocet");
        assertRuns(a, Map.of("avocet", c, "curlew", b));
        assertThat(shelf.history().get(2).from()).contains(b);
        assertThat(shelf.inService("curlew").orElseThrow().number()).isEqualTo(2);
        assertThat(shelf.verify()).isEmpty();
    }

    @Test
    void aReleaseToTheFleetEndsTheSplitWhicheverModelWins() {
        release(a);
        release(b, "avocet");
        release(b);
        assertRuns(b, Map.of());
        shelf.revert("no", "x");
        assertRuns(a, Map.of("avocet", b));
        ShelfEntry kept = release(a);
        assertThat(kept.from()).contains(a);
        assertRuns(a, Map.of());
        assertThat(shelf.inService("avocet")).contains(kept);
        // Nothing changed for the others: they run the model since the first entry.
        assertThat(shelf.inService("dunlin").orElseThrow().to()).isEqualTo(a);
    }

    @Test
    void aRevertTakesBackTheNewestStepOnly() {
        release(a);
        release(b, "avocet");
        release(c, "curlew");
        ShelfEntry back = shelf.revert("no", "x");
        assertThat(back.sorters()).containsExactly("curlew");
        assertThat(back.from()).contains(c);
        assertThat(back.to()).isEqualTo(a);
        assertRuns(a, Map.of("avocet", b));
        shelf.revert("no", "x");
        assertRuns(a, Map.of());
        assertRefused(Fault.Kind.INPUT, () -> shelf.revert("no", "x"), "no earlier model");
    }

    @Test
    void whatRanWhereThenIsTold() {
        release(a);
        release(b, "avocet");
        release(c);
        assertThat(shelf.runningAsOf(NIGHT)).isEmpty();
        assertThat(shelf.runningAsOf(NIGHT.plusSeconds(60)).orElseThrow().on("avocet"))
                .isEqualTo(a);
        Service split = shelf.runningAsOf(NIGHT.plusSeconds(179)).orElseThrow();
        assertThat(split.on("avocet")).isEqualTo(b);
        assertThat(split.on("dunlin")).isEqualTo(a);
        assertThat(shelf.asOf(NIGHT.plusSeconds(179)).orElseThrow().to()).isEqualTo(a);
        assertThat(shelf.runningAsOf(NIGHT.plusSeconds(180)).orElseThrow().on("avocet"))
                .isEqualTo(c);
    }

    @Test
    void aSplitThatMakesNoSenseIsRefused() {
        assertRefused(Fault.Kind.INPUT, () -> release(a, "avocet"), "the whole fleet first");
        release(a);
        assertRefused(Fault.Kind.INPUT, () -> release(a, "avocet"), "in service already");
        release(b, "avocet");
        assertRefused(Fault.Kind.INPUT, () -> release(b, "avocet"), "in service already");
        assertThat(shelf.history()).hasSize(2);
    }

    @Test
    void putBackOnTheFleetsModelASorterIsNoLongerNamed() {
        release(a);
        release(b, "avocet", "curlew");
        release(a, "avocet");
        assertRuns(a, Map.of("curlew", b));
    }

    @Test
    void whoLosesASplitToAnotherChangeIsBusy() {
        release(a);
        store.before = () -> release(b);
        assertRefused(Fault.Kind.BUSY, () -> release(c, "avocet"), "by x");
        assertRuns(b, Map.of());
        store.before = () -> release(c, "curlew");
        assertRefused(Fault.Kind.BUSY, () -> shelf.withdraw(b, "no", "y"), "by x");
        assertThat(shelf.withdrawn()).isEmpty();
        assertRuns(b, Map.of("curlew", c));
    }
}
