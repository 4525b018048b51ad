package turnstone.ledger;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.math.BigInteger;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.moments.Moments;

class DayContentTest {
    private final DayDraft draft = Days.draft(Days.MONDAY, "m", 1);

    @Test
    void momentsThatAreNotTheSumOfTheirShowingsAreRefused() {
        List<ShowingSums> showings = new ArrayList<>(draft.moments().showings().values());
        ShowingSums first = showings.get(0);
        List<BigInteger> sums = new ArrayList<>(first.sums());
        sums.set(1, sums.get(1).add(BigInteger.ONE));
        showings.set(0, with(first, first.records(), sums));
        assertThatThrownBy(() -> DayMoments.of(Days.CHANNELS, draft.moments().moments(), showings))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessageContaining("add up");
        showings.set(0, with(first, first.records() + 1, first.sums()));
        assertThatThrownBy(() -> DayMoments.of(Days.CHANNELS, draft.moments().moments(), showings))
                .isInstanceOf(IllegalArgumentException.class);
        showings.remove(0);
        assertThatThrownBy(() -> DayMoments.of(Days.CHANNELS, draft.moments().moments(), showings))
                .isInstanceOf(IllegalArgumentException.class);
    }

    @Test
    void momentsOfNoRecordsAreLeftOut() {
        Map<LedgerKey, Moments> moments = new HashMap<>(draft.moments().moments());
        moments.put(new LedgerKey("dunlin@2026-01-01", "PP", 0), Moments.empty(Days.CHANNELS));
        assertThat(DayMoments.of(
                                Days.CHANNELS,
                                moments,
                                draft.moments().showings().values())
                        .moments())
                .isEqualTo(draft.moments().moments());
    }

    @Test
    void recordsDroppedOrCountedTwiceAreRefused() {
        assertThatThrownBy(() -> new DayCounts(10, 7, 2, new TreeMap<>()))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.STORAGE))
                .hasMessageContaining("found 9")
                .hasMessageContaining("expected 10");
        DayCounts counts = new DayCounts(10, 7, 2, new TreeMap<>(Map.of("saturated", 1L, "missing key", 0L)));
        assertThat(counts.quarantinedTotal()).isEqualTo(1);
        assertThat(counts.quarantined()).containsOnlyKeys("saturated");
    }

    @Test
    void countsThatAreNotThoseOfTheSumsAreRefused() {
        DayCounts fewer = new DayCounts(9, 1, 8, new TreeMap<>());
        assertThatThrownBy(() -> new DayDraft(Days.MONDAY, List.of(), fewer, draft.moments(), List.of()))
                .isInstanceOf(IllegalArgumentException.class);
        assertThatThrownBy(() -> new DayDraft(Days.MONDAY, List.of(), draft.counts(), draft.moments(), List.of("m-1")))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessageContaining("m-1");
    }

    @Test
    void theFingerprintCoversContentAndNotInputs() {
        String fingerprint = fingerprint(draft.moments(), draft.counts());
        assertThat(fingerprint)
                .isEqualTo(fingerprint(Days.draft(Days.MONDAY, "m", 1).moments(), draft.counts()));
        assertThat(fingerprint)
                .isNotEqualTo(fingerprint(Days.draft(Days.MONDAY, "m", 2).moments(), draft.counts()));
        DayCounts more = new DayCounts(
                draft.counts().read() + 1,
                draft.counts().accepted(),
                draft.counts().noSignal(),
                new TreeMap<>(Map.of("saturated", draft.counts().quarantinedTotal() + 1)));
        assertThat(fingerprint).isNotEqualTo(fingerprint(draft.moments(), more));
        for (ShowingSums changed : changes(draft.moments().showings().get("m-0"))) {
            List<ShowingSums> showings =
                    new ArrayList<>(draft.moments().showings().values());
            showings.set(0, changed);
            DayMoments other = DayMoments.of(Days.CHANNELS, draft.moments().moments(), showings);
            assertThat(fingerprint(other, draft.counts()))
                    .as(changed.toString())
                    .isNotEqualTo(fingerprint);
        }
    }

    private static List<ShowingSums> changes(ShowingSums one) {
        return List.of(
                new ShowingSums(
                        "other",
                        one.sorter(),
                        one.instrument(),
                        one.tray(),
                        one.trayGroup(),
                        one.material(),
                        one.records(),
                        one.noSignal(),
                        one.quarantined(),
                        one.sums()),
                new ShowingSums(
                        one.showing(),
                        one.sorter(),
                        one.instrument(),
                        "other",
                        one.trayGroup(),
                        one.material(),
                        one.records(),
                        one.noSignal(),
                        one.quarantined(),
                        one.sums()),
                new ShowingSums(
                        one.showing(),
                        one.sorter(),
                        one.instrument(),
                        one.tray(),
                        one.trayGroup(),
                        one.material(),
                        one.records(),
                        one.noSignal() + 1,
                        one.quarantined(),
                        one.sums()),
                new ShowingSums(
                        one.showing(),
                        one.sorter(),
                        one.instrument(),
                        one.tray(),
                        one.trayGroup(),
                        one.material(),
                        one.records(),
                        one.noSignal(),
                        one.quarantined() + 1,
                        one.sums()));
    }

    private static ShowingSums with(ShowingSums one, long records, List<BigInteger> sums) {
        return new ShowingSums(
                one.showing(),
                one.sorter(),
                one.instrument(),
                one.tray(),
                one.trayGroup(),
                one.material(),
                records,
                one.noSignal(),
                one.quarantined(),
                sums);
    }

    private static String fingerprint(DayMoments moments, DayCounts counts) {
        return DayFingerprints.day(Days.MONDAY, moments, counts, "scale", "head");
    }
}
