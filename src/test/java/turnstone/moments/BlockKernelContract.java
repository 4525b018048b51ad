package turnstone.moments;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatIllegalArgumentException;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Random;
import java.util.concurrent.Callable;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import org.junit.jupiter.api.Test;

/** What every block kernel must do. */
abstract class BlockKernelContract {
    abstract BlockKernel kernel();

    @Test
    void foldsWhateverTheNumberOfChannels() {
        for (int channels = 1; channels <= 70; channels++) {
            check(17, channels);
        }
        check(3, 100);
        check(3, 257);
    }

    @Test
    void foldsWhateverTheNumberOfRecords() {
        for (int records : new int[] {0, 1, 2, 255, 256, 257, 511, 512, 513, 2048}) {
            check(records, 19);
        }
    }

    @Test
    void isExactUpToTheLastRecordOfItsBound() {
        for (double count : new double[] {Bounds.COARSE_LIMIT, -Bounds.COARSE_LIMIT, -Bounds.LOW_LIMIT}) {
            double[] rows = new double[Bounds.TRIANGLE_RECORDS * 2];
            Arrays.fill(rows, count);
            double[] triangle = new double[3];
            kernel().fold(rows, Bounds.TRIANGLE_RECORDS, 2, triangle);
            long expected = Math.multiplyExact((long) (count * count), Bounds.TRIANGLE_RECORDS);
            assertThat(triangle).containsOnly((double) expected);
        }
        // An odd sum next to the bound: a sum that rounds would miss it.
        double[] mixed = new double[Bounds.TRIANGLE_RECORDS];
        Arrays.fill(mixed, Bounds.COARSE_LIMIT);
        mixed[0] = 1;
        double[] sum = new double[1];
        kernel().fold(mixed, mixed.length, 1, sum);
        assertThat((long) sum[0]).isEqualTo(1 + (mixed.length - 1) * Bounds.COARSE_LIMIT * Bounds.COARSE_LIMIT);
    }

    @Test
    void addsToWhatTheTriangleHolds() {
        double[] rows = {2, 3, 5, 7};
        double[] triangle = {100, 200, 300, -1};
        kernel().fold(rows, 2, 2, triangle);
        assertThat(triangle).containsExactly(100 + 4 + 25, 200 + 6 + 35, 300 + 9 + 49, -1);
    }

    @Test
    void readsNothingPastTheBlock() {
        double[] rows = new double[40];
        Arrays.fill(rows, Double.NaN);
        Arrays.fill(rows, 0, 27, 3);
        double[] triangle = new double[Bounds.triangle(9) + 5];
        kernel().fold(rows, 3, 9, triangle);
        assertThat(Arrays.copyOf(triangle, Bounds.triangle(9))).containsOnly(27);
        assertThat(Arrays.copyOfRange(triangle, Bounds.triangle(9), triangle.length))
                .containsOnly(0);
    }

    @Test
    void refusesShapesThatDoNotFit() {
        assertThatIllegalArgumentException().isThrownBy(() -> kernel().fold(new double[8], 1, 0, new double[8]));
        assertThatIllegalArgumentException().isThrownBy(() -> kernel().fold(new double[8], -1, 2, new double[8]));
        assertThatIllegalArgumentException().isThrownBy(() -> kernel().fold(new double[5], 3, 2, new double[8]));
        assertThatIllegalArgumentException().isThrownBy(() -> kernel().fold(new double[8], 3, 2, new double[2]));
        assertThatIllegalArgumentException()
                .isThrownBy(() -> kernel().fold(new double[2049], Bounds.TRIANGLE_RECORDS + 1, 1, new double[1]));
    }

    @Test
    void mayBeSharedByThreads() throws Exception {
        BlockKernel shared = kernel();
        ExecutorService threads = Executors.newFixedThreadPool(4);
        try {
            List<Callable<Integer>> folds = new ArrayList<>();
            for (int t = 0; t < 4; t++) {
                // Other records in each thread: a scratch space that two of them use would show.
                int records = 200 + t;
                double[] rows = rows(records, 33);
                double[] expected = oracle(rows, records, 33);
                folds.add(() -> {
                    int wrong = 0;
                    for (int round = 0; round < 3000; round++) {
                        double[] triangle = new double[expected.length];
                        shared.fold(rows, records, 33, triangle);
                        wrong += Arrays.equals(triangle, expected) ? 0 : 1;
                    }
                    return wrong;
                });
            }
            for (Future<Integer> fold : threads.invokeAll(folds)) {
                assertThat(fold.get()).isZero();
            }
        } finally {
            threads.shutdown();
        }
    }

    void check(int records, int channels) {
        double[] rows = rows(records, channels);
        double[] triangle = new double[Bounds.triangle(channels)];
        kernel().fold(rows, records, channels, triangle);
        assertThat(triangle)
                .as("%d records of %d channels", records, channels)
                .isEqualTo(oracle(rows, records, channels));
    }

    static double[] rows(int records, int channels) {
        return new Random(31L * records + channels)
                .longs((long) records * channels, -Bounds.COARSE_LIMIT, Bounds.COARSE_LIMIT + 1)
                .asDoubleStream()
                .toArray();
    }

    /** In 64-bit integers: 2048 * 2^42 fits. */
    static double[] oracle(double[] rows, int records, int channels) {
        double[] triangle = new double[Bounds.triangle(channels)];
        for (int i = 0, at = 0; i < channels; i++) {
            for (int j = 0; j <= i; j++, at++) {
                long sum = 0;
                for (int k = 0; k < records; k++) {
                    sum += ((long) rows[k * channels + i]) * ((long) rows[k * channels + j]);
                }
                triangle[at] = sum;
            }
        }
        return triangle;
    }
}
