package turnstone.ledger;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.List;
import java.util.Set;
import java.util.SortedMap;
import java.util.TreeSet;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.Precision;
import turnstone.moments.Moments;
import turnstone.store.MemoryStore;
import turnstone.store.Written;

class LedgerTest {
    private final MemoryStore store = new MemoryStore();
    private final Ledger ledger = Days.ledger(store);

    @Test
    void nothingIsWrittenBeforeTheFirstDay() {
        assertThat(ledger.days()).isEmpty();
        assertThat(ledger.verify()).isEmpty();
        assertThat(Ledger.existing(store)).isEmpty();
        assertThat(store.files()).isEmpty();
    }

    @Test
    void aPostedDayIsLoadedAsItWas() {
        DayDraft draft = Days.draft(Days.MONDAY, "m", 1);
        assertThat(ledger.post(draft, Replace.NO)).isEqualTo(PostOutcome.POSTED);
        DayEntry entry = Ledger.existing(store).orElseThrow().day(Days.MONDAY).orElseThrow();
        assertThat(entry.revision()).isEqualTo(1);
        assertThat(entry.inputs()).isEqualTo(draft.inputs());
        assertThat(entry.counts()).isEqualTo(draft.counts());
        assertThat(entry.showings())
                .containsExactlyElementsOf(draft.moments().showings().keySet());
        DayMoments loaded = ledger.load(entry);
        assertThat(loaded.moments()).isEqualTo(draft.moments().moments());
        assertThat(loaded.showings()).isEqualTo(draft.moments().showings());
    }

    @Test
    void theSameRecordsAgainWriteNothing() {
        ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO);
        Set<String> before = new TreeSet<>(store.files().keySet());
        DayDraft again = Days.draft(Days.MONDAY, "m", 1);
        DayDraft elsewhere = new DayDraft(again.day(), List.of(), again.counts(), again.moments(), again.without());
        assertThat(ledger.post(elsewhere, Replace.NO)).isEqualTo(PostOutcome.SAME_RECORDS);
        assertThat(ledger.post(elsewhere, Replace.YES)).isEqualTo(PostOutcome.SAME_RECORDS);
        assertThat(store.files().keySet()).isEqualTo(before);
    }

    @Test
    void otherRecordsAreRefusedUnlessReplaced() {
        ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO);
        Set<String> before = new TreeSet<>(store.files().keySet());
        DayDraft other = Days.draft(Days.MONDAY, "m", 2);
        assertThatThrownBy(() -> ledger.post(other, Replace.NO))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT))
                .hasMessageContaining("2026-03-02")
                .hasMessageContaining("posted with other records")
                .hasMessageContaining("--replace");
        assertThat(store.files().keySet()).isEqualTo(before);
        assertThat(ledger.post(other, Replace.YES)).isEqualTo(PostOutcome.POSTED);
        assertThat(ledger.days()).extracting(DayEntry::revision).containsExactly(2);
        assertThat(ledger.revisions(Days.MONDAY)).extracting(DayEntry::revision).containsExactly(1, 2);
        assertThat(ledger.load(ledger.day(Days.MONDAY).orElseThrow()).moments())
                .isEqualTo(other.moments().moments());
        assertThat(ledger.load(ledger.revisions(Days.MONDAY).get(0)).moments())
                .isEqualTo(Days.draft(Days.MONDAY, "m", 1).moments().moments());
    }

    @Test
    void goingBackToEarlierRecordsIsARevisionToo() {
        ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO);
        ledger.post(Days.draft(Days.MONDAY, "m", 2), Replace.YES);
        assertThat(ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.YES)).isEqualTo(PostOutcome.POSTED);
        assertThat(ledger.revisions(Days.MONDAY)).hasSize(3);
    }

    @Test
    void aShowingIsOfOneDay() {
        ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO);
        assertThatThrownBy(() -> ledger.post(Days.draft(Days.TUESDAY, "m", 2), Replace.NO))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT))
                .hasMessageContaining("showing m-0")
                .hasMessageContaining("2026-03-02")
                .hasMessageContaining("2026-03-03");
        assertThat(ledger.days()).hasSize(1);
    }

    @Test
    void aRevisionWithoutAShowingSaysSoAndFreesIt() {
        ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO);
        assertThat(ledger.post(Days.draft(Days.MONDAY, "m", 1, List.of("m-3")), Replace.YES))
                .isEqualTo(PostOutcome.POSTED);
        DayEntry entry = ledger.day(Days.MONDAY).orElseThrow();
        assertThat(entry.without()).containsExactly("m-3");
        assertThat(entry.showings()).hasSize(7).doesNotContain("m-3");
        List<String> allButThird = List.of("m-0", "m-1", "m-2", "m-4", "m-5", "m-6", "m-7");
        assertThat(ledger.post(Days.draft(Days.TUESDAY, "m", 5, allButThird), Replace.NO))
                .isEqualTo(PostOutcome.POSTED);
    }

    @Test
    void anotherScaleOrHeadIsRefusedNamingTheFields() {
        ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO);
        CountScale finer = CountScale.uniform(Days.CHANNELS, BigDecimal.ZERO, new BigDecimal("0.01"), Precision.COARSE);
        assertThatThrownBy(() -> Ledger.open(store, finer, Days.HEAD))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT))
                .hasMessageContaining("count scale channel 1 step: 0.01 here, 1 there");
        HeadSpec masked = HeadSpec.none(Days.CHANNELS + 1);
        assertThatThrownBy(() -> Ledger.open(store, Days.SCALE, masked))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT))
                .hasMessageContaining("head channels: 4 here, 3 there");
        CountScale heldFine = CountScale.uniform(Days.CHANNELS, BigDecimal.ZERO, BigDecimal.ONE, Precision.FINE);
        assertThat(Ledger.open(store, heldFine, Days.HEAD).post(Days.draft(Days.MONDAY, "m", 1), Replace.NO))
                .as("coarse or fine changes no sum")
                .isEqualTo(PostOutcome.SAME_RECORDS);
    }

    @Test
    void twoWhoStartALedgerInDifferentTermsDontMix() {
        CountScale finer = CountScale.uniform(Days.CHANNELS, BigDecimal.ZERO, new BigDecimal("0.01"), Precision.COARSE);
        Ledger late = Ledger.open(store, finer, Days.HEAD);
        ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO);
        assertThatThrownBy(() -> late.post(Days.draft(Days.TUESDAY, "t", 1), Replace.NO))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("count scale channel 1 step");
        assertThatThrownBy(late::days).isInstanceOf(Fault.class);
        assertThat(ledger.days()).hasSize(1);
    }

    @Test
    void aWindowIsTheSumOverItsDays() {
        DayDraft monday = Days.draft(Days.MONDAY, "m", 1);
        DayDraft tuesday = Days.draft(Days.TUESDAY, "t", 2);
        ledger.post(monday, Replace.NO);
        ledger.post(tuesday, Replace.NO);
        SortedMap<LedgerKey, Moments> window = ledger.window(ledger.days());
        assertThat(window.keySet()).isEqualTo(monday.moments().moments().keySet());
        monday.moments()
                .moments()
                .forEach((key, moments) -> assertThat(window.get(key))
                        .isEqualTo(moments.plus(tuesday.moments().moments().get(key))));
        List<DayEntry> twice = new ArrayList<>(ledger.days());
        twice.addAll(ledger.days());
        assertThatThrownBy(() -> ledger.window(twice)).isInstanceOf(IllegalArgumentException.class);
    }

    @Test
    void aDamagedPartIsNeverLoadedOrSummed() {
        ledger.post(Days.draft(Days.MONDAY, "m", 1), Replace.NO);
        DayEntry entry = ledger.day(Days.MONDAY).orElseThrow();
        for (Written part : entry.parts()) {
            byte[] kept = store.files().get(part.name());
            byte[] damaged = kept.clone();
            damaged[kept.length / 2] ^= 1;
            store.files().put(part.name(), damaged);
            assertThatThrownBy(() -> ledger.load(entry))
                    .isInstanceOfSatisfying(
                            Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.STORAGE))
                    .hasMessageContaining("not what was written")
                    .hasMessageContaining(part.name());
            store.files().put(part.name(), kept);
        }
        store.files().computeIfPresent(entry.momentsPart().name(), (name, content) -> {
            content[content.length - 1] ^= 1;
            return content;
        });
        assertThatThrownBy(() -> ledger.window(List.of(entry)))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("not what was written");
    }
}
