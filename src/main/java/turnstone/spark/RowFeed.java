package turnstone.spark;

import java.util.Iterator;
import org.apache.spark.api.java.JavaRDD;
import org.apache.spark.sql.Dataset;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.catalyst.InternalRow;
import turnstone.measure.SourceType;

/** Records from the rows of any frame. */
final class RowFeed implements Feed {
    private final Dataset<Row> frame;
    private final RowLayout layout;

    RowFeed(Dataset<Row> frame, RowLayout layout) {
        this.frame = frame;
        this.layout = layout;
    }

    @Override
    public <R> JavaRDD<R> over(PartitionTask<R> task) {
        RowLayout columns = layout;
        return frame.queryExecution()
                .toRdd()
                .toJavaRDD()
                .mapPartitions((Iterator<InternalRow> rows) -> task.run(new RowCursor(rows, columns, () -> true)));
    }

    @Override
    public SourceType sourceType() {
        return layout.sourceType();
    }

    @Override
    public ReadPath path() {
        return ReadPath.ROWS;
    }
}
