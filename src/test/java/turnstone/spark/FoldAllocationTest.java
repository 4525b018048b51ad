package turnstone.spark;

import static org.assertj.core.api.Assertions.assertThat;

import com.sun.management.ThreadMXBean;
import java.lang.management.ManagementFactory;
import java.math.BigDecimal;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.Test;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.Precision;
import turnstone.measure.QuarantineReason;
import turnstone.measure.SourceType;
import turnstone.moments.KernelChoice;

/** What a fold makes garbage of for each record: next to nothing, so that the collector has no part in its speed. */
class FoldAllocationTest {
    private static final int CHANNELS = 64;
    private static final int RECORDS = 40_000;

    /** One object a record would be 16 bytes at least. */
    private static final long MOST_BYTES_A_RECORD = 8;

    private static final ThreadMXBean THREADS = (ThreadMXBean) ManagementFactory.getThreadMXBean();

    /** The same few records again and again, of one material. */
    private static final class Repeating implements RecordCursor {
        private final double[] values = new double[CHANNELS];
        private int read;

        @Override
        public boolean next() {
            values[read % CHANNELS] = read % 100;
            return read++ < RECORDS;
        }

        @Override
        public String text(int column) {
            return "a material";
        }

        @Override
        public long whole(int column) {
            return NO_NUMBER;
        }

        @Override
        public double[] channels() {
            return values;
        }

        @Override
        public int channelCount() {
            return CHANNELS;
        }

        @Override
        public String channelText(int channel) {
            return null;
        }

        @Override
        public SourceType type(int channel) {
            return SourceType.FLOAT;
        }

        @Override
        public QuarantineReason defect() {
            return null;
        }

        @Override
        public int defectChannel() {
            return -1;
        }

        @Override
        public String defectText() {
            return "";
        }

        @Override
        public String file() {
            return "memory";
        }

        @Override
        public long row() {
            return read;
        }
    }

    /** Bytes that this thread allocates until the task hands on its first result: all records are folded by then. */
    private static long allocated_bytes() {
        ColumnNames names = ColumnNames.array(Map.of(KeyColumn.MATERIAL, "material"), "channels", CHANNELS);
        TableColumns columns = TableColumns.resolve(names, List.of("material", "channels"), "memory");
        CountScale scale = CountScale.uniform(CHANNELS, BigDecimal.ZERO, BigDecimal.ONE, Precision.COARSE);
        FoldSettings settings = FoldSettings.usual().withKernel(KernelChoice.SCALAR);
        FoldTask task =
                new FoldTask(new Repeating(), columns, IntakeSpec.table(HeadSpec.none(CHANNELS), scale), settings);
        long before = THREADS.getCurrentThreadAllocatedBytes();
        assertThat(task.hasNext()).isTrue();
        return THREADS.getCurrentThreadAllocatedBytes() - before;
    }

    @Test
    void aRecordLeavesNoGarbage() {
        // The first run loads classes and warms up.
        allocated_bytes();
        long bytes = allocated_bytes();
        long buffers_bytes = FoldShape.folder_bytes(
                        CountScale.uniform(CHANNELS, BigDecimal.ZERO, BigDecimal.ONE, Precision.COARSE),
                        FoldSettings.usual())
                * 4;
        assertThat(bytes - buffers_bytes).isLessThan(MOST_BYTES_A_RECORD * RECORDS);
        assertThat(buffers_bytes).as("buffers are small beside the records").isLessThan(8L * CHANNELS * RECORDS / 10);
    }
}
