package turnstone.shelf;

import static org.assertj.core.api.Assertions.assertThat;
import static turnstone.shelf.Shelves.READER;
import static turnstone.shelf.Shelves.assertRefused;
import static turnstone.shelf.Shelves.model;

import java.util.Map;
import java.util.Set;
import java.util.TreeMap;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;

class WithdrawTest {
    private final Shelves.InterruptedStore store = new Shelves.InterruptedStore();
    private final Shelf shelf = Shelf.open(store, new Shelves.Hands(), READER);
    private String a;
    private String b;
    private String c;

    @BeforeEach
    void putThree() {
        a = shelf.put(model(1));
        b = shelf.put(model(2));
        c = shelf.put(model(3));
    }

    private void release(String model, String... sorters) {
        shelf.release(Release.of(model, "because", "x").withSorters(Set.of(sorters)));
    }

    private void assertRuns(String fleet, Map<String, String> sorters) {
        assertThat(shelf.running()).contains(new Service(fleet, new TreeMap<>(sorters)));
    }

    @Test
    void aModelInServiceIsWithdrawnAndTheOneBeforePutBackInOneEntry() {
        release(a);
        release(b);
        ShelfEntry entry = shelf.withdraw(b.substring(0, 9), "mislabelled tray", "engineer");
        assertThat(entry.withdrawn()).contains(b);
        assertThat(entry.from()).contains(b);
        assertThat(entry.to()).isEqualTo(a);
        assertThat(shelf.inService()).contains(entry);
        assertRuns(a, Map.of());
        assertThat(shelf.history()).hasSize(3).last().isEqualTo(entry);
        assertThat(shelf.withdrawn()).containsExactly(Map.entry(b, entry));
        assertThat(shelf.verify()).isEmpty();
    }

    @Test
    void aWithdrawnModelIsNotReleasedWithoutSayingSo() {
        release(a);
        release(b);
        shelf.withdraw(b, "mislabelled tray", "engineer");
        assertRefused(Fault.Kind.INPUT, () -> release(b), "mislabelled tray");
        assertRefused(Fault.Kind.INPUT, () -> release(b, "avocet"), "--although-withdrawn");
        assertRefused(Fault.Kind.INPUT, () -> shelf.withdraw(b, "again", "x"), "withdrawn already");
        shelf.release(Release.of(b, "it was the right tray", "x").withWithdrawn(Release.IfWithdrawn.RELEASE));
        assertThat(shelf.withdrawn()).isEmpty();
        assertRuns(b, Map.of());
        assertThat(shelf.revert("no", "x").to()).isEqualTo(a);
    }

    @Test
    void aRevertPassesOverWithdrawnModels() {
        release(a);
        release(b);
        release(c);
        ShelfEntry quiet = shelf.withdraw(b, "mislabelled tray", "engineer");
        assertThat(quiet.to()).isEqualTo(c);
        assertThat(shelf.inService().orElseThrow().number()).isEqualTo(3);
        assertThat(shelf.revert("no", "x").to()).isEqualTo(a);
        assertRefused(Fault.Kind.INPUT, () -> shelf.revert("no", "x"), "1 withdrawn");
    }

    @Test
    void withNothingToPutBackAWithdrawalIsRefused() {
        assertRefused(Fault.Kind.INPUT, () -> shelf.withdraw(a, "no", "x"), "nothing was ever in service");
        release(a);
        assertRefused(Fault.Kind.INPUT, () -> shelf.withdraw(a, "no", "x"), "no earlier one to put back");
        assertRefused(Fault.Kind.INPUT, () -> shelf.withdraw("12345678", "no", "x"), "no such model");
        release(b);
        shelf.withdraw(a, "no", "x");
        assertRefused(Fault.Kind.INPUT, () -> shelf.withdraw(b, "no", "x"), "no earlier one to put back");
        assertRuns(b, Map.of());
    }

    @Test
    void onSingleSortersOnlyWhatRanThereIsPutBack() {
        release(a);
        release(b, "avocet");
        release(c, "curlew");
        ShelfEntry entry = shelf.withdraw(b, "no", "x");
        assertThat(entry.sorters()).containsExactly("avocet");
        assertThat(entry.to()).isEqualTo(a);
        assertRuns(a, Map.of("curlew", c));
        assertThat(shelf.revert("no", "x").sorters()).containsExactly("curlew");
        assertRuns(a, Map.of());
    }

    @Test
    void aFleetsModelThatIsWithdrawnLeavesTheSplitBelowItAsItWas() {
        release(a);
        release(b, "avocet");
        release(c);
        shelf.withdraw(c, "no", "x");
        assertRuns(a, Map.of("avocet", b));
        shelf.withdraw(b, "no", "x");
        assertRuns(a, Map.of());
    }

    @Test
    void aModelThatIsGoneIsNotPutBack() {
        release(a);
        release(b);
        store.files().remove("models/" + a + ".json");
        assertRefused(Fault.Kind.STORAGE, () -> shelf.withdraw(b, "no", "x"), "missing");
        assertThat(shelf.history()).hasSize(2);
    }
}
