package turnstone.moments;

import static org.assertj.core.api.Assertions.assertThat;

import java.math.BigInteger;
import java.util.Arrays;
import java.util.Random;

/** Count records for tests, folded in the program's ways and, apart from it, in BigInteger. */
final class CountSample {
    private final int channels;
    private final double[][] records;

    CountSample(int channels, double[][] records) {
        this.channels = channels;
        this.records = records;
    }

    int channels() {
        return channels;
    }

    double[][] records() {
        return records;
    }

    /** Records with counts drawn evenly between plus and minus the limit. */
    static CountSample drawn(long seed, int count, int channels, long limit) {
        Random random = new Random(seed);
        double[][] records = new double[count][channels];
        for (double[] record : records) {
            for (int c = 0; c < channels; c++) {
                record[c] = random.nextLong(2 * limit + 1) - limit;
            }
        }
        return new CountSample(channels, records);
    }

    static boolean[] marks(int channels, boolean fine) {
        boolean[] marks = new boolean[channels];
        Arrays.fill(marks, fine);
        return marks;
    }

    Moments fold(BlockKernel kernel, boolean[] fineChannels, int blockRows) {
        return fold(new RowFolder(channels, fineChannels, kernel, blockRows), 0, records.length);
    }

    Moments fold(RowFolder folder, int from, int to) {
        for (int k = from; k < to; k++) {
            folder.add(records[k], 0);
        }
        return folder.snapshot();
    }

    BigInteger sum(int i) {
        BigInteger sum = BigInteger.ZERO;
        for (double[] record : records) {
            sum = sum.add(BigInteger.valueOf((long) record[i]));
        }
        return sum;
    }

    BigInteger product(int i, int j) {
        BigInteger sum = BigInteger.ZERO;
        for (double[] record : records) {
            sum = sum.add(BigInteger.valueOf((long) record[i]).multiply(BigInteger.valueOf((long) record[j])));
        }
        return sum;
    }

    void assertMoments(Moments moments) {
        assertThat(moments.records()).isEqualTo(records.length);
        for (int i = 0; i < channels; i++) {
            assertThat(moments.sum(i)).as("sum %d", i).isEqualTo(sum(i));
            for (int j = 0; j <= i; j++) {
                assertThat(moments.product(i, j)).as("product %d, %d", i, j).isEqualTo(product(i, j));
            }
        }
    }
}
