package turnstone.bench;

import java.lang.management.ManagementFactory;
import java.lang.management.ThreadMXBean;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Random;
import java.util.stream.IntStream;
import org.apache.spark.mllib.linalg.BLAS;
import org.apache.spark.mllib.linalg.DenseVector;
import turnstone.moments.BlockKernel;
import turnstone.moments.BlockKernels;
import turnstone.moments.KernelChoice;

/**
 * The block kernels beside the packed rank-one update that MLlib's {@code RowMatrix} makes for its Gram matrix, in alternating rounds of one run.
 *
 * <p>Prints, by number of channels, the median speed in GF/s (two operations for each entry of the lower triangle and record; processor time of
 * the thread, so that other load disturbs less) and the medians of the ratios to MLlib's update in the same round. Arguments: numbers of channels.
 */
public final class KernelBench {
    private static final int RECORDS = 512;
    private static final int WARM_UP_ROUNDS = 5;
    private static final int ROUNDS = 9;
    private static final double OPERATIONS_A_ROUND = 2e8;
    private static final int[] CHANNELS = {64, 100, 128, 256, 512, 1024};
    private static final ThreadMXBean THREADS = ManagementFactory.getThreadMXBean();

    private record Peer(String name, Runnable fold) {}

    private KernelBench() {}

    /** Runs the benchmark. */
    public static void main(String[] arguments) {
        int[] sizes = arguments.length == 0
                ? CHANNELS
                : Arrays.stream(arguments).mapToInt(Integer::parseInt).toArray();
        System.out.printf("Java %s, %d records a block, medians of %d rounds%n", Runtime.version(), RECORDS, ROUNDS);
        BlockKernels.whyNoVectorKernel().ifPresent(why -> System.out.println("no vector kernel: " + why));
        for (int channels : sizes) {
            run(channels);
        }
    }

    private static void run(int channels) {
        List<Peer> peers = peers(channels);
        double operations = (double) RECORDS * channels * (channels + 1);
        int repeats = (int) Math.max(1, OPERATIONS_A_ROUND / operations);
        double[][] speeds = new double[peers.size()][ROUNDS];
        for (int round = -WARM_UP_ROUNDS; round < ROUNDS; round++) {
            for (int p = 0; p < peers.size(); p++) {
                double speed = operations * repeats / nanoseconds(peers.get(p).fold(), repeats);
                if (round >= 0) {
                    speeds[p][round] = speed;
                }
            }
        }
        System.out.printf("%n%5d channels  %-20s %8s %8s%n", channels, "", "GF/s", "ratio");
        for (int p = 0; p < peers.size(); p++) {
            double[] ours = speeds[p];
            double[] ratios = IntStream.range(0, ROUNDS)
                    .mapToDouble(round -> ours[round] / speeds[0][round])
                    .toArray();
            System.out.printf("%15s %-20s %8.1f %8.2f%n", "", peers.get(p).name(), median(ours), median(ratios));
        }
    }

    private static List<Peer> peers(int channels) {
        double[] rows = new Random(channels).ints((long) RECORDS * channels, -(1 << 21) + 1, 1 << 21)
                .asDoubleStream()
                .toArray();
        DenseVector[] vectors = new DenseVector[RECORDS];
        for (int k = 0; k < RECORDS; k++) {
            vectors[k] = new DenseVector(Arrays.copyOfRange(rows, k * channels, (k + 1) * channels));
        }
        int entries = channels * (channels + 1) / 2;
        double[] triangle = new double[entries];
        List<Peer> peers = new ArrayList<>();
        peers.add(new Peer("MLlib's update", () -> {
            for (DenseVector vector : vectors) {
                BLAS.spr(1.0, vector, triangle);
            }
        }));
        List<BlockKernel> kernels = new ArrayList<>();
        kernels.add(BlockKernels.choose(KernelChoice.SCALAR));
        if (BlockKernels.whyNoVectorKernel().isEmpty()) {
            kernels.add(BlockKernels.choose(KernelChoice.VECTOR));
        }
        for (BlockKernel kernel : kernels) {
            double[] own = new double[entries];
            peers.add(new Peer(kernel.name(), () -> kernel.fold(rows, RECORDS, channels, own)));
        }
        return peers;
    }

    private static double nanoseconds(Runnable fold, int repeats) {
        long start = THREADS.getCurrentThreadCpuTime();
        for (int i = 0; i < repeats; i++) {
            fold.run();
        }
        return THREADS.getCurrentThreadCpuTime() - start;
    }

    private static double median(double[] values) {
        double[] sorted = values.clone();
        Arrays.sort(sorted);
        return sorted[sorted.length / 2];
    }
}
