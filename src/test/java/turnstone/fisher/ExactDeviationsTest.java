package turnstone.fisher;

import static org.assertj.core.api.Assertions.assertThat;

import java.math.BigDecimal;
import java.math.BigInteger;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.api.Test;
import turnstone.measure.CountScale;
import turnstone.measure.Precision;
import turnstone.moments.BlockKernels;
import turnstone.moments.KernelChoice;
import turnstone.moments.Moments;
import turnstone.moments.RowFolder;

/** Scatter of small and of wide sums against {@link BigInteger}, rounded as {@link DoubleDouble#of(BigInteger)} rounds. */
class ExactDeviationsTest {
    private static final int CHANNELS = 5;

    /** Counts about a mean, so that n·P and s·s agree in many digits, or none. */
    private static Moments moments(Random random, int records, long mean, long spread, boolean fine) {
        boolean[] marks = new boolean[CHANNELS];
        Arrays.fill(marks, fine);
        RowFolder folder = new RowFolder(CHANNELS, marks, BlockKernels.choose(KernelChoice.SCALAR), 64);
        double[] counts = new double[CHANNELS];
        for (int r = 0; r < records; r++) {
            for (int c = 0; c < CHANNELS; c++) {
                counts[c] = (c % 2 == 0 ? mean : -mean) + Math.rint((random.nextDouble() - 0.5) * 2 * spread);
            }
            folder.add(counts, 0);
        }
        return folder.snapshot();
    }

    private static void assertRoundedOnce(Moments moments) {
        LowerRows rows = ExactDeviations.scatter(moments);
        double n = moments.records();
        for (int i = 0; i < CHANNELS; i++) {
            double[] high = new double[i + 1];
            double[] low = new double[i + 1];
            for (int j = 0; j <= i; j++) {
                DoubleDouble exact = DoubleDouble.of(moments.scatter(i, j));
                high[j] = exact.high();
                low[j] = exact.low();
            }
            Kernels.divide(n, high, low, 0, i + 1);
            assertThat(rows.high[i]).containsExactly(high);
            assertThat(rows.low[i]).containsExactly(low);
        }
    }

    @Test
    void scatterIsRoundedOnceWhateverTheSizeOfTheSums() {
        long seed = 20_261_201;
        Random random = new Random(seed);
        for (int round = 0; round < 200; round++) {
            boolean fine = round % 4 == 3;
            long limit = fine ? (1L << 43) - (1L << 21) - 1 : (1L << 21) - 1;
            long spread = 1 + (long) (random.nextDouble() * (limit >> random.nextInt(fine ? 40 : 20)) / 2);
            long mean = (long) ((limit - spread) * random.nextDouble());
            assertRoundedOnce(moments(random, 1 + random.nextInt(90), mean, spread, fine));
        }
    }

    @Test
    void aScatterOfNoSpreadIsZeroWithoutSign() {
        LowerRows rows = ExactDeviations.scatter(moments(new Random(1), 7, 12_345, 0, false));
        for (int i = 0; i < CHANNELS; i++) {
            for (int j = 0; j <= i; j++) {
                assertThat(Double.doubleToRawLongBits(rows.high[i][j])).isZero();
                assertThat(Double.doubleToRawLongBits(rows.low[i][j])).isZero();
            }
        }
    }

    @Test
    void aFitHasTheSameNumbersWithAMemoAndWithout() {
        Random random = new Random(3);
        List<List<Cell>> cells = new ArrayList<>();
        for (int k = 0; k < 3; k++) {
            List<Cell> ofMaterial = new ArrayList<>();
            for (int i = 0; i < 4; i++) {
                // Two of the four have one weight, so that cells are added too.
                Moments cell = moments(random, i < 2 ? 30 : 40 + i, 1000L * k, 900, false);
                ofMaterial.add(new Cell(cell, 40.0 / cell.records()));
            }
            cells.add(ofMaterial);
        }
        CountScale scale = CountScale.uniform(CHANNELS, BigDecimal.ZERO, new BigDecimal("0.001"), Precision.COARSE);
        FitRequest request = FitRequest.of(List.of("a", "b", "c"), cells, scale);
        ScatterMemo memo = new ScatterMemo(1 << 20);
        Fit without = Fit.of(request);
        Fit first = Fit.of(request, memo);
        Fit again = Fit.of(request, memo);
        assertThat(first.fisherRatios()).containsExactly(without.fisherRatios());
        assertThat(again.fisherRatios()).containsExactly(without.fisherRatios());
        assertThat(first.axes()).isDeepEqualTo(without.axes());
        assertThat(again.axes()).isDeepEqualTo(without.axes());
        Moments one = cells.get(0).get(0).moments();
        Moments other = cells.get(0).get(1).moments();
        assertThat(memo.of(one)).isSameAs(memo.of(one));
        assertThat(memo.plus(one, other)).isSameAs(memo.plus(one, other)).isEqualTo(one.plus(other));
        assertThat(new ScatterMemo(0).of(one)).isNotSameAs(new ScatterMemo(0).of(one));
    }

    @Test
    void theOracleRoundsToNearest() {
        BigInteger value = BigInteger.ONE.shiftLeft(80).add(BigInteger.valueOf(3));
        DoubleDouble rounded = DoubleDouble.of(value);
        assertThat(rounded.high()).isEqualTo(0x1p80);
        assertThat(rounded.low()).isEqualTo(3);
    }
}
