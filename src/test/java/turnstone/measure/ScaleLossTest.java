package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.math.BigDecimal;
import java.util.Random;
import org.junit.jupiter.api.Test;

class ScaleLossTest {
    private static CountScale scale(String offset, String step) {
        return CountScale.uniform(2, new BigDecimal(offset), new BigDecimal(step), Precision.FINE);
    }

    private static ScaleLoss loss(CountScale scale, SourceType type, double[]... records) {
        ScaleLoss loss = new ScaleLoss(scale, type);
        double[] counts = new double[2];
        for (double[] record : records) {
            assertThat(scale.toCounts(record, 0, counts, 0)).isEqualTo(-1);
            loss.add(record, 0, counts, 0);
        }
        return loss;
    }

    @Test
    void judgesByTheRoundTripAndNotByStepTimesCount() {
        // 3·0.1 is 0.30000000000000004 in doubles, yet 0.3 is held.
        ScaleLoss loss = loss(scale("0", "0.1"), SourceType.DECIMAL, new double[] {0.3, 0.7});
        assertThat(loss.isLossless()).isTrue();
        assertThat(loss.largestDistance()).isZero();
        assertThat(loss(scale("0", "0.1"), SourceType.DECIMAL, new double[] {0.3, 0.1 + 0.2})
                        .isLossless())
                .isFalse();
    }

    @Test
    void floatsAreJudgedAsFloats() {
        double[] record = {0.1f, 2.61776f};
        assertThat(loss(scale("0", "0.00001"), SourceType.FLOAT, record).isLossless())
                .isTrue();
        assertThat(loss(scale("0", "0.00001"), SourceType.DOUBLE, record).isLossless())
                .isFalse();
    }

    @Test
    void distanceAndShareOfAHandWorkedCase() {
        CountScale scale = scale("1", "0.5");
        ScaleLoss first = loss(scale, SourceType.DOUBLE, new double[] {1.5, 2}, new double[] {1.625, 2});
        ScaleLoss second = loss(scale, SourceType.DOUBLE, new double[] {1, 2.2}, new double[] {3, 4});
        first.merge(second);
        assertThat(first.records()).isEqualTo(4);
        assertThat(first.recordsHeld()).isEqualTo(2);
        assertThat(first.shareHeld()).isEqualTo(0.5);
        assertThat(first.largestDistance(0)).isEqualTo(0.25);
        assertThat(first.largestDistance(1)).isCloseTo(0.4, org.assertj.core.data.Offset.offset(1e-15));
        assertThat(first.json().path("recordsHeld").asLong()).isEqualTo(2);
        assertThatThrownBy(() -> first.merge(new ScaleLoss(scale("0", "1"), SourceType.DOUBLE)))
                .isInstanceOf(IllegalArgumentException.class);
        assertThat(new ScaleLoss(scale, SourceType.DOUBLE).shareHeld()).isEqualTo(1);
    }

    @Test
    void theStatedSizesAreHeldWithoutLoss() {
        long seed = 123L;
        System.out.println("seed " + seed);
        Random random = new Random(seed);
        for (int i = 0; i < 20_000; i++) {
            int places = random.nextInt(12);
            BigDecimal step = BigDecimal.ONE.movePointLeft(places);
            BigDecimal offset = step.multiply(BigDecimal.valueOf(random.nextLong() >> 15));
            BigDecimal x = offset.add(step.multiply(BigDecimal.valueOf(random.nextLong() >> 23)));
            if (Math.abs(x.doubleValue()) >= step.doubleValue() * 0x1p49) {
                continue;
            }
            CountScale scale = scale(offset.toPlainString(), step.toPlainString());
            double[] record = {x.doubleValue(), offset.doubleValue()};
            assertThat(loss(scale, SourceType.DECIMAL, record).isLossless())
                    .as("%s of %s by %s", x, offset, step)
                    .isTrue();
        }
    }

    @Test
    void oddScalesAreJudgedByExactDecimals() {
        // 30 places: beyond what a double division decides.
        CountScale scale = scale("0", "0.000000000000000000000000000001");
        assertThat(loss(scale, SourceType.DECIMAL, new double[] {3e-30, 7e-29}).isLossless())
                .isTrue();
        assertThat(loss(scale, SourceType.DECIMAL, new double[] {3.5e-30, 7e-29})
                        .largestDistance())
                .isEqualTo(0.5);
    }
}
