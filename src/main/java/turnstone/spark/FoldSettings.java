package turnstone.spark;

import java.io.Serializable;
import turnstone.moments.KernelChoice;

/**
 * How a fold uses the machine; the numbers do not depend on it.
 *
 * @param task_bytes the bound on the buffers of one task
 * @param blockRows records that the block kernel takes at a time
 * @param kernel which block kernel
 * @param reducers into how many partitions partial sums are gathered; 0 = as many as there are task slots
 * @param quarantineKept how many quarantined records are brought back; their counts are complete whatever this is
 */
public record FoldSettings(long task_bytes, int blockRows, KernelChoice kernel, int reducers, int quarantineKept)
        implements Serializable {
    private static final long USUAL_TASK_BYTES = 256L << 20;
    private static final int USUAL_BLOCK_ROWS = 256;
    private static final int USUAL_QUARANTINE_KEPT = 100_000;

    /** Checks the numbers. */
    public FoldSettings {
        if (task_bytes <= 0 || blockRows <= 0 || reducers < 0 || quarantineKept < 0) {
            throw new IllegalArgumentException("a setting of the fold is out of range");
        }
    }

    /** What suits most machines. */
    public static FoldSettings usual() {
        return new FoldSettings(USUAL_TASK_BYTES, USUAL_BLOCK_ROWS, KernelChoice.AUTO, 0, USUAL_QUARANTINE_KEPT);
    }

    /** The same with another bound on the buffers of a task. */
    public FoldSettings withTaskBytes(long bytes) {
        return new FoldSettings(bytes, blockRows, kernel, reducers, quarantineKept);
    }

    /** The same with another kernel. */
    public FoldSettings withKernel(KernelChoice other) {
        return new FoldSettings(task_bytes, blockRows, other, reducers, quarantineKept);
    }

    /** The same with another number of quarantined records brought back. */
    public FoldSettings withQuarantineKept(int records) {
        return new FoldSettings(task_bytes, blockRows, kernel, reducers, records);
    }
}
