package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;

class ReferenceTableTest {
    private static final double[] ONE = {1};

    @Test
    void refusesTheSameReferenceTwice() {
        ReferenceTable.Builder builder = ReferenceTable.builder()
                .add(ReferenceKind.WHITE, "ruff", 3, 50, ONE)
                .add(ReferenceKind.DARK, "ruff", 3, 50, ONE)
                .add(ReferenceKind.WHITE, "ruff", 4, 50, ONE)
                .add(ReferenceKind.WHITE, "dunlin", 3, 50, ONE);
        assertThat(builder.build().holds("ruff")).isTrue();
        builder.add(ReferenceKind.WHITE, "ruff", 3, 50, ONE);
        assertThatThrownBy(builder::build)
                .isInstanceOf(Fault.class)
                .hasMessageContaining("white of ruff belt column 3 at 50 ms");
    }

    @Test
    void refusesValuesThatAreNotFinite() {
        assertThatThrownBy(() ->
                        ReferenceTable.builder().add(ReferenceKind.DARK, "ruff", 0, 0, new double[] {1, Double.NaN}))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("channel 2");
    }

    @Test
    void aSpanOfTimeKeepsItsOwnReferencesOnly() {
        ReferenceTable table = ReferenceTable.builder()
                .add(ReferenceKind.WHITE, "ruff", 0, 30, ONE)
                .add(ReferenceKind.WHITE, "ruff", 0, 10, ONE)
                .add(ReferenceKind.WHITE, "ruff", 0, 20, ONE)
                .add(ReferenceKind.WHITE, "knot", 0, 5, ONE)
                .build();
        ReferenceTable within = table.within(10, 30);
        assertThat(within.of("ruff").get(0).size()).isEqualTo(2);
        assertThat(within.of("ruff").get(0).span(9)).isEqualTo(-1);
        assertThat(within.of("ruff").get(0).span(10)).isZero();
        assertThat(within.of("ruff").get(0).span(99)).isEqualTo(1);
        assertThat(within.holds("knot")).isFalse();
    }

    @Test
    void valuesAreCopied() {
        double[] values = {5};
        ReferenceTable table = ReferenceTable.builder()
                .add(ReferenceKind.WHITE, "ruff", 0, 0, values)
                .build();
        values[0] = 7;
        assertThat(table.of("ruff").get(0).white(0)).containsExactly(5);
    }
}
