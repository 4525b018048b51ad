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
                .mapPartitions(
                        (Iterator<ColumnarBatch> batches) -> task.run(new RowCursor(new BatchRows(batches), columns)));
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
        private Iterator<InternalRow> current = Collections.emptyIterator();

        BatchRows(Iterator<ColumnarBatch> batches) {
            this.batches = batches;
        }

        @Override
        public boolean hasNext() {
            while (!current.hasNext()) {
                if (!batches.hasNext()) {
                    return false;
                }
                current = batches.next().rowIterator();
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
