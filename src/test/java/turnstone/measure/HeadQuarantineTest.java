package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.time.LocalDate;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.EnumSource;
import org.junit.jupiter.params.provider.ValueSource;

class HeadQuarantineTest {
    private static final Instrument THREE =
            Instrument.of("curlew", LocalDate.of(2026, 3, 1), new double[] {900, 910, 920});
    private final HeadTrouble trouble = new HeadTrouble();

    private static Head head() {
        return Head.of(
                HeadSpec.builder(3)
                        .saturatedAt(4095)
                        .deadAtOrBelow(2)
                        .correct(1_000, 3_000)
                        .build(),
                THREE,
                ReferenceTable.builder()
                        .add(ReferenceKind.DARK, "curlew", 0, 10_000, new double[] {100, 100, 100})
                        .add(ReferenceKind.WHITE, "curlew", 0, 10_000, new double[] {1100, 1100, 1100})
                        .add(ReferenceKind.WHITE, "curlew", 0, 20_000, new double[] {1100, 100, 1100})
                        .add(ReferenceKind.WHITE, "curlew", 0, 30_000, new double[] {1100, 1100, 99})
                        .add(ReferenceKind.DARK, "curlew", 0, 30_000, new double[] {100, 100, 100})
                        .add(ReferenceKind.WHITE, "curlew", 1, 10_000, new double[] {1100, 1100, 1100})
                        .build());
    }

    private HeadOutcome apply(int beltColumn, long time_ms, double... raw) {
        return head().apply(raw, 0, beltColumn, time_ms, new double[3], 0, trouble);
    }

    private void quarantined(HeadOutcome outcome, QuarantineReason reason, int channel, double value, double limit) {
        assertThat(outcome).isEqualTo(HeadOutcome.QUARANTINED);
        assertThat(trouble.reason()).isEqualTo(reason);
        assertThat(trouble.channel()).isEqualTo(channel);
        assertThat(trouble.value()).isEqualTo((Double) value);
        assertThat(trouble.limit()).isEqualTo((Double) limit);
    }

    @Test
    void aSoundRecordIsAccepted() {
        assertThat(apply(0, 10_000, 600, 600, 600)).isEqualTo(HeadOutcome.ACCEPTED);
        assertThat(trouble.reason()).isNull();
    }

    @ParameterizedTest
    @ValueSource(doubles = {Double.NaN, Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY})
    void nonFinite(double value) {
        quarantined(apply(0, 10_000, 600, value, 600), QuarantineReason.NON_FINITE, 1, value, Double.NaN);
        Head plain = Head.of(HeadSpec.none(2), null, null);
        HeadOutcome outcome = plain.apply(new double[] {1, value}, 0, 0, 0, new double[2], 0, trouble);
        quarantined(outcome, QuarantineReason.NON_FINITE, 1, value, Double.NaN);
    }

    @Test
    void saturatedFromTheLimitOn() {
        quarantined(apply(0, 10_000, 600, 600, 4095), QuarantineReason.SATURATED, 2, 4095, 4095);
        assertThat(trouble.message()).isEqualTo("saturated, channel 3, found 4095.0, limit 4095.0");
        assertThat(apply(0, 10_000, 600, 600, 4094)).isEqualTo(HeadOutcome.ACCEPTED);
    }

    @Test
    void deadUpToTheLimit() {
        quarantined(apply(0, 10_000, 2, 4095, 600), QuarantineReason.DEAD_PIXEL, 0, 2, 2);
        assertThat(apply(0, 10_000, 3, 600, 600)).isEqualTo(HeadOutcome.ACCEPTED);
    }

    @Test
    void staleWhiteBeyondItsAge() {
        assertThat(apply(0, 11_000, 600, 600, 600)).isEqualTo(HeadOutcome.ACCEPTED);
        quarantined(apply(0, 11_001, 600, 600, 600), QuarantineReason.STALE_WHITE, -1, 1_001, 1_000);
        assertThat(trouble.message()).isEqualTo("stale white, found 1001.0, limit 1000.0");
    }

    @Test
    void staleDarkBeyondItsAge() {
        // At 20 000 ms the white is fresh and the dark 10 000 ms old.
        quarantined(apply(0, 20_000, 600, 600, 600), QuarantineReason.STALE_WHITE, -1, 10_000, 3_000);
    }

    @Test
    void noReferenceBeforeTheRecordOrOfTheBeltColumn() {
        double none = Double.POSITIVE_INFINITY;
        quarantined(apply(0, 9_999, 600, 600, 600), QuarantineReason.STALE_WHITE, -1, none, 1_000);
        quarantined(apply(2, 10_000, 600, 600, 600), QuarantineReason.STALE_WHITE, -1, none, 1_000);
        quarantined(apply(1, 10_000, 600, 600, 600), QuarantineReason.STALE_WHITE, -1, none, 3_000);
    }

    @ParameterizedTest
    @CsvSource({"100, 100", "99, 100"})
    void whiteAtOrBelowDark(double white, double dark) {
        ReferenceTable references = ReferenceTable.builder()
                .add(ReferenceKind.DARK, "curlew", 0, 0, new double[] {100, dark, 100})
                .add(ReferenceKind.WHITE, "curlew", 0, 0, new double[] {1100, white, 1100})
                .build();
        Head head = Head.of(HeadSpec.builder(3).correct(1_000).build(), THREE, references);
        HeadOutcome outcome = head.apply(new double[] {600, 600, 600}, 0, 0, 10, new double[3], 0, trouble);
        quarantined(outcome, QuarantineReason.BAD_WHITE, 1, white, dark);
        // Masked, the channel is of no matter.
        Head masked =
                Head.of(HeadSpec.builder(3).correct(1_000).dropChannels(1, 1).build(), THREE, references);
        assertThat(masked.apply(new double[] {600, 600, 600}, 0, 0, 10, new double[2], 0, trouble))
                .isEqualTo(HeadOutcome.ACCEPTED);
    }

    @Test
    void darkAndWhiteOfOneTimeServeTogetherWhateverTheOrderGiven() {
        quarantined(apply(0, 30_000, 600, 600, 600), QuarantineReason.BAD_WHITE, 2, 99, 100);
    }

    @Test
    void spreadBeyondDoublesIsNoMeasurement() {
        Head head = Head.of(HeadSpec.builder(3).snv(1e-6).build(), null, null);
        HeadOutcome outcome = head.apply(new double[] {1e300, -1e300, 0}, 0, 0, 0, new double[3], 0, trouble);
        quarantined(outcome, QuarantineReason.NON_FINITE, -1, Double.POSITIVE_INFINITY, Double.NaN);
    }

    @ParameterizedTest
    @EnumSource(QuarantineReason.class)
    void labelsComeBack(QuarantineReason reason) {
        assertThat(QuarantineReason.labelled(reason.label())).isEqualTo(reason);
        assertThat(reason.label()).matches("[a-z ]+");
        assertThatThrownBy(() -> QuarantineReason.labelled("whim")).isInstanceOf(IllegalArgumentException.class);
    }
}
