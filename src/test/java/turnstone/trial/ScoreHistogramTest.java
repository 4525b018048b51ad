package turnstone.trial;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.Random;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.plant.Duty;

class ScoreHistogramTest {
    private static final long SEED = 31;

    @Test
    void everyBinBeginsAtItsEdgeAndTheSidesMirrorEachOther() {
        for (int bin = ScoreBins.SIDE; bin < ScoreBins.COUNT; bin++) {
            double edge = ScoreBins.edge(bin);
            assertThat(ScoreBins.ejected(edge)).isEqualTo(bin);
            assertThat(ScoreBins.ejected(Math.nextDown(ScoreBins.edge(bin + 1))))
                    .isEqualTo(bin);
            assertThat(ScoreBins.kept(edge)).isEqualTo(ScoreBins.COUNT - 1 - bin);
        }
        assertThat(ScoreBins.edge(ScoreBins.NEAREST)).isZero();
        assertThat(ScoreBins.edge(1)).isEqualTo(-1024);
        assertThat(ScoreBins.ejected(Double.POSITIVE_INFINITY)).isEqualTo(ScoreBins.COUNT - 1);
        assertThatThrownBy(() -> ScoreBins.kept(Double.NaN)).isInstanceOf(IllegalArgumentException.class);
    }

    @Test
    void aRecordIsScoredAgainstTheRestFromBothStreams() {
        Map<String, Double> mix = Map.of("PET", 0.6, "PP", 0.4);
        List<String> materials = List.of("PET", "PP", "belt");
        EjectScore ejected = EjectScore.of(Fixture.duty(Duty.Stream.EJECTED, mix), materials);
        EjectScore passed = EjectScore.of(Fixture.duty(Duty.Stream.PASSED, mix), materials);
        double[] scores = {3, 1, 2.5};
        // PET against the better of PP and belt: 2·(3 − 2.5); PP, which is ejected where PET is passed: 2·(3 − 1) the
        // other way.
        assertThat(ejected.bin(0, scores)).isEqualTo(ScoreBins.ejected(1));
        assertThat(passed.bin(0, scores)).isEqualTo(ScoreBins.kept(4));
        assertThat(ejected.bin(2, new double[] {1, 0, 1})).isEqualTo(ScoreBins.kept(0));
        assertThat(ejected.bin(0, new double[] {1, 0, 1})).isEqualTo(ScoreBins.ejected(0));
        assertThatThrownBy(() -> EjectScore.of(Fixture.duty(Duty.Stream.EJECTED, mix), List.of("PP")))
                .hasMessageContaining("no material");
    }

    @Test
    void anyPartitioningGivesTheSameHistogramAndItsFileBringsItBack() {
        Random random = new Random(SEED);
        ScoreHistogram whole = ScoreHistogram.empty();
        ScoreHistogram left = ScoreHistogram.empty();
        ScoreHistogram right = ScoreHistogram.empty();
        for (int i = 0; i < 2000; i++) {
            String showing = "s" + random.nextInt(5);
            int bin = random.nextInt(ScoreBins.COUNT + 2);
            for (ScoreHistogram histogram : List.of(whole, random.nextInt(3) == 0 ? left : right)) {
                if (bin < ScoreBins.COUNT) {
                    histogram.add(showing, "PET", bin, 1);
                } else if (bin == ScoreBins.COUNT) {
                    histogram.addUnfamiliar(showing, "PET", 1);
                } else {
                    histogram.addNoSignal(showing, "PET", 1);
                }
            }
        }
        right.merge(left);
        ScoreHistogram gathered = ScoreHistogram.empty();
        whole.rows()
                .forEach((key, row) -> gathered.add(
                        key.showing(),
                        key.truth(),
                        Arrays.copyOf(row, ScoreBins.COUNT),
                        row[ScoreBins.COUNT],
                        row[ScoreBins.COUNT + 1]));
        assertThat(gathered.fingerprint()).isEqualTo(whole.fingerprint());
        assertThat(right.fingerprint()).isEqualTo(whole.fingerprint());
        assertThat(whole.records()).isEqualTo(2000);
        assertThat(ScoreHistogram.read(whole.json(), "scores.json").fingerprint())
                .isEqualTo(whole.fingerprint());
        assertThat(whole.only("s1"::equals).records()
                        + whole.only(s -> !s.equals("s1")).records())
                .isEqualTo(2000);
        assertThatThrownBy(() -> ScoreHistogram.read(Json.object().put("bins", 3), "scores.json"))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("scores.json");
    }
}
