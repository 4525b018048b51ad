package turnstone.moments;

import java.util.Arrays;
import turnstone.fault.Fault;

/** A process of its own that says which kernel this JVM gets, and whether it equals the scalar one. */
final class KernelProbe {
    private KernelProbe() {}

    public static void main(String[] arguments) {
        BlockKernel kernel;
        try {
            kernel = BlockKernels.choose(KernelChoice.valueOf(System.getProperty("kernel", "AUTO")));
        } catch (Fault refusal) {
            System.out.println("refused=" + refusal.getMessage());
            return;
        }
        System.out.println("kernel=" + kernel.name());
        System.out.println("reason=" + BlockKernels.whyNoVectorKernel().orElse("none"));
        System.out.println("equal=" + equalsScalar(kernel));
    }

    private static boolean equalsScalar(BlockKernel kernel) {
        BlockKernel scalar = BlockKernels.choose(KernelChoice.SCALAR);
        for (int channels : new int[] {1, 4, 8, 13, 37}) {
            double[] rows = BlockKernelContract.rows(300, channels);
            double[] ours = new double[Bounds.triangle(channels)];
            double[] theirs = new double[Bounds.triangle(channels)];
            kernel.fold(rows, 300, channels, ours);
            scalar.fold(rows, 300, channels, theirs);
            if (!Arrays.equals(ours, theirs)) {
                return false;
            }
        }
        return true;
    }
}
