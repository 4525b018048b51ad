package turnstone.moments;

import static org.assertj.core.api.Assertions.assertThat;

import org.junit.jupiter.api.Test;

/** Fails where the JVM can't run the vector kernel: the build starts it so that it can. */
class VectorKernelTest extends BlockKernelContract {
    @Override
    BlockKernel kernel() {
        return BlockKernels.choose(KernelChoice.VECTOR);
    }

    @Test
    void equalsTheScalarKernelBitForBit() {
        BlockKernel scalar = BlockKernels.choose(KernelChoice.SCALAR);
        for (int channels : new int[] {1, 7, 8, 9, 15, 16, 17, 100, 128, 129}) {
            double[] rows = rows(700, channels);
            double[] byVector = new double[Bounds.triangle(channels)];
            double[] byScalar = new double[Bounds.triangle(channels)];
            kernel().fold(rows, 700, channels, byVector);
            scalar.fold(rows, 700, channels, byScalar);
            assertThat(byVector).isEqualTo(byScalar);
        }
    }

    @Test
    void isWhatTheAutomaticChoiceGives() {
        assertThat(BlockKernels.whyNoVectorKernel()).isEmpty();
        assertThat(BlockKernels.choose(KernelChoice.AUTO).name())
                .isEqualTo(kernel().name())
                .startsWith("vector");
    }
}
