package turnstone.moments;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatExceptionOfType;

import java.math.BigInteger;
import org.junit.jupiter.api.Test;

/** Each bound at its edge, against BigInteger. */
class BoundsTest {
    private static final BigInteger TWO = BigInteger.TWO;

    @Test
    void aTriangleHoldsTwoThousandAndFortyEightRecordsAndNoMore() {
        BigInteger exact = TWO.pow(53);
        BigInteger coarse = BigInteger.valueOf(Bounds.COARSE_LIMIT).pow(2);
        BigInteger half = BigInteger.valueOf(Bounds.LOW_LIMIT).pow(2);
        BigInteger records = BigInteger.valueOf(Bounds.TRIANGLE_RECORDS);
        assertThat(coarse.multiply(records)).isLessThanOrEqualTo(exact);
        assertThat(half.multiply(records)).isLessThanOrEqualTo(exact);
        assertThat(coarse.multiply(records.add(BigInteger.ONE))).isGreaterThan(exact);
    }

    @Test
    void aPanelHoldsItsRecordsWithAFactorOfTwoToSpare() {
        BigInteger most =
                BigInteger.valueOf(Bounds.LOW_LIMIT).pow(2).multiply(BigInteger.valueOf(Bounds.PANEL_RECORDS));
        assertThat(most.multiply(TWO)).isLessThanOrEqualTo(TWO.pow(63));
        assertThat(most.multiply(BigInteger.valueOf(4))).isGreaterThan(TWO.pow(63));
    }

    @Test
    void halvesOfEveryFineCountStayInRangeAndMakeItAgain() {
        long[] edges = {
            0,
            1,
            Bounds.LOW_LIMIT - 1,
            Bounds.LOW_LIMIT,
            Bounds.LOW_LIMIT + 1,
            3L << 21,
            1L << 22,
            Bounds.FINE_LIMIT - 1,
            Bounds.FINE_LIMIT
        };
        for (long edge : edges) {
            for (long count : new long[] {edge, -edge}) {
                assertThat(Bounds.high(count)).isBetween(-Bounds.LOW_LIMIT + 1, Bounds.LOW_LIMIT - 1);
                assertThat(Bounds.low(count)).isBetween(-Bounds.LOW_LIMIT, Bounds.LOW_LIMIT - 1);
                assertThat((Bounds.high(count) << 22) + Bounds.low(count)).isEqualTo(count);
            }
        }
        assertThat(Bounds.high(Bounds.FINE_LIMIT + 1)).as("one count more").isEqualTo(Bounds.LOW_LIMIT);
    }

    /** Real records, more than 64 bits could hold without emptying the panel (2^21 * 2^42 = 2^63), at the edges of fine counts: the low half of the last channel is -2^21. */
    @Test
    void sumsStayExactWhereThePanelIsEmptied() {
        double[] record = {Bounds.FINE_LIMIT, -Bounds.FINE_LIMIT, ((Bounds.LOW_LIMIT - 1) << 22) - Bounds.LOW_LIMIT};
        RowFolder folder = new RowFolder(3, CountSample.marks(3, true), BlockKernels.choose(KernelChoice.AUTO), 2048);
        long records = 2 * Bounds.PANEL_RECORDS + 5000;
        for (long k = 0; k < records; k++) {
            folder.add(record, 0);
        }
        assertThat(folder.records()).isEqualTo(records);
        assertRepeated(folder.snapshot(), record, records);
        assertThat(folder.bytes()).isLessThanOrEqualTo(RowFolder.bytes(3, 3, 2048));
    }

    @Test
    void wideSumsHoldTheMostRecordsAtTheLargestCountAndRefuseOneMore() {
        double[] record = {Bounds.FINE_LIMIT, -Bounds.FINE_LIMIT};
        RowFolder folder = new RowFolder(2, CountSample.marks(2, true), BlockKernels.choose(KernelChoice.SCALAR), 1);
        folder.add(record, 0);
        Moments one = folder.snapshot();
        Moments all = one;
        while (all.records() < Bounds.MOST_RECORDS) {
            all = all.plus(all);
        }
        assertThat(all.records()).isEqualTo(1L << 41);
        assertRepeated(all, record, all.records());
        assertThat(Moments.fromBytes(all.toBytes())).isEqualTo(all);
        Moments full = all;
        assertThatExceptionOfType(ArithmeticException.class).isThrownBy(() -> full.plus(one));
        assertThat(full.minus(one).plus(one)).isEqualTo(full);
        assertThat(BigInteger.valueOf(Bounds.MOST_RECORDS).multiply(TWO.pow(86)))
                .isEqualTo(TWO.pow(127));
    }

    @Test
    void wideSumsThrowRatherThanWrap() {
        WideSums sums = new WideSums(1);
        sums.set(0, Long.MAX_VALUE, -1);
        assertThatExceptionOfType(ArithmeticException.class).isThrownBy(() -> sums.add(0, 1));
        assertThat(sums.value(0)).isEqualTo(TWO.pow(127).subtract(BigInteger.ONE));
        WideSums least = new WideSums(1);
        least.set(0, Long.MIN_VALUE, 0);
        WideSums one = new WideSums(1);
        one.add(0, 1);
        assertThatExceptionOfType(ArithmeticException.class).isThrownBy(() -> least.subtractAll(one));
        assertThatExceptionOfType(ArithmeticException.class).isThrownBy(() -> least.add(0, -1));
    }

    @Test
    void theWidestMomentsFitAnArray() {
        long channels = Bounds.MOST_CHANNELS;
        assertThat(16 * (channels * (channels + 1) / 2 + channels) + 24).isLessThan(Integer.MAX_VALUE - 8);
        assertThat(2 * channels * (2 * channels + 1) / 2).isEqualTo(Bounds.triangle(2 * Bounds.MOST_CHANNELS));
    }

    private static void assertRepeated(Moments moments, double[] record, long records) {
        for (int i = 0; i < record.length; i++) {
            BigInteger count = BigInteger.valueOf((long) record[i]);
            assertThat(moments.sum(i)).isEqualTo(count.multiply(BigInteger.valueOf(records)));
            for (int j = 0; j <= i; j++) {
                BigInteger other = BigInteger.valueOf((long) record[j]);
                assertThat(moments.product(i, j))
                        .isEqualTo(count.multiply(other).multiply(BigInteger.valueOf(records)));
                assertThat(moments.scatter(i, j)).isZero();
            }
        }
    }
}
