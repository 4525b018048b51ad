package turnstone.moments;

import java.util.Arrays;

/**
 * How the counts of a record lie in the columns of the block kernel, and how the kernel's sums become moments again.
 *
 * <p>Columns {@code 0 .. d-1} hold the count of a coarse channel or the low half of a fine one. The high halves of the fine channels follow, in
 * channel order.
 */
final class KernelColumns {
    private final int channels;
    /** Channels that are fine, ascending. */
    private final int[] fine;
    /** Largest count in size, per channel. */
    private final double[] limits;

    KernelColumns(int channels, boolean[] fineChannels) {
        Bounds.checkChannels(channels);
        if (fineChannels.length != channels) {
            throw new IllegalArgumentException(fineChannels.length + " marks of fine for " + channels + " channels");
        }
        this.channels = channels;
        this.limits = new double[channels];
        int[] found = new int[channels];
        int count = 0;
        for (int c = 0; c < channels; c++) {
            limits[c] = fineChannels[c] ? Bounds.FINE_LIMIT : Bounds.COARSE_LIMIT;
            if (fineChannels[c]) {
                found[count++] = c;
            }
        }
        this.fine = Arrays.copyOf(found, count);
    }

    int channels() {
        return channels;
    }

    /** Columns of the kernel: channels, and one more for each fine one. */
    int count() {
        return channels + fine.length;
    }

    /** Refuses a record of which a count is not an integer or beyond its channel's limit. */
    void check(double[] counts, int from) {
        for (int c = 0; c < channels; c++) {
            double count = counts[from + c];
            // Written so that a count that is not a number fails.
            if (!(Math.abs(count) <= limits[c] && Math.rint(count) == count)) {
                throw new IllegalArgumentException("channel " + c + " is " + count + ", not an integer of at most "
                        + (long) limits[c] + " in size");
            }
        }
    }

    /** Copies a record of counts into a row of the kernel. */
    void split(double[] counts, int from, double[] rows, int to) {
        System.arraycopy(counts, from, rows, to, channels);
        for (int f = 0; f < fine.length; f++) {
            long count = (long) counts[from + fine[f]];
            rows[to + fine[f]] = Bounds.low(count);
            rows[to + channels + f] = Bounds.high(count);
        }
    }

    /** Moments of records whose kernel sums are these. */
    Moments moments(long records, double[] columnSums, long[] panel) {
        WideSums sums = new WideSums(channels);
        WideSums products = new WideSums(Bounds.triangle(channels));
        for (int a = 0, at = 0; a < count(); a++) {
            int i = channel(a);
            sums.addShifted(i, (long) columnSums[a], shift(a));
            for (int b = 0; b <= a; b++, at++) {
                int j = channel(b);
                // A channel's halves meet once in the triangle and twice in its square.
                int twice = i == j && a != b ? 1 : 0;
                products.addShifted(Bounds.at(Math.max(i, j), Math.min(i, j)), panel[at], shift(a) + shift(b) + twice);
            }
        }
        return new Moments(channels, records, sums, products);
    }

    private int channel(int column) {
        return column < channels ? column : fine[column - channels];
    }

    private int shift(int column) {
        return column < channels ? 0 : Bounds.LOW_BITS;
    }
}
