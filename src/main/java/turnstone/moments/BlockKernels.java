package turnstone.moments;

import java.util.Optional;
import turnstone.fault.Fault;

/** Chooses the block kernel at start; the choice and its reason belong in the log. */
public final class BlockKernels {
    /** Named as text: the class needs a module that a JVM may have been started without. */
    private static final String VECTOR_KERNEL = "turnstone.moments.VectorKernel";

    private BlockKernels() {}

    /**
     * The kernel for a setting. It is not serialisable: each JVM chooses its own, and all give the same sums.
     *
     * @throws Fault usage, if the vector kernel is demanded and this JVM can't run it
     */
    public static BlockKernel choose(KernelChoice choice) {
        if (choice == KernelChoice.SCALAR) {
            return new ScalarKernel();
        }
        try {
            return vectorKernel();
        } catch (ReflectiveOperationException | LinkageError e) {
            if (choice == KernelChoice.AUTO) {
                return new ScalarKernel();
            }
            throw Fault.usage("the vector kernel can't run on this JVM")
                    .found(cause(e))
                    .remedy("start Java with --add-modules jdk.incubator.vector, or choose the scalar kernel")
                    .because(e);
        }
    }

    /** Why {@link KernelChoice#AUTO} gives the scalar kernel on this JVM; empty where it gives the vector kernel. */
    public static Optional<String> whyNoVectorKernel() {
        try {
            vectorKernel();
            return Optional.empty();
        } catch (ReflectiveOperationException | LinkageError e) {
            return Optional.of(cause(e));
        }
    }

    private static BlockKernel vectorKernel() throws ReflectiveOperationException {
        return Class.forName(VECTOR_KERNEL)
                .asSubclass(BlockKernel.class)
                .getDeclaredConstructor()
                .newInstance();
    }

    private static String cause(Throwable thrown) {
        Throwable root = thrown;
        while (root.getCause() != null) {
            root = root.getCause();
        }
        return root instanceof UnsupportedOperationException
                ? root.getMessage()
                : root.getClass().getSimpleName() + " " + root.getMessage();
    }
}
