package turnstone.sample;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.ByteBuffer;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Collections;
import java.util.HashMap;
import java.util.HashSet;
import java.util.List;
import java.util.Map;
import java.util.Random;
import java.util.Set;
import java.util.TreeMap;
import java.util.TreeSet;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import turnstone.json.Json;
import turnstone.measure.Head;
import turnstone.measure.HeadOutcome;
import turnstone.measure.HeadTrouble;
import turnstone.measure.Instrument;
import turnstone.measure.QuarantineReason;
import turnstone.measure.ReferenceKind;
import turnstone.measure.ReferenceTable;
import turnstone.plant.Plant;

class SamplePlantTest {
    private static final SampleSize SMALL = new SampleSize(6, 9, 3, 12, 64);

    @TempDir
    Path folder;

    private static String digest(List<SampleRecord> records) {
        StringBuilder digests = new StringBuilder();
        for (SampleRecord record : records) {
            ByteBuffer bytes = ByteBuffer.allocate(4 * record.counts().length);
            for (int count : record.counts()) {
                bytes.putInt(count);
            }
            digests.append(record.piece())
                    .append(record.beltColumn())
                    .append(record.time_ms())
                    .append(Json.sha256(bytes.array()));
        }
        return Json.sha256(digests.toString().getBytes(StandardCharsets.UTF_8));
    }

    @Test
    void theStandardPlantHasItsStatedSize() {
        SamplePlant plant = SamplePlant.standard();
        assertThat(plant.nights()).hasSize(13);
        assertThat(plant.sorters()).hasSize(12).doesNotHaveDuplicates();
        assertThat(plant.materials()).hasSize(11).endsWith("belt");
        List<SampleShowing> first = plant.showings(plant.nights().get(0));
        assertThat(first).hasSize(528);
        assertThat(plant.records(first.get(17))).hasSize(47).allSatisfy(record -> {
            assertThat(record.counts()).hasSize(128);
            for (int count : record.counts()) {
                assertThat(count).isBetween(0, 16_383);
            }
        });
        assertThat(plant.showings(plant.nights().get(12))).hasSize(529);
        assertThatThrownBy(() -> plant.showings(LocalDate.of(2030, 1, 1))).hasMessageContaining("none of the sample");
    }

    @Test
    void aShowingIsUniqueAndItsTraysComeBackInEightGroups() {
        SamplePlant plant = SamplePlant.standard();
        Set<String> ids = new HashSet<>();
        Map<String, Set<LocalDate>> nightsOfTray = new TreeMap<>();
        for (LocalDate night : plant.nights()) {
            for (SampleShowing showing : plant.showings(night)) {
                assertThat(ids.add(showing.id())).as(showing.id()).isTrue();
                nightsOfTray
                        .computeIfAbsent(showing.tray(), tray -> new TreeSet<>())
                        .add(night);
            }
        }
        assertThat(nightsOfTray).hasSize(11 * 8);
        assertThat(nightsOfTray.values())
                .allSatisfy(nights -> assertThat(nights).hasSize(13));
    }

    /** A golden digest: other numbers are another sample, and every figure in the documents moves. */
    @Test
    void theSameSeedGivesTheSameRecordsInAnyOrderOnAnyMachine() {
        SamplePlant plant = SamplePlant.of(SMALL, 7);
        List<SampleShowing> showings =
                new ArrayList<>(plant.showings(plant.nights().get(8)));
        Map<String, String> inOrder = new HashMap<>();
        showings.forEach(showing -> inOrder.put(showing.id(), digest(plant.records(showing))));
        Collections.shuffle(showings, new Random(3));
        SamplePlant again = SamplePlant.of(SMALL, 7);
        for (SampleShowing showing : showings) {
            assertThat(digest(again.records(showing))).isEqualTo(inOrder.get(showing.id()));
        }
        SamplePlant other = SamplePlant.of(SMALL, 8);
        assertThat(digest(other.records(showings.get(0))))
                .isNotEqualTo(inOrder.get(showings.get(0).id()));
        assertThat(digest(plant.records(plant.showings(plant.nights().get(2)).get(40))))
                .isEqualTo("d3263f59ca01a9e827a1600f665489a041650ce81b7222f0cca8d37bbaeea4c1");
    }

    @Test
    void aTrayHasTheSamePiecesEverywhere() {
        SamplePlant plant = SamplePlant.of(SMALL, 7);
        Map<String, Set<String>> pieces = new TreeMap<>();
        for (LocalDate night : plant.nights().subList(0, 3)) {
            for (SampleShowing showing : plant.showings(night)) {
                Set<String> shown = new TreeSet<>();
                plant.records(showing).forEach(record -> shown.add(record.piece()));
                assertThat(pieces.computeIfAbsent(showing.tray(), tray -> shown))
                        .isEqualTo(shown);
            }
        }
        assertThat(pieces.get("pp-3")).hasSize(12).contains("pp-3/1", "pp-3/12");
    }

    private Plant file(SamplePlant sample) {
        try {
            Path file = folder.resolve("plant.yaml");
            Files.writeString(file, sample.plantYaml(Path.of("data")));
            return Plant.read(file);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    @Test
    void thePlantFileOfTheSampleIsValidAndFitsIt() {
        SamplePlant sample = SamplePlant.of(SMALL, 7);
        Plant plant = file(sample);
        assertThat(plant.sorters()).isEqualTo(sample.sorters());
        assertThat(plant.materialNames()).isEqualTo(sample.materials());
        assertThat(plant.channels()).isEqualTo(64);
        assertThat(plant.records().pathOf(sample.nights().get(0))).endsWith("/data/records/2026-03-02");
        Set<Integer> groups = new TreeSet<>();
        for (SampleShowing showing : sample.showings(sample.nights().get(0))) {
            groups.add(plant.trayGroup(showing.material(), showing.tray()));
        }
        assertThat(groups).containsExactly(0, 1, 2, 3, 4, 5, 6, 7);
        assertThat(file(SamplePlant.standard()).instruments()).hasSize(13);
    }

    @Test
    void axesDifferByTwoToFourNanometresAndOneCameraIsChanged() {
        SamplePlant sample = SamplePlant.standard();
        Plant plant = file(sample);
        LocalDate last = sample.nights().get(12);
        for (String sorter : plant.sorters()) {
            double[] axis = plant.instrument(sorter, last).orElseThrow().wavelength_nm();
            assertThat(Math.abs(axis[0] - 900)).as(sorter).isBetween(2.0, 4.0);
            assertThat(Math.abs(axis[127] - 1700)).as(sorter).isBetween(2.0, 4.0);
        }
        List<String> godwit = sample.nights().stream()
                .map(night -> plant.instrument("godwit", night).orElseThrow().name())
                .distinct()
                .toList();
        assertThat(godwit).containsExactly("godwit@2026-03-01", "godwit@2026-03-09");
    }

    @Test
    void oneTrayIsMislabelledOnTheLastNightOnly() {
        SamplePlant sample = SamplePlant.standard();
        List<SampleShowing> wrong = new ArrayList<>();
        for (LocalDate night : sample.nights()) {
            sample.showings(night).stream()
                    .filter(showing -> !showing.material().equals(showing.trueMaterial()))
                    .forEach(wrong::add);
        }
        assertThat(wrong).hasSize(1);
        SampleShowing showing = wrong.get(0);
        assertThat(showing.day()).isEqualTo(sample.nights().get(12));
        assertThat(showing.sorter()).isEqualTo("curlew");
        assertThat(showing.material()).isEqualTo("PP");
        assertThat(showing.trueMaterial()).isEqualTo("PS");
        assertThat(sample.records(showing))
                .allSatisfy(record -> assertThat(record.piece()).startsWith("ps-"));
    }

    @Test
    void oneWhiteIsMissingOnTheLastNightAndLookedThroughAFilmTheNightBefore() {
        SamplePlant sample = SamplePlant.of(SMALL, 7);
        LocalDate last = sample.nights().get(8);
        List<SampleReference> there = sample.references(last);
        assertThat(there).hasSize(6 * 2 * 16 - 2);
        assertThat(there.stream().filter(reference -> reference.kind() == ReferenceKind.WHITE))
                .noneMatch(reference -> reference.sorter().equals("knot")
                        && (reference.beltColumn() == 5 || reference.beltColumn() == 6));
        double[] filmed = white(sample, sample.nights().get(7), 5);
        double[] clean = white(sample, sample.nights().get(6), 5);
        // Channel 24 of 64 lies at 1207 nm, in the film's strongest C-H band; channel 33 at 1322 nm beside it.
        double dip = (filmed[24] / clean[24]) / (filmed[33] / clean[33]);
        assertThat(dip).isBetween(0.3, 0.6);
    }

    private static double[] white(SamplePlant sample, LocalDate night, int column) {
        return sample.references(night).stream()
                .filter(reference -> reference.kind() == ReferenceKind.WHITE
                        && reference.sorter().equals("knot")
                        && reference.beltColumn() == column)
                .findFirst()
                .orElseThrow()
                .values();
    }

    @Test
    void oneLampAges() {
        SamplePlant sample = SamplePlant.standard();
        double first = brightest(sample, "dunlin", 0);
        double last = brightest(sample, "dunlin", 12);
        assertThat(last / first).isBetween(0.5, 0.75);
        assertThat(brightest(sample, "plover", 12) / brightest(sample, "plover", 0))
                .isBetween(0.85, 1.15);
    }

    private static double brightest(SamplePlant sample, String sorter, int night) {
        double most = 0;
        for (SampleReference reference : sample.references(sample.nights().get(night))) {
            if (reference.sorter().equals(sorter) && reference.kind() == ReferenceKind.WHITE) {
                for (double value : reference.values()) {
                    most = Math.max(most, value);
                }
            }
        }
        return most;
    }

    /** The last night through the head of the sample's own plant file: every record is told, and each trap is caught under its reason. */
    @Test
    void theHeadCatchesWhatItShouldOnTheLastNight() {
        SamplePlant sample = SamplePlant.of(new SampleSize(5, 9, 4, 40, 64), 7);
        Plant plant = file(sample);
        LocalDate last = sample.nights().get(8);
        ReferenceTable references = references(sample, 7, 8);
        Map<Object, Integer> outcomes = new HashMap<>();
        HeadTrouble trouble = new HeadTrouble();
        double[] values = new double[plant.head().outputs()];
        int read = 0;
        for (SampleShowing showing : sample.showings(last)) {
            Instrument instrument = plant.instrument(showing.sorter(), last).orElse(null);
            Head head = instrument == null ? null : Head.of(plant.head(), instrument, references);
            for (SampleRecord record : sample.records(showing)) {
                read++;
                outcomes.merge(outcome(head, record, values, trouble), 1, Integer::sum);
            }
        }
        assertThat(read).isEqualTo(5 * 11 * 4 * 40 + 1);
        assertThat(outcomes.values().stream().mapToInt(Integer::intValue).sum()).isEqualTo(read);
        assertThat(outcomes).containsEntry(QuarantineReason.UNKNOWN_SORTER, 1);
        assertThat(outcomes).containsEntry(QuarantineReason.DEAD_PIXEL, 1);
        assertThat(outcomes.get(QuarantineReason.SATURATED)).isBetween(1, 40);
        // Two of 16 belt columns of one sorter of five: 1 in 40 of the records.
        assertThat(outcomes.get(QuarantineReason.STALE_WHITE) / (double) read).isBetween(0.015, 0.035);
        assertThat(outcomes.get(HeadOutcome.NO_SIGNAL) / (double) read).isBetween(0.01, 0.08);
        assertThat(outcomes.get(HeadOutcome.ACCEPTED) / (double) read).isGreaterThan(0.9);
    }

    private static ReferenceTable references(SamplePlant sample, int... nights) {
        ReferenceTable.Builder builder = ReferenceTable.builder();
        for (int night : nights) {
            for (SampleReference reference : sample.references(sample.nights().get(night))) {
                builder.add(
                        reference.kind(),
                        reference.sorter(),
                        reference.beltColumn(),
                        reference.time_ms(),
                        reference.values());
            }
        }
        return builder.build();
    }

    private static Object outcome(Head head, SampleRecord record, double[] values, HeadTrouble trouble) {
        if (head == null) {
            return QuarantineReason.UNKNOWN_SORTER;
        }
        double[] raw = new double[record.counts().length];
        for (int c = 0; c < raw.length; c++) {
            raw[c] = record.counts()[c];
        }
        HeadOutcome outcome = head.apply(raw, 0, record.beltColumn(), record.time_ms(), values, 0, trouble);
        return outcome == HeadOutcome.QUARANTINED ? trouble.reason() : outcome;
    }

    @Test
    void theTruthCanBeSampledWithoutEnd() {
        SamplePlant sample = SamplePlant.standard();
        SampleShowing one = sample.unseen("snipe", "PA", 1_000_000);
        SampleShowing next = sample.unseen("snipe", "PA", 1_000_001);
        assertThat(one.tray()).isEqualTo("pa-1000009");
        assertThat(one.trueMaterial()).isEqualTo("PA");
        assertThat(digest(sample.records(one)))
                .isEqualTo(digest(sample.records(one)))
                .isNotEqualTo(digest(sample.records(next)));
        assertThatThrownBy(() -> sample.unseen("heron", "PA", 0)).isInstanceOf(IllegalArgumentException.class);
    }
}
