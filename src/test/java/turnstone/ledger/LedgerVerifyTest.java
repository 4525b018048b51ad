package turnstone.ledger;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.store.MemoryStore;
import turnstone.store.Problem;

class LedgerVerifyTest {
    private final MemoryStore store = new MemoryStore();
    private final Ledger ledger = Days.ledger(store);

    @BeforeEach
    void postThreeRevisions() {
        ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO);
        ledger.post(Days.draft(Days.TUESDAY, "t", 2), Replace.NO);
        ledger.post(Days.draft(Days.MONDAY, "m", 3), Replace.YES);
    }

    @Test
    void allIsWell() {
        assertThat(ledger.verify()).isEmpty();
        assertThat(store.files()).as("a description, three entries, six parts").hasSize(10);
    }

    @Test
    void eachFileThatIsAlteredIsNamed() {
        for (String name : files()) {
            byte[] kept = store.files().get(name);
            byte[] altered = kept.clone();
            altered[kept.length / 2] ^= 1;
            store.files().put(name, altered);
            assertOnly(name, Problem.Trouble.ALTERED);
            store.files().put(name, kept);
        }
    }

    @Test
    void eachFileThatIsTruncatedIsNamed() {
        for (String name : files()) {
            byte[] kept = store.files().get(name);
            store.files().put(name, Arrays.copyOf(kept, kept.length - 5));
            assertOnly(name, name.endsWith(".json") ? Problem.Trouble.ALTERED : Problem.Trouble.TRUNCATED);
            store.files().put(name, kept);
        }
    }

    @Test
    void eachFileThatIsMissingIsNamed() {
        List<String> files = files();
        // That the newest entry was taken away whole can't be told from one that was never written.
        files.remove("journal/00000003.json");
        for (String name : files) {
            byte[] kept = store.files().remove(name);
            assertOnly(name, Problem.Trouble.MISSING);
            store.files().put(name, kept);
        }
    }

    @Test
    void severalProblemsAreAllNamedWithDigests() {
        List<DayEntry> days = ledger.days();
        String first = days.get(0).momentsPart().name();
        String second = days.get(1).showingsPart().name();
        store.files().get(first)[50] ^= 1;
        store.files().remove(second);
        List<Problem> problems = ledger.verify();
        assertThat(problems).extracting(Problem::file).containsExactlyInAnyOrder(first, second);
        assertThat(problems.toString()).contains(days.get(0).momentsPart().sha256());
    }

    @Test
    void aDescriptionInOtherTermsIsNotTakenForTheOldOne() {
        store.files().put("ledger.json", new Terms(Days.SCALE, turnstone.measure.HeadSpec.none(4)).bytes());
        assertOnly("ledger.json", Problem.Trouble.ALTERED);
        assertThatThrownBy(ledger::days).isInstanceOf(Fault.class);
    }

    @Test
    void aLedgerWithoutItsDescriptionIsNotAnEmptyOne() {
        store.files().remove("ledger.json");
        assertThatThrownBy(() -> Ledger.existing(store))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.STORAGE))
                .hasMessageContaining("ledger.json")
                .hasMessageContaining("missing");
        assertThatThrownBy(ledger::days).isInstanceOf(Fault.class);
    }

    private List<String> files() {
        return new ArrayList<>(store.files().keySet());
    }

    private void assertOnly(String name, Problem.Trouble trouble) {
        assertThat(ledger.verify()).as(name).singleElement().satisfies(problem -> {
            assertThat(problem.file()).isEqualTo(name);
            assertThat(problem.trouble()).isEqualTo(trouble);
        });
    }
}
