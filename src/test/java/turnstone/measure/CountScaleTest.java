package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.ByteArrayInputStream;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.ObjectInputStream;
import java.io.ObjectOutputStream;
import java.math.BigDecimal;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;

class CountScaleTest {
    private static CountScale scale(String offset, String step, Precision precision) {
        return CountScale.uniform(1, new BigDecimal(offset), new BigDecimal(step), precision);
    }

    private static double count(CountScale scale, double value) {
        double[] counts = new double[1];
        assertThat(scale.toCounts(new double[] {value}, 0, counts, 0)).isEqualTo(-1);
        return counts[0];
    }

    @Test
    void countsAreRoundedToEven() {
        CountScale halves = scale("0", "1", Precision.COARSE);
        assertThat(count(halves, 0.5)).isEqualTo(0);
        assertThat(count(halves, 1.5)).isEqualTo(2);
        assertThat(count(halves, 2.5)).isEqualTo(2);
        assertThat(count(halves, -2.5)).isEqualTo(-2);
        assertThat(Double.doubleToRawLongBits(count(halves, -0.4))).isZero();
        assertThat(count(scale("2.6", "0.00001", Precision.COARSE), 2.61776)).isEqualTo(1776);
    }

    @Test
    void offsetComesOffBeforeTheDivision() {
        // At a half x/step − offset/step rounds the other way: 10 where (x − offset)/step gives 9.
        assertThat(count(scale("0.3", "0.1", Precision.COARSE), 1.25)).isEqualTo(9);
        assertThat(count(scale("1.5", "1", Precision.COARSE), 3.0)).isEqualTo(2);
        assertThat(count(scale("-10", "0.25", Precision.COARSE), 0)).isEqualTo(40);
    }

    @Test
    void limitsHoldAtTheirEdges() {
        for (Precision precision : Precision.values()) {
            CountScale scale = scale("0", "1", precision);
            double limit = precision == Precision.COARSE ? 0x1p21 : 0x1p43 - 0x1p21;
            double[] counts = new double[1];
            for (double sign : new double[] {1, -1}) {
                assertThat(scale.toCounts(new double[] {sign * (limit - 1)}, 0, counts, 0))
                        .isEqualTo(-1);
                assertThat(counts[0]).isEqualTo(sign * (limit - 1));
                assertThat(scale.toCounts(new double[] {sign * limit}, 0, counts, 0))
                        .isZero();
            }
        }
    }

    @Test
    void namesTheFirstChannelThatCannotBeCounted() {
        CountScale scale = CountScale.uniform(4, BigDecimal.ZERO, BigDecimal.ONE, Precision.COARSE);
        double[] counts = new double[6];
        assertThat(scale.toCounts(new double[] {9, 1, 2, 3, 4, 9}, 1, counts, 2))
                .isEqualTo(-1);
        assertThat(counts).containsExactly(0, 0, 1, 2, 3, 4);
        assertThat(scale.toCounts(new double[] {1, 2, Double.NaN, 1e9}, 0, counts, 0))
                .isEqualTo(2);
        assertThat(scale.toCounts(new double[] {1, Double.NEGATIVE_INFINITY, 0, 0}, 0, counts, 0))
                .isEqualTo(1);
        assertThat(scale.toCounts(new double[] {1, 2, 3, 1e9}, 0, counts, 0)).isEqualTo(3);
    }

    @Test
    void explainsWithReasonValueAndLimit() {
        CountScale scale = scale("10", "0.5", Precision.COARSE);
        HeadTrouble trouble = new HeadTrouble();
        scale.explain(0, -2e6, trouble);
        assertThat(trouble.reason()).isEqualTo(QuarantineReason.OFF_SCALE);
        assertThat(trouble.limit()).isEqualTo(10 - 0.5 * 0x1p21);
        assertThat(trouble.message()).isEqualTo("off scale, channel 1, found -2000000.0, limit -1048566.0");
        scale.explain(0, Double.NaN, trouble);
        assertThat(trouble.reason()).isEqualTo(QuarantineReason.NON_FINITE);
        assertThat(trouble.message()).isEqualTo("non finite, channel 1, found NaN");
    }

    @Test
    void decimalsComeBackFromTheirCounts() {
        long seed = 5L;
        System.out.println("seed " + seed);
        Random random = new Random(seed);
        for (int i = 0; i < 100_000; i++) {
            int places = random.nextInt(7);
            int whole = random.nextInt(4_000_000) - 2_000_000;
            double x = BigDecimal.valueOf(whole, places).doubleValue();
            CountScale scale = scale("0", BigDecimal.ONE.movePointLeft(places).toPlainString(), Precision.COARSE);
            assertThat(count(scale, x)).isEqualTo(whole);
        }
    }

    @Test
    void jsonComesBackAndPrecisionIsNotInTheFingerprint() {
        CountScale scale = CountScale.of(List.of(
                new ChannelScale(new BigDecimal("2.60"), new BigDecimal("0.00001"), Precision.COARSE),
                new ChannelScale(new BigDecimal("1E+3"), new BigDecimal("10"), Precision.FINE)));
        assertThat(CountScale.fromJson(scale.json())).isEqualTo(scale);
        assertThat(scale.json().toString())
                .isEqualTo("{\"channels\":[{\"offset\":\"2.6\",\"step\":\"0.00001\",\"precision\":\"coarse\"},"
                        + "{\"offset\":\"1000\",\"step\":\"10\",\"precision\":\"fine\"}]}");
        assertThat(scale("1.0", "0.10", Precision.COARSE).fingerprint())
                .isEqualTo(scale("1", "0.1", Precision.FINE).fingerprint())
                .isNotEqualTo(scale("1", "0.01", Precision.FINE).fingerprint())
                .isNotEqualTo(scale("1.1", "0.1", Precision.FINE).fingerprint());
        assertThat(scale.fineChannels()).containsExactly(false, true);
        assertThat(scale.value(1, 7)).isEqualTo(1070);
    }

    @Test
    void differencesNameTheFields() {
        CountScale here = CountScale.uniform(12, new BigDecimal("1"), new BigDecimal("0.001"), Precision.COARSE);
        java.util.ArrayList<ChannelScale> scales = new java.util.ArrayList<>();
        for (int c = 0; c < 12; c++) {
            scales.add(here.channel(c));
        }
        scales.set(11, new ChannelScale(new BigDecimal("1.0"), new BigDecimal("0.0001"), Precision.FINE));
        assertThat(here.differences(CountScale.of(scales)))
                .containsExactly("channel 12 step: 0.001 here, 0.0001 there");
        scales.set(0, new ChannelScale(new BigDecimal("-2"), new BigDecimal("0.001"), Precision.COARSE));
        assertThat(here.differences(CountScale.of(scales)))
                .containsExactly("channel 1 offset: 1 here, -2 there", "channel 12 step: 0.001 here, 0.0001 there");
        assertThat(here.differences(here)).isEmpty();
        assertThat(here.differences(scale("0", "1", Precision.FINE))).containsExactly("channels: 12 here, 1 there");
    }

    @Test
    void refusesNonsense() {
        assertThatThrownBy(() -> scale("0", "0", Precision.COARSE))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("above 0");
        assertThatThrownBy(() -> scale("0", "-1", Precision.COARSE)).isInstanceOf(Fault.class);
        assertThatThrownBy(() -> scale("0", "1e-400", Precision.COARSE)).isInstanceOf(Fault.class);
        assertThatThrownBy(() -> scale("1e400", "1", Precision.COARSE)).isInstanceOf(Fault.class);
        ObjectNode bad = (ObjectNode) scale("0", "1", Precision.COARSE).json();
        ((ObjectNode) bad.path("channels").get(0)).put("step", "one");
        assertThatThrownBy(() -> CountScale.fromJson(bad))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("channel 1");
        ((ObjectNode) bad.path("channels").get(0)).put("step", "1").put("precision", "finest");
        assertThatThrownBy(() -> CountScale.fromJson(bad)).isInstanceOf(Fault.class);
        bad.putArray("channels");
        assertThatThrownBy(() -> CountScale.fromJson(bad)).isInstanceOf(Fault.class);
    }

    @Test
    void travelsSerialised() throws IOException, ClassNotFoundException {
        CountScale scale = scale("2.5", "0.01", Precision.FINE);
        ByteArrayOutputStream bytes = new ByteArrayOutputStream();
        try (ObjectOutputStream out = new ObjectOutputStream(bytes)) {
            out.writeObject(scale);
        }
        try (ObjectInputStream in = new ObjectInputStream(new ByteArrayInputStream(bytes.toByteArray()))) {
            assertThat(in.readObject()).isEqualTo(scale);
        }
    }
}
