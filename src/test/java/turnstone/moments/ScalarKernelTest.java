package turnstone.moments;

class ScalarKernelTest extends BlockKernelContract {
    @Override
    BlockKernel kernel() {
        return BlockKernels.choose(KernelChoice.SCALAR);
    }
}
