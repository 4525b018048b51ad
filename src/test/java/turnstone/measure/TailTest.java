package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import java.math.BigInteger;
import java.util.Random;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.json.Json;

class TailTest {
    @Test
    void identityPassesThrough() {
        Tail tail = Tail.identity(3);
        assertThat(tail.isIdentity()).isTrue();
        assertThat(tail.apply(new double[] {1, 2, 3})).containsExactly(1, 2, 3);
        assertThat(Tail.of(TailSpec.none(), 3).isIdentity()).isTrue();
        assertThat(Tail.of(TailSpec.of(new TailSpec.Bins(1)), 3).isIdentity()).isTrue();
        assertThat(Tail.of(TailSpec.of(new TailSpec.Mask(1, 1)), 3).isIdentity())
                .isFalse();
        assertThat(Tail.of(TailSpec.of(new TailSpec.SavitzkyGolay(1, 0, 0)), 3).isIdentity())
                .isTrue();
    }

    @Test
    void binsAreMeansAndTheLastOneOfWhatIsLeft() {
        Tail tail = Tail.of(TailSpec.of(new TailSpec.Bins(3)), 8);
        assertThat(tail.outputs()).isEqualTo(3);
        assertThat(tail.apply(new double[] {1, 2, 6, 4, 4, 4, 5, 8})).containsExactly(3, 4, 6.5);
        assertThat(tail.columns(2)).containsExactly(6, 7);
        assertThat(tail.numerators(2)).containsExactly(1, 1);
        assertThat(tail.denominator(2)).isEqualTo(2);
    }

    @Test
    void masksDropARun() {
        Tail tail = Tail.of(TailSpec.of(new TailSpec.Mask(0, 0), new TailSpec.Mask(1, 2)), 5);
        assertThat(tail.apply(new double[] {1, 2, 3, 4, 5})).containsExactly(2, 5);
    }

    @Test
    void smoothingDropsTheEndsAndSkipsZeroWeights() {
        Tail tail = Tail.of(TailSpec.of(new TailSpec.SavitzkyGolay(5, 2, 1)), 7);
        assertThat(tail.outputs()).isEqualTo(3);
        assertThat(tail.columns(1)).containsExactly(1, 2, 4, 5);
        assertThat(tail.numerators(1)).containsExactly(-2, -1, 1, 2);
        assertThat(tail.denominator(1)).isEqualTo(10);
        assertThat(tail.apply(new double[] {0, 1, 2, 3, 4, 5, 6})).containsExactly(1, 1, 1);
    }

    @Test
    void stepsComposeInTheirOrderHandWorked() {
        // Difference of neighbours two apart, halved: (x2 − x0)/2, … then means of two: (x3 + x2 − x1 − x0)/4.
        Tail tail = Tail.of(TailSpec.of(new TailSpec.SavitzkyGolay(3, 1, 1), new TailSpec.Bins(2)), 6);
        assertThat(tail.outputs()).isEqualTo(2);
        assertThat(tail.columns(0)).containsExactly(0, 1, 2, 3);
        assertThat(tail.numerators(0)).containsExactly(-1, -1, 1, 1);
        assertThat(tail.denominator(0)).isEqualTo(4);
        // The other way round: bins first leave three channels, one difference of their ends.
        Tail turned = Tail.of(TailSpec.of(new TailSpec.Bins(2), new TailSpec.SavitzkyGolay(3, 1, 1)), 6);
        assertThat(turned.outputs()).isEqualTo(1);
        assertThat(turned.columns(0)).containsExactly(0, 1, 4, 5);
        assertThat(turned.denominator(0)).isEqualTo(4);
    }

    @Test
    void composedEqualsOneAfterTheOtherExactly() {
        long seed = 17L;
        System.out.println("seed " + seed);
        Random random = new Random(seed);
        TailSpec.Step[] steps = {
            new TailSpec.SavitzkyGolay(7, 3, 0),
            new TailSpec.Mask(4, 6),
            new TailSpec.SavitzkyGolay(5, 2, 1),
            new TailSpec.Bins(3)
        };
        int d = 40;
        BigInteger[] x = new BigInteger[d];
        for (int c = 0; c < d; c++) {
            x[c] = BigInteger.valueOf(random.nextInt());
        }
        Tail whole = Tail.of(TailSpec.of(steps), d);
        Fraction[] stepwise = new Fraction[d];
        for (int c = 0; c < d; c++) {
            stepwise[c] = new Fraction(x[c], BigInteger.ONE);
        }
        for (TailSpec.Step step : steps) {
            Tail one = Tail.of(TailSpec.of(step), stepwise.length);
            stepwise = apply(one, stepwise);
        }
        BigInteger[] numerators = whole.applyExactly(x);
        assertThat(numerators).hasSize(stepwise.length);
        double[] doubles = whole.apply(
                java.util.Arrays.stream(x).mapToDouble(BigInteger::doubleValue).toArray());
        for (int i = 0; i < numerators.length; i++) {
            Fraction exact = new Fraction(numerators[i], BigInteger.valueOf(whole.denominator(i)));
            assertThat(exact).isEqualTo(stepwise[i]);
            // 40 terms of size 2^31 with weights below 1: far below 1e-3.
            assertThat(doubles[i])
                    .isCloseTo(
                            exact.numerator().doubleValue()
                                    / exact.denominator().doubleValue(),
                            within(1e-4));
        }
    }

    private static Fraction[] apply(Tail tail, Fraction[] x) {
        Fraction[] result = new Fraction[tail.outputs()];
        for (int i = 0; i < result.length; i++) {
            Fraction sum = Fraction.ZERO;
            for (int k = 0; k < tail.columns(i).length; k++) {
                sum = sum.plus(x[tail.columns(i)[k]].times(Fraction.of(tail.numerators(i)[k], tail.denominator(i))));
            }
            result[i] = sum;
        }
        return result;
    }

    @Test
    void refusesWhatDoesNotFitWithTheReason() {
        refused(() -> Tail.of(TailSpec.of(new TailSpec.SavitzkyGolay(9, 2, 1)), 8), "window longer than the channels");
        refused(
                () -> Tail.of(TailSpec.of(new TailSpec.Mask(0, 1), new TailSpec.SavitzkyGolay(9, 2, 1)), 10),
                "window 9, channels 8");
        refused(() -> new TailSpec.SavitzkyGolay(4, 2, 0), "odd");
        refused(() -> new TailSpec.SavitzkyGolay(-1, 0, 0), "odd");
        refused(() -> new TailSpec.SavitzkyGolay(5, 5, 0), "order must be below the window");
        refused(() -> new TailSpec.SavitzkyGolay(5, 2, 3), "0 everywhere");
        refused(() -> new TailSpec.Bins(0), "at least one channel");
        refused(() -> Tail.of(TailSpec.of(new TailSpec.Bins(4)), 3), "wider than the channels");
        refused(() -> Tail.of(TailSpec.of(new TailSpec.Mask(0, 2)), 3), "leaves no channel");
        refused(() -> Tail.of(TailSpec.of(new TailSpec.Mask(1, 3)), 3), "beyond the channels");
        refused(() -> new TailSpec.Mask(2, 1), "not one");
        refused(
                () -> Tail.of(
                        TailSpec.of(new TailSpec.SavitzkyGolay(101, 12, 0), new TailSpec.SavitzkyGolay(101, 12, 0)),
                        300),
                "pass 63 bits");
    }

    private static void refused(org.assertj.core.api.ThrowableAssert.ThrowingCallable call, String reason) {
        assertThatThrownBy(call).isInstanceOf(Fault.class).hasMessageContaining(reason);
    }

    @Test
    void jsonComesBack() {
        TailSpec spec = TailSpec.of(new TailSpec.SavitzkyGolay(7, 2, 1), new TailSpec.Bins(2), new TailSpec.Mask(0, 4));
        assertThat(spec.json().toString())
                .isEqualTo("{\"steps\":[{\"step\":\"savitzky-golay\",\"window\":7,\"order\":2,\"derivative\":1},"
                        + "{\"step\":\"bins\",\"width\":2},{\"step\":\"mask\",\"fromChannel\":1,\"toChannel\":5}]}");
        assertThat(TailSpec.fromJson(spec.json())).isEqualTo(spec);
        assertThat(spec.fingerprint()).isNotEqualTo(TailSpec.none().fingerprint());
        assertThatThrownBy(() -> TailSpec.fromJson(Json.object()
                        .set("steps", Json.array().add(Json.object().put("step", "wavelet")))))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("wavelet");
        assertThatThrownBy(() -> TailSpec.fromJson(Json.object())).isInstanceOf(Fault.class);
        assertThatThrownBy(() -> TailSpec.fromJson(Json.object()
                        .set(
                                "steps",
                                Json.array()
                                        .add(Json.object()
                                                .put("step", "bins")
                                                .put("width", 2)
                                                .put("wide", 1)))))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("wide");
    }
}
