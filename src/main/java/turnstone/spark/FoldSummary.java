package turnstone.spark;

import java.io.DataInputStream;
import java.io.DataOutputStream;
import java.io.IOException;

/**
 * What a partition, or all of them, did.
 *
 * @param counts records by outcome
 * @param most_bytes the most that the buffers of one task held
 * @param sumsHanded partial sums handed on
 * @param rowsHanded packs of rows handed on in place of sums
 * @param partitions how many
 */
record FoldSummary(RecordCounts counts, long most_bytes, long sumsHanded, long rowsHanded, int partitions) {
    void write(DataOutputStream out) throws IOException {
        counts.write(out);
        out.writeLong(most_bytes);
        out.writeLong(sumsHanded);
        out.writeLong(rowsHanded);
        out.writeInt(partitions);
    }

    static FoldSummary read(DataInputStream in) throws IOException {
        return new FoldSummary(RecordCounts.read(in), in.readLong(), in.readLong(), in.readLong(), in.readInt());
    }

    FoldSummary plus(FoldSummary other) {
        counts.merge(other.counts);
        return new FoldSummary(
                counts,
                Math.max(most_bytes, other.most_bytes),
                sumsHanded + other.sumsHanded,
                rowsHanded + other.rowsHanded,
                partitions + other.partitions);
    }
}
