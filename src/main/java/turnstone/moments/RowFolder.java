package turnstone.moments;

import java.util.Arrays;

/**
 * Folds count records of one key into exact moments, through a small row buffer and a block kernel.
 *
 * <p>A coarse channel is one column of the kernel. A fine channel is two, the low and the high half of its count
 * ({@code q = high * 2^22 + low}), whose products are put together when the sums leave the 64-bit panel; so only fine channels pay.
 * Buffers grow as they are needed: a key of few records costs little. Not for sharing between threads.
 */
public final class RowFolder {
    private static final int FIRST_ROWS = 8;

    private final KernelColumns columns;
    private final int width;
    private final BlockKernel kernel;
    private final int blockRows;

    private double[] rows = new double[0];
    private int buffered;
    private double[] triangle = new double[0];
    private int inTriangle;
    private long[] panel = new long[0];
    /** Sums of the columns over the records in triangle and panel: at most {@code 2^20 * 2^21 = 2^41 < 2^53} in size. */
    private final double[] columnSums;

    private long inPanel;
    /** What has left the panel; null until something has. */
    private Moments wide;

    /**
     * A folder of no records.
     *
     * @param channels counts of a record
     * @param fineChannels which channels are fine, one entry a channel
     * @param kernel may be shared with other folders
     * @param blockRows records that are folded at a time, 1 to {@link Bounds#TRIANGLE_RECORDS}
     * @throws IllegalArgumentException if a number is out of range or the marks are not one a channel
     */
    public RowFolder(int channels, boolean[] fineChannels, BlockKernel kernel, int blockRows) {
        checkBlock(blockRows);
        this.columns = new KernelColumns(channels, fineChannels);
        this.width = columns.count();
        this.kernel = kernel;
        this.blockRows = blockRows;
        this.columnSums = new double[width];
    }

    /**
     * Adds one record.
     *
     * @param counts exact integers; those of the record begin at {@code from}
     * @throws IllegalArgumentException if a count is not an integer or is beyond its channel's limit; nothing of the record is added then
     */
    public void add(double[] counts, int from) {
        columns.check(counts, from);
        addCounted(counts, from);
    }

    /**
     * Adds one record of counts that a count scale has made for these channels: integers within their channels' limits, which is not looked
     * at again. Anything else makes sums of no use.
     *
     * @param counts those of the record begin at {@code from}
     */
    public void addCounted(double[] counts, int from) {
        int to = buffered * width;
        if (to == rows.length) {
            int grown = Math.min(blockRows, Math.max(FIRST_ROWS, 2 * buffered));
            rows = Arrays.copyOf(rows, grown * width);
        }
        columns.split(counts, from, rows, to);
        buffered++;
        if (buffered == blockRows) {
            foldRows();
        }
    }

    /** Records added since the start or the last reset. */
    public long records() {
        return buffered + inTriangle + inPanel + (wide == null ? 0 : wide.records());
    }

    /** The moments of all records so far; the folder goes on from there. */
    public Moments snapshot() {
        foldRows();
        drainTriangle();
        if (inPanel == 0) {
            return wide == null ? Moments.empty(columns.channels()) : wide;
        }
        return withPanel();
    }

    /** Forgets all records; keeps the buffers. */
    public void reset() {
        buffered = 0;
        inTriangle = 0;
        inPanel = 0;
        wide = null;
        Arrays.fill(triangle, 0);
        Arrays.fill(panel, 0);
        Arrays.fill(columnSums, 0);
    }

    /** Bytes that the buffers take now, without object headers and the kernel's own scratch space. */
    public long bytes() {
        return 8L * (rows.length + triangle.length + panel.length + columnSums.length)
                + (wide == null ? 0 : wideBytes(wide.channels()));
    }

    /**
     * Bytes that the buffers of a folder take at most, a snapshot of it not included.
     *
     * @throws IllegalArgumentException if a number is out of range
     */
    public static long bytes(int channels, int fineCount, int blockRows) {
        Bounds.checkChannels(channels);
        checkBlock(blockRows);
        if (fineCount < 0 || fineCount > channels) {
            throw new IllegalArgumentException("fine channels must be 0 to " + channels + ", not " + fineCount);
        }
        int width = channels + fineCount;
        return 8L * ((long) blockRows * width + 2L * Bounds.triangle(width) + width) + wideBytes(channels);
    }

    private static long wideBytes(int channels) {
        return 16L * (Bounds.triangle(channels) + channels);
    }

    private static void checkBlock(int blockRows) {
        if (blockRows < 1 || blockRows > Bounds.TRIANGLE_RECORDS) {
            throw new IllegalArgumentException(
                    "rows of a block must be 1 to " + Bounds.TRIANGLE_RECORDS + ", not " + blockRows);
        }
    }

    private void foldRows() {
        if (buffered == 0) {
            return;
        }
        if (inTriangle + buffered > Bounds.TRIANGLE_RECORDS) {
            drainTriangle();
        }
        if (triangle.length == 0) {
            triangle = new double[Bounds.triangle(width)];
        }
        kernel.fold(rows, buffered, width, triangle);
        for (int k = 0, at = 0; k < buffered; k++, at += width) {
            addRow(at);
        }
        inTriangle += buffered;
        buffered = 0;
    }

    private void addRow(int at) {
        for (int c = 0; c < width; c++) {
            columnSums[c] += rows[at + c];
        }
    }

    private void drainTriangle() {
        if (inTriangle == 0) {
            return;
        }
        if (panel.length == 0) {
            panel = new long[triangle.length];
        }
        for (int i = 0; i < triangle.length; i++) {
            panel[i] += (long) triangle[i];
            triangle[i] = 0;
        }
        inPanel += inTriangle;
        inTriangle = 0;
        if (inPanel + Bounds.TRIANGLE_RECORDS > Bounds.PANEL_RECORDS) {
            drainPanel();
        }
    }

    private Moments withPanel() {
        Moments moments = columns.moments(inPanel, columnSums, panel);
        return wide == null ? moments : wide.plus(moments);
    }

    private void drainPanel() {
        wide = withPanel();
        Arrays.fill(panel, 0);
        Arrays.fill(columnSums, 0);
        inPanel = 0;
    }
}
