package turnstone.spark;

import java.util.Collections;
import java.util.Iterator;
import java.util.List;
import java.util.NoSuchElementException;
import java.util.Optional;
import org.apache.spark.api.java.JavaRDD;
import org.apache.spark.sql.Dataset;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.catalyst.InternalRow;
import org.apache.spark.sql.catalyst.expressions.Attribute;
import org.apache.spark.sql.execution.ColumnarToRowExec;
import org.apache.spark.sql.execution.FileSourceScanExec;
import org.apache.spark.sql.execution.InputAdapter;
import org.apache.spark.sql.execution.SparkPlan;
import org.apache.spark.sql.execution.WholeStageCodegenExec;
import org.apache.spark.sql.vectorized.ColumnarBatch;
import scala.jdk.javaapi.CollectionConverters;
import turnstone.measure.SourceType;

/**
 * Records from the column batches of a file scan, without the turn into rows.
 *
 * <p>Only where nothing above the scan changes the records: a filter, a cast or a projection there would be skipped without a word.
 */
final class BatchFeed implements Feed {
    private final FileSourceScanExec scan;
    private final RowLayout layout;

    private BatchFeed(FileSourceScanExec scan, RowLayout layout) {
        this.scan = scan;
        this.layout = layout;
    }

    /** The scan of a frame whose plan is nothing but a columnar scan of files; else empty. */
    static Optional<FileSourceScanExec> bareScan(Dataset<Row> frame) {
        SparkPlan plan = frame.queryExecution().executedPlan();
        while (plan instanceof ColumnarToRowExec
                || plan instanceof InputAdapter
                || plan instanceof WholeStageCodegenExec) {
            plan = plan.children().head();
        }
        return plan instanceof FileSourceScanExec scan && scan.supportsColumnar()
                ? Optional.of(scan)
                : Optional.empty();
    }

    /** The names of the scan's columns, in the order of its batches. */
    static List<String> order(FileSourceScanExec scan) {
        return CollectionConverters.asJava(scan.output()).stream()
                .map(Attribute::name)
                .toList();
    }

    static BatchFeed of(FileSourceScanExec scan, RowLayout layout) {
        return new BatchFeed(scan, layout);
    }

    @Override
    public <R> JavaRDD<R> over(PartitionTask<R> task) {
        RowLayout columns = layout;
        return scan.executeColumnar()
                .toJavaRDD()
                .mapPartitions((Iterator<ColumnarBatch> batches) -> run(task, batches, columns));
    }

    private static <R> Iterator<R> run(PartitionTask<R> task, Iterator<ColumnarBatch> batches, RowLayout columns) {
        BatchRows rows = new BatchRows(batches, columns);
        return task.run(new RowCursor(rows, columns, rows::elementsMayBeNull));
    }

    @Override
    public SourceType sourceType() {
        return layout.sourceType();
    }

    @Override
    public ReadPath path() {
        return ReadPath.COLUMN_BATCHES;
    }

    /** The rows of batch after batch; the row object is the batch's own and moves along. */
    private static final class BatchRows implements Iterator<InternalRow> {
        private final Iterator<ColumnarBatch> batches;
        private final int arrayAt;
        private boolean elementsMayBeNull = true;
        private Iterator<InternalRow> current = Collections.emptyIterator();

        BatchRows(Iterator<ColumnarBatch> batches, RowLayout columns) {
            this.batches = batches;
            this.arrayAt = columns.layout() == ColumnNames.Layout.ARRAY ? columns.channelAt()[0] : -1;
        }

        /** Known for a whole batch, which saves looking at every element. */
        boolean elementsMayBeNull() {
            return elementsMayBeNull;
        }

        @Override
        public boolean hasNext() {
            while (!current.hasNext()) {
                if (!batches.hasNext()) {
                    return false;
                }
                ColumnarBatch batch = batches.next();
                elementsMayBeNull =
                        arrayAt < 0 || batch.column(arrayAt).getChild(0).hasNull();
                current = batch.rowIterator();
            }
            return true;
        }

        @Override
        public InternalRow next() {
            if (!hasNext()) {
                throw new NoSuchElementException();
            }
            return current.next();
        }
    }
}
