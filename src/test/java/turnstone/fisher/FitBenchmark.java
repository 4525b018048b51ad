package turnstone.fisher;

import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.List;
import java.util.Random;
import turnstone.measure.CountScale;
import turnstone.measure.Precision;
import turnstone.moments.BlockKernels;
import turnstone.moments.KernelChoice;
import turnstone.moments.Moments;
import turnstone.moments.RowFolder;

/** Times whole fits on one thread, from moments to axes: run {@code main}; the least of several runs, in milliseconds. */
final class FitBenchmark {
    private FitBenchmark() {}

    public static void main(String[] arguments) {
        System.out.println("java " + System.getProperty("java.version"));
        for (int channels : new int[] {100, 256, 1024}) {
            FitRequest request = request(channels, 10, 2 * channels / 10 + 200);
            int runs = channels > 500 ? 6 : 60;
            double scatter = Double.POSITIVE_INFINITY;
            double solve = Double.POSITIVE_INFINITY;
            for (int run = 0; run < runs; run++) {
                long start = System.nanoTime();
                Scatter sums = Scatter.of(request);
                long middle = System.nanoTime();
                sums.fit(Ridge.NONE, 0);
                long end = System.nanoTime();
                scatter = Math.min(scatter, (middle - start) / 1e6);
                solve = Math.min(solve, (end - middle) / 1e6);
            }
            System.out.printf(
                    "%d channels, 10 materials: scatter %.2f ms, fit from scatter %.2f ms%n", channels, scatter, solve);
        }
    }

    /** Invented counts: each channel a random walk over its neighbours, materials apart by a smooth offset. */
    static FitRequest request(int channels, int materials, int records) {
        Random random = new Random(7);
        List<String> names = new ArrayList<>();
        List<List<Cell>> cells = new ArrayList<>();
        for (int k = 0; k < materials; k++) {
            RowFolder folder =
                    new RowFolder(channels, new boolean[channels], BlockKernels.choose(KernelChoice.SCALAR), 128);
            double[] counts = new double[channels];
            for (int i = 0; i < records; i++) {
                double walk = 1000 * random.nextGaussian();
                for (int c = 0; c < channels; c++) {
                    walk += 300 * random.nextGaussian();
                    counts[c] = Math.rint(walk + 500 * StrictMath.sin(0.02 * c * (k + 1)));
                }
                folder.add(counts, 0);
            }
            Moments moments = folder.snapshot();
            names.add("material " + k);
            cells.add(List.of(Cell.asCounted(moments)));
        }
        CountScale scale = CountScale.uniform(channels, BigDecimal.ZERO, new BigDecimal("0.0001"), Precision.COARSE);
        return FitRequest.of(names, cells, scale);
    }
}
