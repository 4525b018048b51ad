package turnstone.spark;

import java.io.DataInputStream;
import java.io.IOException;
import turnstone.moments.Moments;
import turnstone.moments.MomentsAccumulator;
import turnstone.moments.RowFolder;

/** Gathers the parts of one key, rows or sums. */
final class MomentsMerge {
    /** A payload of rows of counts. */
    static final int ROWS = 0;

    /** A payload of moments. */
    static final int SUMS = 1;

    private final FoldShape shape;
    private final MomentsAccumulator sums;
    private final double[] row;
    private RowFolder folder;

    MomentsMerge(FoldShape shape) {
        this.shape = shape;
        this.sums = MomentsAccumulator.empty(shape.channels());
        this.row = new double[shape.channels()];
    }

    void add(byte[] payload) {
        Payloads.read(payload, in -> {
            if (in.readByte() == SUMS) {
                sums.merge(Moments.fromBytes(in.readAllBytes()));
            } else {
                addRows(in);
            }
            return null;
        });
    }

    private void addRows(DataInputStream in) throws IOException {
        if (folder == null) {
            folder = shape.folder();
        }
        int rows = in.readInt();
        for (int r = 0; r < rows; r++) {
            for (int c = 0; c < row.length; c++) {
                row[c] = shape.isFine(c) ? in.readLong() : in.readInt();
            }
            folder.add(row, 0);
        }
    }

    byte[] result() {
        if (folder != null) {
            sums.merge(folder.snapshot());
        }
        return sums.snapshot().toBytes();
    }
}
