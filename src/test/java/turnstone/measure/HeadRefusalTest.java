package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.time.LocalDate;
import java.util.List;
import java.util.Set;
import org.assertj.core.api.ThrowableAssert.ThrowingCallable;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;

/** Every senseless combination is refused, each with its reason. */
class HeadRefusalTest {
    private static final LocalDate DAY = LocalDate.of(2026, 3, 1);
    private static final double[] AXIS = {900, 910, 920};
    private static final Instrument THREE = Instrument.of("knot", DAY, AXIS);

    private static void refused(ThrowingCallable call, String reason) {
        assertThatThrownBy(call)
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.USAGE))
                .hasMessageContaining(reason);
    }

    @Test
    void logarithms() {
        refused(
                () -> HeadSpec.builder(3)
                        .input(InputKind.COUNTS)
                        .floor(0.1)
                        .absorbance()
                        .build(),
                "log10(1/R) needs a reflectance, and counts with no white are none");
        refused(
                () -> HeadSpec.builder(3)
                        .saturatedAt(4095)
                        .floor(0.1)
                        .absorbance()
                        .build(),
                "counts with no white");
        refused(
                () -> HeadSpec.builder(3)
                        .input(InputKind.ABSORBANCE)
                        .absorbance()
                        .build(),
                "the logarithm of what is a logarithm already");
        refused(() -> HeadSpec.builder(3).input(InputKind.VALUES).absorbance().build(), "needs a reflectance");
        refused(() -> HeadSpec.builder(3).absorbance().build(), "needs a floor");
    }

    @Test
    void reflectanceLevels() {
        refused(() -> HeadSpec.builder(3).input(InputKind.ABSORBANCE).floor(0.1).build(), "are reflectances");
        refused(() -> HeadSpec.builder(3).saturatedAt(9).noSignalBelow(0.1).build(), "are reflectances");
        refused(() -> HeadSpec.builder(3).floor(0.1).noSignalBelow(0.1).build(), "no record could be no signal");
        refused(() -> HeadSpec.builder(3).floor(0).build(), "floor must be above 0");
        refused(() -> HeadSpec.builder(3).noSignalBelow(-1).build(), "noSignalBelow must be above 0");
        refused(() -> HeadSpec.builder(3).floor(Double.NaN).build(), "floor must be a finite number");
        refused(() -> HeadSpec.builder(3).snv(0).build(), "snvSpreadFloor must be above 0");
    }

    @Test
    void counts() {
        refused(
                () -> HeadSpec.builder(3)
                        .input(InputKind.REFLECTANCE)
                        .correct(10)
                        .build(),
                "correct raw counts only");
        refused(
                () -> HeadSpec.builder(3)
                        .input(InputKind.VALUES)
                        .deadAtOrBelow(0)
                        .build(),
                "told by raw counts only");
        refused(() -> HeadSpec.builder(3).saturatedAt(5).deadAtOrBelow(5).build(), "every count would be");
        refused(() -> HeadSpec.builder(3).saturatedAt(Double.POSITIVE_INFINITY).build(), "finite");
        refused(() -> HeadSpec.builder(3).correct(0).build(), "above 0 ms");
        refused(() -> HeadSpec.builder(3).correct(10, -1).build(), "above 0 ms");
    }

    @Test
    void axesAndMasks() {
        refused(() -> HeadSpec.builder(0).build(), "at least one channel");
        refused(
                () -> HeadSpec.builder(3)
                        .axis(new double[0], Resampling.FROM_INSTRUMENT)
                        .build(),
                "needs a wavelength axis");
        refused(() -> HeadSpec.builder(4).axis(AXIS, Resampling.NONE).build(), "another number of channels");
        refused(
                () -> HeadSpec.builder(3)
                        .axis(new double[] {900, 900, 910}, Resampling.NONE)
                        .build(),
                "must ascend");
        refused(() -> HeadSpec.builder(3).dropWavelengths(900, 910).build(), "mask by wavelength needs");
        refused(() -> HeadSpec.builder(3).dropChannels(0, 2).build(), "the mask leaves no channel");
        refused(() -> HeadSpec.builder(3).dropChannels(1, 3).build(), "found channels 2 to 4");
        refused(() -> HeadSpec.builder(3).dropChannels(2, 1).build(), "not one");
        refused(
                () -> HeadSpec.builder(3)
                        .axis(AXIS, Resampling.NONE)
                        .dropWavelengths(910, 900)
                        .build(),
                "not one");
        refused(() -> HeadSpec.builder(2).snv(1e-6).build(), "SNV on so few channels");
        refused(() -> HeadSpec.builder(3).dropChannels(0, 0).snv(1e-6).build(), "expected at least 3");
    }

    @Test
    void instrumentsThatDoNotFit() {
        HeadSpec resampled =
                HeadSpec.builder(3).axis(AXIS, Resampling.FROM_INSTRUMENT).build();
        refused(() -> Head.of(resampled, null, null), "needs the instrument's wavelength table");
        refused(
                () -> Head.of(resampled, Instrument.withoutWavelengths("knot", DAY, 3), null),
                "knot@2026-03-01 without one");
        refused(
                () -> Head.of(resampled, Instrument.of("knot", DAY, new double[] {900.002, 910, 920}), null),
                "the axis leaves the range of the instrument");
        refused(
                () -> Head.of(resampled, Instrument.of("knot", DAY, new double[] {900, 910, 919.998}), null),
                "expected 900.0 to 919.998 nm");
        refused(
                () -> Head.of(resampled, Instrument.of("knot", DAY, AXIS, Set.of(2), List.of()), null),
                "the axis leaves the range");
        refused(() -> Head.of(HeadSpec.none(4), THREE, null), "another number of channels");
        refused(
                () -> Head.of(HeadSpec.none(3), Instrument.of("knot", DAY, AXIS, Set.of(1), List.of()), null),
                "channel 2");
        refused(
                () -> Head.of(resampled, Instrument.of("knot", DAY, AXIS, Set.of(0, 1, 2), List.of()), null),
                "every channel is dead");
        // Masked ends need not be covered.
        HeadSpec masked = HeadSpec.builder(3)
                .axis(AXIS, Resampling.FROM_INSTRUMENT)
                .dropWavelengths(0, 905)
                .build();
        assertThat(Head.of(masked, Instrument.of("knot", DAY, new double[] {905, 910, 920}), null)
                        .outputs())
                .isEqualTo(2);
    }

    @Test
    void referencesThatDoNotFit() {
        HeadSpec corrected = HeadSpec.builder(3).correct(10).build();
        refused(() -> Head.of(corrected, THREE, null), "correction without references");
        refused(() -> Head.of(corrected, null, ReferenceTable.builder().build()), "no instrument");
        refused(() -> Head.of(corrected, THREE, ReferenceTable.builder().build()), "none of sorter knot");
        ReferenceTable longer = ReferenceTable.builder()
                .add(ReferenceKind.WHITE, "knot", 0, 0, new double[4])
                .build();
        assertThatThrownBy(() -> Head.of(corrected, THREE, longer))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("belt column 0");
        assertThat(Head.of(HeadSpec.none(3), THREE, longer).outputs()).isEqualTo(3);
    }

    @Test
    void instruments() {
        refused(() -> Instrument.of("knot", DAY, new double[] {910, 900}), "channel 2: wavelengths must ascend");
        refused(() -> Instrument.of("knot", DAY, new double[] {900, Double.NaN}), "must ascend");
        refused(() -> Instrument.of("knot", DAY, new double[0]), "empty wavelength table");
        refused(() -> Instrument.of("knot", DAY, AXIS, Set.of(3), List.of()), "found 4, expected 1 to 3");
        refused(() -> new Instrument.Band(3, 2, AXIS), "ends before it begins");
        Instrument.Band low = new Instrument.Band(0, 5, AXIS);
        refused(
                () -> Instrument.of("knot", DAY, AXIS, Set.of(), List.of(low, new Instrument.Band(5, 9, AXIS))),
                "column 5 in two bands");
        refused(
                () -> Instrument.of(
                        "knot", DAY, AXIS, Set.of(), List.of(new Instrument.Band(0, 1, new double[] {900, 910}))),
                "another number of wavelengths");
        assertThat(THREE.name()).isEqualTo("knot@2026-03-01");
    }
}
