package turnstone.spark;

import java.io.DataOutputStream;
import java.io.IOException;
import java.util.Arrays;
import turnstone.moments.RowFolder;

/**
 * The records of one key within one task: kept as rows while they are few, folded from then on.
 *
 * <p>Sums are about d²/2 numbers, rows are n·d: below n = d/2 rows are the cheaper thing to hand on. Same result either way. Not
 * thread-safe.
 */
final class KeyFold {
    private static final int FIRST_ROWS = 4;

    private final FoldShape shape;
    private double[] rows = {};
    private int rowCount;
    private RowFolder folder;

    KeyFold(FoldShape shape) {
        this.shape = shape;
    }

    /** Adds one record; may grow by {@link #growth_bytes} at most. */
    void add(double[] counts) {
        if (folder == null) {
            if (rowCount < shape.mostRows()) {
                keep(counts);
                return;
            }
            folder = shape.folder();
            for (int r = 0; r < rowCount; r++) {
                folder.addCounted(rows, r * shape.channels());
            }
            rows = new double[0];
            rowCount = 0;
        }
        folder.addCounted(counts, 0);
    }

    private void keep(double[] counts) {
        int d = shape.channels();
        if ((rowCount + 1) * d > rows.length) {
            rows = Arrays.copyOf(rows, nextRows() * d);
        }
        System.arraycopy(counts, 0, rows, rowCount * d, d);
        rowCount++;
    }

    private int nextRows() {
        return Math.min(shape.mostRows(), Math.max(FIRST_ROWS, 2 * rowCount));
    }

    /** By how much the next record can make the buffers larger, the old ones still there while they are copied. */
    long growth_bytes() {
        if (folder != null) {
            return 0;
        }
        if (rowCount >= shape.mostRows()) {
            return shape.folder_bytes();
        }
        return (rowCount + 1) * shape.channels() > rows.length ? 8L * nextRows() * shape.channels() : 0;
    }

    /** Bytes held; of a folder what it may come to. */
    long bytes() {
        return folder == null ? 8L * rows.length : shape.folder_bytes();
    }

    /** Bytes that the folder takes at this moment; 0 without one. */
    long folderNow_bytes() {
        return folder == null ? 0 : folder.bytes();
    }

    /** Hands on what is held. */
    byte[] payload() {
        if (folder != null) {
            byte[] moments = folder.snapshot().toBytes();
            return Payloads.bytes(out -> {
                out.writeByte(MomentsMerge.SUMS);
                out.write(moments);
            });
        }
        return Payloads.bytes(this::writeRows);
    }

    private void writeRows(DataOutputStream out) throws IOException {
        out.writeByte(MomentsMerge.ROWS);
        out.writeInt(rowCount);
        int d = shape.channels();
        for (int r = 0; r < rowCount; r++) {
            for (int c = 0; c < d; c++) {
                long count = (long) rows[r * d + c];
                if (shape.isFine(c)) {
                    out.writeLong(count);
                } else {
                    out.writeInt((int) count);
                }
            }
        }
    }
}
