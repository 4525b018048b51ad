package turnstone.spark;

import turnstone.measure.CountScale;
import turnstone.moments.BlockKernel;
import turnstone.moments.BlockKernels;
import turnstone.moments.RowFolder;

/** Sizes that all folds of a task share, and the kernel. */
final class FoldShape {
    private final int channels;
    private final boolean[] fine;
    private final int blockRows;
    private final BlockKernel kernel;
    private final long folder_bytes;

    FoldShape(CountScale scale, FoldSettings settings) {
        this.channels = scale.channels();
        this.fine = scale.fineChannels();
        this.blockRows = settings.blockRows();
        this.kernel = BlockKernels.choose(settings.kernel());
        this.folder_bytes = folder_bytes(scale, settings);
    }

    static long folder_bytes(CountScale scale, FoldSettings settings) {
        int fineCount = 0;
        for (boolean isFine : scale.fineChannels()) {
            fineCount += isFine ? 1 : 0;
        }
        return RowFolder.bytes(scale.channels(), fineCount, settings.blockRows());
    }

    /** The least bound under which a task can work: one folder, the rows it grows from, one showing's sums. */
    static long least_bytes(CountScale scale, FoldSettings settings) {
        return folder_bytes(scale, settings) + 8L * scale.channels() * (mostRows(scale.channels()) + 4);
    }

    int channels() {
        return channels;
    }

    boolean isFine(int channel) {
        return fine[channel];
    }

    boolean anyFine() {
        for (boolean isFine : fine) {
            if (isFine) {
                return true;
            }
        }
        return false;
    }

    /** Up to so many records of a key rows are cheaper to hand on than sums. */
    int mostRows() {
        return mostRows(channels);
    }

    private static int mostRows(int channels) {
        return Math.max(1, channels / 2);
    }

    long folder_bytes() {
        return folder_bytes;
    }

    RowFolder folder() {
        return new RowFolder(channels, fine, kernel, blockRows);
    }
}
