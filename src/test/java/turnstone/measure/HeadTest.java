package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.io.ByteArrayInputStream;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.ObjectInputStream;
import java.io.ObjectOutputStream;
import java.time.LocalDate;
import java.util.List;
import java.util.Random;
import java.util.Set;
import org.junit.jupiter.api.Test;

/** Each step of the head against values worked by hand. */
class HeadTest {
    private static final LocalDate DAY = LocalDate.of(2026, 3, 1);
    private static final Instrument FOUR = Instrument.of("avocet", DAY, new double[] {900, 910, 920, 930});

    private final HeadTrouble trouble = new HeadTrouble();

    private double[] accepted(Head head, double... raw) {
        double[] out = new double[head.outputs()];
        assertThat(head.apply(raw, 0, 7, 5_000, out, 0, trouble)).isEqualTo(HeadOutcome.ACCEPTED);
        return out;
    }

    private static ReferenceTable references() {
        return ReferenceTable.builder()
                .add(ReferenceKind.DARK, "avocet", 7, 1_000, new double[] {100, 100, 200, 0})
                .add(ReferenceKind.WHITE, "avocet", 7, 2_000, new double[] {1100, 2100, 1200, 500})
                .add(ReferenceKind.WHITE, "avocet", 7, 4_000, new double[] {1100, 4100, 1200, 500})
                .add(ReferenceKind.WHITE, "avocet", 7, 6_000, new double[] {9000, 9000, 9000, 9000})
                .build();
    }

    @Test
    void noStepPassesValuesThroughAtTheirPlaces() {
        Head head = Head.of(HeadSpec.none(3), null, null);
        double[] out = {9, 9, 9, 9, 9};
        assertThat(head.apply(new double[] {0, 1, -2.5, 1e300}, 1, 0, 0, out, 2, trouble))
                .isEqualTo(HeadOutcome.ACCEPTED);
        assertThat(out).containsExactly(9, 9, 1, -2.5, 1e300);
    }

    @Test
    void correctsByTheNearestEarlierReferences() {
        Head head = Head.of(HeadSpec.builder(4).correct(10_000).build(), FOUR, references());
        // (600 − 100)/1000, (2100 − 100)/4000, (200 − 200)/1000, (125 − 0)/500: the white of 4000 ms, not 2000 or 6000.
        assertThat(accepted(head, 600, 2100, 200, 125)).containsExactly(0.5, 0.5, 0, 0.25);
        double[] out = new double[4];
        head.apply(new double[] {600, 2100, 200, 125}, 0, 7, 3_999, out, 0, trouble);
        assertThat(out).containsExactly(0.5, 1, 0, 0.25);
        // A reference serves from its own time on.
        head.apply(new double[] {600, 2100, 200, 125}, 0, 7, 4_000, out, 0, trouble);
        assertThat(out[1]).isEqualTo(0.5);
    }

    @Test
    void resamplesLinearlyToTheAxis() {
        HeadSpec spec = HeadSpec.builder(5)
                .axis(new double[] {900, 902.5, 915, 920, 930}, Resampling.FROM_INSTRUMENT)
                .build();
        Head head = Head.of(spec, FOUR, null);
        assertThat(head.inputs()).isEqualTo(4);
        assertThat(accepted(head, 1, 2, 4, 10)).containsExactly(1, 1.25, 3, 4, 10);
    }

    @Test
    void resamplingBridgesDeadChannelsAndDoesNotLookAtThem() {
        Instrument dead = Instrument.of("avocet", DAY, new double[] {900, 910, 920, 930}, Set.of(1), List.of());
        HeadSpec spec = HeadSpec.builder(2)
                .axis(new double[] {905, 910}, Resampling.FROM_INSTRUMENT)
                .build();
        assertThat(accepted(Head.of(spec, dead, null), 1, Double.NaN, 5, 10)).containsExactly(2, 3);
    }

    @Test
    void bandsOfBeltColumnsHaveMapsOfTheirOwn() {
        Instrument bent = Instrument.of(
                "avocet",
                DAY,
                new double[] {900, 910, 920, 930},
                Set.of(),
                List.of(new Instrument.Band(0, 9, new double[] {902, 912, 922, 932})));
        HeadSpec spec = HeadSpec.builder(2)
                .axis(new double[] {905, 917}, Resampling.FROM_INSTRUMENT)
                .build();
        Head head = Head.of(spec, bent, null);
        double[] raw = {0, 10, 20, 30};
        double[] out = new double[2];
        head.apply(raw, 0, 9, 0, out, 0, trouble);
        assertThat(out).containsExactly(new double[] {3, 15}, within(1e-14));
        head.apply(raw, 0, 10, 0, out, 0, trouble);
        assertThat(out).containsExactly(new double[] {5, 17}, within(1e-14));
    }

    @Test
    void theEdgeOfTheAxisMayPassByTheRoundingOfTables() {
        HeadSpec spec = HeadSpec.builder(2)
                .axis(new double[] {899.9995, 930.0005}, Resampling.FROM_INSTRUMENT)
                .build();
        assertThat(accepted(Head.of(spec, FOUR, null), 1, 2, 4, 10)).containsExactly(1, 10);
    }

    @Test
    void theFloorRaisesWhatIsBelow() {
        Head head = Head.of(HeadSpec.builder(4).floor(0.01).build(), null, null);
        assertThat(accepted(head, -0.5, 0.01, 0.5, 0)).containsExactly(0.01, 0.01, 0.5, 0.01);
    }

    @Test
    void meanReflectanceDecidesOnNoSignalAfterTheFloor() {
        Head head = Head.of(HeadSpec.builder(4).floor(0.125).noSignalBelow(0.25).build(), null, null);
        double[] out = new double[4];
        // Means 0.25 (at the level: accepted) and a shade below.
        assertThat(head.apply(new double[] {0.125, 0.125, 0.5, 0.25}, 0, 0, 0, out, 0, trouble))
                .isEqualTo(HeadOutcome.ACCEPTED);
        assertThat(head.apply(new double[] {0.125, 0.125, 0.5, 0.2499}, 0, 0, 0, out, 0, trouble))
                .isEqualTo(HeadOutcome.NO_SIGNAL);
        // −1 counts as the floor: mean 0.25.
        assertThat(head.apply(new double[] {-1, 0.125, 0.5, 0.25}, 0, 0, 0, out, 0, trouble))
                .isEqualTo(HeadOutcome.ACCEPTED);
    }

    @Test
    void noSignalIsToldByReflectanceAndNotByAbsorbance() {
        Head head = Head.of(
                HeadSpec.builder(3).floor(0.001).noSignalBelow(0.2).absorbance().build(), null, null);
        double[] out = new double[3];
        // Mean reflectance 0.1, mean absorbance 1.
        assertThat(head.apply(new double[] {0.1, 0.1, 0.1}, 0, 0, 0, out, 0, trouble))
                .isEqualTo(HeadOutcome.NO_SIGNAL);
        assertThat(head.apply(new double[] {0.9, 0.9, 0.9}, 0, 0, 0, out, 0, trouble))
                .isEqualTo(HeadOutcome.ACCEPTED);
    }

    @Test
    void absorbanceIsTheDecimalLogarithmOfOneOverR() {
        Head head = Head.of(HeadSpec.builder(4).floor(0.001).absorbance().build(), null, null);
        assertThat(accepted(head, 1, 0.1, 0.5, 0)).containsExactly(0, 1, 0.3010299956639812, 3);
    }

    @Test
    void masksByChannelAndByWavelengthBothEndsIncluded() {
        HeadSpec spec = HeadSpec.builder(6)
                .axis(new double[] {900, 910, 920, 930, 940, 950}, Resampling.NONE)
                .dropWavelengths(910, 920)
                .dropChannels(4, 4)
                .build();
        Head head = Head.of(spec, null, null);
        assertThat(spec.kept()).containsExactly(0, 3, 5);
        assertThat(accepted(head, 1, 2, 3, 4, 5, 6)).containsExactly(1, 4, 6);
        // A masked channel is never looked at.
        assertThat(accepted(head, 1, Double.NaN, 3, 4, Double.POSITIVE_INFINITY, 6))
                .containsExactly(1, 4, 6);
    }

    @Test
    void aMaskedRunAtTheEndsIsCopiedFromItsPlace() {
        Head head = Head.of(
                HeadSpec.builder(5).dropChannels(0, 1).dropChannels(4, 4).build(), null, null);
        assertThat(accepted(head, 1, 2, 3, 4, 5)).containsExactly(3, 4);
    }

    @Test
    void snvTakesTheMeanAndTheDeviationWithDivisorNLessOne() {
        Head head = Head.of(HeadSpec.builder(3).snv(1e-6).build(), null, null);
        // Mean 4, squares 4 + 0 + 4 over 2: deviation 2.
        assertThat(accepted(head, 2, 4, 6)).containsExactly(-1, 0, 1);
    }

    @Test
    void snvWithTooLittleSpreadIsNoSignal() {
        Head head = Head.of(HeadSpec.builder(3).snv(2).build(), null, null);
        double[] out = new double[3];
        assertThat(head.apply(new double[] {2, 4, 6}, 0, 0, 0, out, 0, trouble)).isEqualTo(HeadOutcome.ACCEPTED);
        assertThat(head.apply(new double[] {2.1, 4, 6}, 0, 0, 0, out, 0, trouble))
                .isEqualTo(HeadOutcome.NO_SIGNAL);
        assertThat(head.apply(new double[] {4, 4, 4}, 0, 0, 0, out, 0, trouble)).isEqualTo(HeadOutcome.NO_SIGNAL);
    }

    @Test
    void snvFollowsTheMask() {
        Head head = Head.of(HeadSpec.builder(4).dropChannels(0, 0).snv(1e-6).build(), null, null);
        assertThat(accepted(head, 1e6, 2, 4, 6)).containsExactly(-1, 0, 1);
    }

    @Test
    void theWholeChainEqualsItsStepsOneByOne() {
        HeadSpec spec = everything();
        Head head = Head.of(spec, FOUR, references());
        double[] raw = {600, 2100, 700, 125};
        double[] r = {0.5, 0.5, 0.5, 0.25};
        // Axis 905, 910, 915, 925 without 910: ½, ½ and ½ + ½·(¼ − ½).
        double[] resampled = {r[0] + 0.5 * (r[1] - r[0]), r[1] + 0.5 * (r[2] - r[1]), r[2] + 0.5 * (r[3] - r[2])};
        assertThat(resampled).containsExactly(0.5, 0.5, 0.375);
        double[] a = new double[3];
        for (int i = 0; i < 3; i++) {
            a[i] = LaneMath.absorbance(resampled[i]);
        }
        double mean = LaneMath.laneSum(a, 0, 3) / 3;
        for (int i = 0; i < 3; i++) {
            a[i] -= mean;
        }
        double spread = Math.sqrt(LaneMath.laneDot(a, 0, a, 0, 3) / 2);
        assertThat(accepted(head, raw)).containsExactly(a[0] / spread, a[1] / spread, a[2] / spread);
    }

    static HeadSpec everything() {
        return HeadSpec.builder(4)
                .axis(new double[] {905, 910, 915, 925}, Resampling.FROM_INSTRUMENT)
                .saturatedAt(4095)
                .deadAtOrBelow(0)
                .correct(10_000, 20_000)
                .floor(0.001)
                .noSignalBelow(0.01)
                .absorbance()
                .dropWavelengths(910, 911)
                .snv(1e-6)
                .build();
    }

    @Test
    void copiesAndSerialisedHeadsGiveTheSameBits() throws IOException, ClassNotFoundException {
        Head head = Head.of(everything(), FOUR, references());
        ByteArrayOutputStream bytes = new ByteArrayOutputStream();
        try (ObjectOutputStream out = new ObjectOutputStream(bytes)) {
            out.writeObject(head);
        }
        Head read;
        try (ObjectInputStream in = new ObjectInputStream(new ByteArrayInputStream(bytes.toByteArray()))) {
            read = (Head) in.readObject();
        }
        long seed = 21L;
        System.out.println("seed " + seed);
        Random random = new Random(seed);
        Head copy = head.copy();
        for (int i = 0; i < 1000; i++) {
            double[] raw = random.doubles(4, 201, 4000).toArray();
            double[] expected = accepted(head, raw);
            assertThat(accepted(copy, raw)).containsExactly(expected);
            assertThat(accepted(read, raw)).containsExactly(expected);
        }
    }
}
