package turnstone.store;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.json.Json;

class JournalTest {
    private final MemoryStore store = new MemoryStore();
    private final Journal journal = Journal.in(store, "journal");

    @Test
    void entriesComeBackInOrder() {
        append("a", "b", "c");
        assertThat(journal.entries()).extracting(JournalEntry::number).containsExactly(1L, 2L, 3L);
        assertThat(says(journal.entries())).containsExactly("a", "b", "c");
        assertThat(store.files())
                .containsOnlyKeys("journal/00000001.json", "journal/00000002.json", "journal/00000003.json");
    }

    @Test
    void aNumberIsWonOnce() {
        append("a");
        Optional<JournalEntry> newest = newest();
        assertThat(journal.append(newest, content("b"))).isEqualTo(Outcome.PUBLISHED);
        assertThat(journal.append(newest, content("b"))).as("equal content too").isEqualTo(Outcome.LOST);
        assertThat(says(journal.entriesAfter(List.of(newest.orElseThrow())))).containsExactly("a", "b");
    }

    @Test
    void anAlteredEntryIsNamedEvenIfItIsTheNewest() {
        append("a", "b", "c");
        for (int number = 1; number <= 3; number++) {
            String name = journal.name(number);
            byte[] kept = store.files().get(name);
            String text = new String(kept, StandardCharsets.UTF_8);
            store.files().put(name, StoreContract.bytes(text.replace("\"says\" : \"", "\"says\" : \"x")));
            assertOnlyProblem(name, Problem.Trouble.ALTERED);
            store.files().put(name, StoreContract.bytes(text + " "));
            assertOnlyProblem(name, Problem.Trouble.ALTERED);
            store.files().put(name, Arrays.copyOf(kept, kept.length / 2));
            assertOnlyProblem(name, Problem.Trouble.ALTERED);
            store.files().put(name, kept);
        }
        assertThat(journal.scan().problems()).isEmpty();
    }

    @Test
    void anEntryReplacedByAWholeOneIsNamedByTheNext() {
        append("a", "b", "c");
        MemoryStore elsewhere = new MemoryStore();
        Journal.in(elsewhere, "journal").append(Optional.empty(), content("a"));
        store.files().put(journal.name(1), elsewhere.files().get(journal.name(1)));
        assertOnlyProblem(journal.name(1), Problem.Trouble.ALTERED);
    }

    @Test
    void swappedEntriesAreBothNamed() {
        append("a", "b", "c", "d");
        byte[] second = store.files().get(journal.name(2));
        store.files().put(journal.name(2), store.files().get(journal.name(3)));
        store.files().put(journal.name(3), second);
        assertThat(journal.scan().problems())
                .extracting(Problem::file)
                .containsExactly(journal.name(2), journal.name(3));
    }

    @Test
    void aMissingEntryIsNotTheEnd() {
        append("a", "b", "c");
        store.files().remove(journal.name(2));
        assertOnlyProblem(journal.name(2), Problem.Trouble.MISSING);
        assertThat(says(journal.scan().entries())).containsExactly("a", "c");
    }

    @Test
    void theJournalsOwnKeysAreItsOwn() {
        assertThatThrownBy(() -> journal.append(Optional.empty(), content("a").put("number", 7)))
                .isInstanceOf(IllegalArgumentException.class);
    }

    /** The entry in the resources is of version 1 and has to be readable for ever. */
    @Test
    void theGoldenEntryIsRead() throws IOException {
        try (InputStream in = JournalTest.class.getResourceAsStream("/golden/journal-entry-1.json")) {
            store.publish(journal.name(1), in.readAllBytes());
        }
        assertThat(journal.entries().get(0).content())
                .isEqualTo(content("golden").put("half", 0.5));
    }

    private void assertOnlyProblem(String name, Problem.Trouble trouble) {
        assertThat(journal.scan().problems()).singleElement().satisfies(problem -> {
            assertThat(problem.file()).isEqualTo(name);
            assertThat(problem.trouble()).isEqualTo(trouble);
        });
        assertThatThrownBy(journal::entries)
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.STORAGE))
                .hasMessageContaining(name)
                .hasMessageContaining("not what was written: " + trouble.label());
    }

    private void append(String... says) {
        for (String one : says) {
            assertThat(journal.append(newest(), content(one))).isEqualTo(Outcome.PUBLISHED);
        }
    }

    private Optional<JournalEntry> newest() {
        List<JournalEntry> entries = journal.entries();
        return entries.isEmpty() ? Optional.empty() : Optional.of(entries.get(entries.size() - 1));
    }

    private static ObjectNode content(String says) {
        return Json.object().put("says", says);
    }

    private static List<String> says(List<JournalEntry> entries) {
        return entries.stream()
                .map(entry -> entry.content().path("says").asText())
                .toList();
    }
}
