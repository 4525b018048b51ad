package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;

import com.sun.management.ThreadMXBean;
import java.lang.management.ManagementFactory;
import java.time.LocalDate;
import java.util.Random;
import org.junit.jupiter.api.Test;

/** The head and the count scale allocate nothing per record; time per record is printed. */
class HeadCostTest {
    private static final int CHANNELS = 128;
    private static final int RECORDS = 20_000;

    @Test
    void noRecordAllocates() {
        Head head = fullHead();
        CountScale scale = CountScale.uniform(
                head.outputs(), java.math.BigDecimal.ZERO, new java.math.BigDecimal("0.00001"), Precision.COARSE);
        double[] raw = new Random(1).doubles(CHANNELS * 64, 500, 3000).toArray();
        double[] out = new double[CHANNELS];
        double[] counts = new double[CHANNELS];
        HeadTrouble trouble = new HeadTrouble();
        long start = 0;
        int accepted = 0;
        ThreadMXBean threads = (ThreadMXBean) ManagementFactory.getThreadMXBean();
        long thread = Thread.currentThread().getId();
        long before = 0;
        for (int round = 0; round < 3; round++) {
            before = threads.getThreadAllocatedBytes(thread);
            start = System.nanoTime();
            accepted = run(head, scale, raw, out, counts, trouble);
        }
        long elapsed_ns = System.nanoTime() - start;
        long allocated = threads.getThreadAllocatedBytes(thread) - before;
        System.out.println("head and count scale, " + CHANNELS + " channels, every step: " + elapsed_ns / RECORDS
                + " ns a record, " + allocated + " bytes in " + RECORDS + " records");
        assertThat(accepted).isEqualTo(RECORDS - RECORDS / 100);
        // The bookkeeping of the measurement itself allocates a little; one object a record would be 320 000 bytes at
        // least.
        assertThat(allocated).isLessThan(RECORDS);
    }

    private static int run(
            Head head, CountScale scale, double[] raw, double[] out, double[] counts, HeadTrouble trouble) {
        int accepted = 0;
        for (int i = 0; i < RECORDS; i++) {
            // Every hundredth is stale: quarantine allocates nothing either.
            long time_ms = i % 100 == 99 ? 1_000_000 : 5_000 + i % 1000;
            if (head.apply(raw, i % 64 * CHANNELS, i % 8, time_ms, out, 0, trouble) == HeadOutcome.ACCEPTED
                    && scale.toCounts(out, 0, counts, 0) < 0) {
                accepted++;
            }
        }
        return accepted;
    }

    private static Head fullHead() {
        double[] table = new double[CHANNELS];
        double[] axis = new double[CHANNELS - 8];
        for (int c = 0; c < CHANNELS; c++) {
            table[c] = 900 + 6.25 * c;
        }
        for (int c = 0; c < axis.length; c++) {
            axis[c] = 910 + 6.5 * c;
        }
        HeadSpec spec = HeadSpec.builder(axis.length)
                .axis(axis, Resampling.FROM_INSTRUMENT)
                .saturatedAt(4095)
                .deadAtOrBelow(0)
                .correct(100_000)
                .floor(0.001)
                .noSignalBelow(0.01)
                .absorbance()
                .dropChannels(10, 12)
                .snv(1e-6)
                .build();
        ReferenceTable.Builder references = ReferenceTable.builder();
        double[] dark = new double[CHANNELS];
        double[] white = new double[CHANNELS];
        java.util.Arrays.fill(dark, 100);
        java.util.Arrays.fill(white, 4000);
        for (int column = 0; column < 8; column++) {
            references.add(ReferenceKind.DARK, "godwit", column, 0, dark);
            for (int hour = 0; hour < 8; hour++) {
                references.add(ReferenceKind.WHITE, "godwit", column, hour * 700L, white);
            }
        }
        return Head.of(spec, Instrument.of("godwit", LocalDate.of(2026, 3, 1), table), references.build());
    }
}
