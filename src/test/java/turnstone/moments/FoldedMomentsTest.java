package turnstone.moments;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatIllegalArgumentException;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;

/** What must hold for moments whichever kernel folds them. */
class FoldedMomentsTest {
    private static final String KERNELS = "SCALAR|VECTOR";

    @ParameterizedTest
    @EnumSource(mode = EnumSource.Mode.MATCH_ANY, names = KERNELS)
    void areWhatBigIntegersSay(KernelChoice choice) {
        BlockKernel kernel = BlockKernels.choose(choice);
        CountSample coarse = CountSample.drawn(1, 300, 11, Bounds.COARSE_LIMIT);
        coarse.assertMoments(coarse.fold(kernel, CountSample.marks(11, false), 64));
        CountSample fine = CountSample.drawn(2, 300, 7, Bounds.FINE_LIMIT);
        fine.assertMoments(fine.fold(kernel, CountSample.marks(7, true), 64));
    }

    @ParameterizedTest
    @EnumSource(mode = EnumSource.Mode.MATCH_ANY, names = KERNELS)
    void areExactWhereOnlySomeChannelsAreFine(KernelChoice choice) {
        CountSample sample = CountSample.drawn(3, 200, 9, Bounds.FINE_LIMIT);
        boolean[] fine = {true, false, false, true, true, false, true, false, false};
        for (double[] record : sample.records()) {
            for (int c = 0; c < fine.length; c++) {
                record[c] = fine[c] ? record[c] : Math.rint(record[c] / (1L << 22));
            }
        }
        sample.assertMoments(sample.fold(BlockKernels.choose(choice), fine, 33));
    }

    @ParameterizedTest
    @EnumSource(mode = EnumSource.Mode.MATCH_ANY, names = KERNELS)
    void haveOneFingerprintWhateverTheBlockOrderAndPrecision(KernelChoice choice) {
        BlockKernel kernel = BlockKernels.choose(choice);
        CountSample sample = CountSample.drawn(4, 5000, 5, Bounds.COARSE_LIMIT);
        String expected = sample.fold(BlockKernels.choose(KernelChoice.SCALAR), CountSample.marks(5, false), 512)
                .fingerprint();
        for (int blockRows : new int[] {1, 2, 7, 100, 1000, 2047, 2048}) {
            assertThat(sample.fold(kernel, CountSample.marks(5, false), blockRows)
                            .fingerprint())
                    .isEqualTo(expected);
        }
        assertThat(sample.fold(kernel, CountSample.marks(5, true), 300).fingerprint())
                .isEqualTo(expected);
        assertThat(sample.fold(kernel, new boolean[] {false, true, false, true, true}, 300)
                        .fingerprint())
                .isEqualTo(expected);
        for (long seed = 1; seed <= 3; seed++) {
            List<double[]> shuffled = new ArrayList<>(Arrays.asList(sample.records()));
            Collections.shuffle(shuffled, new Random(seed));
            CountSample permuted = new CountSample(5, shuffled.toArray(new double[0][]));
            assertThat(permuted.fold(kernel, CountSample.marks(5, false), 256).fingerprint())
                    .as("seed %d", seed)
                    .isEqualTo(expected);
        }
    }

    @ParameterizedTest
    @EnumSource(mode = EnumSource.Mode.MATCH_ANY, names = KERNELS)
    void areACommutativeGroup(KernelChoice choice) {
        BlockKernel kernel = BlockKernels.choose(choice);
        CountSample sample = CountSample.drawn(5, 400, 6, Bounds.FINE_LIMIT);
        Moments all = sample.fold(kernel, CountSample.marks(6, true), 128);
        Moments a = part(sample, kernel, 0, 150);
        Moments b = part(sample, kernel, 150, 151);
        Moments c = part(sample, kernel, 151, 400);
        Moments empty = Moments.empty(6);
        assertThat(a.plus(b).plus(c)).isEqualTo(all).hasSameHashCodeAs(all);
        assertThat(c.plus(b.plus(a))).isEqualTo(all);
        assertThat(all.plus(empty)).isEqualTo(all);
        assertThat(empty.plus(all)).isEqualTo(all);
        assertThat(all.minus(empty)).isEqualTo(all);
        assertThat(all.minus(all)).isEqualTo(empty);
        assertThat(all.minus(b)).isEqualTo(a.plus(c)).isNotEqualTo(all);
        assertThat(all.minus(a).minus(c)).isEqualTo(b);
        assertThat(MomentsAccumulator.empty(6).merge(c).merge(all).subtract(c).snapshot())
                .isEqualTo(all);
    }

    @ParameterizedTest
    @EnumSource(mode = EnumSource.Mode.MATCH_ANY, names = KERNELS)
    void refuseToLoseRecordsThatTheyNeverHad(KernelChoice choice) {
        BlockKernel kernel = BlockKernels.choose(choice);
        Moments few = CountSample.drawn(6, 3, 2, 10).fold(kernel, CountSample.marks(2, false), 8);
        Moments many = CountSample.drawn(7, 4, 2, 10).fold(kernel, CountSample.marks(2, false), 8);
        Moments large = CountSample.drawn(8, 2, 2, 1000).fold(kernel, CountSample.marks(2, false), 8);
        assertThatIllegalArgumentException()
                .isThrownBy(() -> few.minus(many))
                .withMessageContaining("4 records out of 3");
        assertThatIllegalArgumentException()
                .isThrownBy(() -> few.minus(large))
                .withMessageContaining("scatter below zero");
        assertThatIllegalArgumentException()
                .isThrownBy(() -> few.minus(Moments.empty(3)))
                .withMessageContaining("channels");
        assertThatIllegalArgumentException()
                .isThrownBy(() -> few.plus(Moments.empty(3)))
                .withMessageContaining("channels");
        MomentsAccumulator accumulator = MomentsAccumulator.empty(2).merge(few);
        assertThatIllegalArgumentException().isThrownBy(() -> accumulator.subtract(large));
        assertThat(accumulator.snapshot()).as("a refusal changes nothing").isEqualTo(few);
    }

    @ParameterizedTest
    @EnumSource(mode = EnumSource.Mode.MATCH_ANY, names = KERNELS)
    void comeBackFromTheirBytes(KernelChoice choice) {
        for (long limit : new long[] {1, 100, 1L << 15, Bounds.COARSE_LIMIT, 1L << 35, Bounds.FINE_LIMIT}) {
            CountSample sample = CountSample.drawn(limit, 50, 4, limit);
            Moments moments = sample.fold(BlockKernels.choose(choice), CountSample.marks(4, true), 16);
            Moments read = Moments.fromBytes(moments.toBytes());
            assertThat(read).isEqualTo(moments);
            assertThat(read.fingerprint()).isEqualTo(moments.fingerprint());
        }
    }

    /** A trap that floating-point sums fell into: SPARK-26158, apache/spark#23126. Means 1e5 and 2e5, deviation 1e-5; here 100 thousand records. */
    @ParameterizedTest
    @EnumSource(mode = EnumSource.Mode.MATCH_ANY, names = KERNELS)
    void keepTheVarianceUnderALargeMean(KernelChoice choice) {
        int records = 100_000;
        double step = 1e-6;
        Random random = new Random(26158);
        double[][] counts = new double[records][2];
        for (double[] count : counts) {
            // Offset 0 on purpose: 2e5 in steps of 1e-6 is 2e11, a fine count.
            count[0] = Math.rint((1e5 + 1e-5 * random.nextGaussian()) / step);
            count[1] = Math.rint((2e5 + 1e-5 * random.nextGaussian()) / step);
        }
        CountSample sample = new CountSample(2, counts);
        Moments moments = sample.fold(BlockKernels.choose(choice), CountSample.marks(2, true), 512);
        sample.assertMoments(moments);
        double scale = step * step / ((double) records * (records - 1));
        for (int i = 0; i < 2; i++) {
            // The deviation of a sample variance is about its square root of 2/n, 0.0045 of it; four of those, and
            // step^2/12 for rounding.
            assertThat(moments.scatter(i, i).doubleValue() * scale / 1e-10).isBetween(0.98, 1.02);
        }
    }

    @ParameterizedTest
    @EnumSource(mode = EnumSource.Mode.MATCH_ANY, names = KERNELS)
    void giveAScatterOfZeroForEqualRecordsWhateverTheTree(KernelChoice choice) {
        double[][] equal = new double[3001][];
        Arrays.fill(equal, new double[] {Bounds.FINE_LIMIT, -123_456_789_012.0, 7});
        CountSample sample = new CountSample(3, equal);
        BlockKernel kernel = BlockKernels.choose(choice);
        boolean[] fine = CountSample.marks(3, true);
        Moments tree = Moments.empty(3);
        for (int from = 0; from < 3001; from += 333) {
            tree = sample.fold(new RowFolder(3, fine, kernel, 50), from, Math.min(3001, from + 333))
                    .plus(tree);
        }
        assertThat(tree).isEqualTo(sample.fold(kernel, fine, 2048));
        for (int i = 0; i < 3; i++) {
            for (int j = 0; j < 3; j++) {
                assertThat(tree.scatter(i, j)).isZero();
            }
        }
    }

    private static Moments part(CountSample sample, BlockKernel kernel, int from, int to) {
        return sample.fold(
                new RowFolder(sample.channels(), CountSample.marks(sample.channels(), true), kernel, 64), from, to);
    }
}
