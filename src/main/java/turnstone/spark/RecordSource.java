package turnstone.spark;

import java.util.List;
import java.util.Optional;
import org.apache.spark.api.java.JavaRDD;
import org.apache.spark.sql.Dataset;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.execution.FileSourceScanExec;
import turnstone.fault.Fault;
import turnstone.measure.SourceType;

/**
 * A table of records, ready to be walked partition by partition, with its files counted apart from the job.
 *
 * <p>Made by {@link #open} from files or by {@link #ofFrame} from any frame of the engine.
 */
public final class RecordSource {
    private final Session session;
    private final TableColumns columns;
    private final int channels;
    private final List<SourceFile> files;
    private final long rows;
    private final Feed feed;

    RecordSource(Session session, TableColumns columns, int channels, List<SourceFile> files, long rows, Feed feed) {
        this.session = session;
        this.columns = columns;
        this.channels = channels;
        this.files = List.copyOf(files);
        this.rows = rows;
        this.feed = feed;
    }

    /**
     * Finds, counts and checks the files.
     *
     * @throws Fault of kind input where there are none, a column is missing or of the wrong type, a header differs or a file is given
     *     twice; of kind storage where one can't be read
     */
    public static RecordSource open(Session session, TableSpec spec) {
        return RecordSourceOpening.open(session, spec, RecordSourceOpening.CSV_SPLIT_BYTES);
    }

    /**
     * Records of a frame; nothing that it does to its records is skipped.
     *
     * @param rows its records as counted by the caller, or -1: then the job's count is taken as it is
     */
    public static RecordSource ofFrame(Session session, Dataset<Row> frame, ColumnNames names, long rows) {
        List<String> order = List.of(frame.columns());
        TableColumns columns = TableColumns.resolve(names, order, "frame");
        int channels = names.layout() == ColumnNames.Layout.ARRAY
                ? names.channelCount()
                : columns.channels().size();
        if (channels <= 0) {
            throw new IllegalArgumentException("an array column of a frame needs its channel count");
        }
        return new RecordSource(session, columns, channels, List.of(), rows, feed(frame, columns, "frame"));
    }

    static Feed feed(Dataset<Row> frame, TableColumns columns, String place) {
        Optional<FileSourceScanExec> scan = BatchFeed.bareScan(frame);
        if (scan.isPresent()) {
            List<String> order = BatchFeed.order(scan.get());
            if (order.containsAll(columns.texts()) && order.containsAll(columns.channels())) {
                return BatchFeed.of(scan.get(), RowLayout.of(columns, order, frame.schema(), place));
            }
        }
        List<String> order = List.of(frame.columns());
        return new RowFeed(frame, RowLayout.of(columns, order, frame.schema(), place));
    }

    /** The files, by address; none for a frame. */
    public List<SourceFile> files() {
        return files;
    }

    /** The records, counted on the driver from footers and line ends; -1 where nobody counted. */
    public long rows() {
        return rows;
    }

    /** The number of channels of a record. */
    public int channels() {
        return channels;
    }

    /** Names of the channels: their columns, or the array column's name with a number from 1. */
    public List<String> channelNames() {
        if (columns.layout() == ColumnNames.Layout.COLUMNS) {
            return columns.channels();
        }
        String column = columns.channels().get(0);
        return java.util.stream.IntStream.rangeClosed(1, channels)
                .mapToObj(number -> column + " " + number)
                .toList();
    }

    /** Names of the columns read as text: keys, then those carried through. */
    public List<String> textColumns() {
        return columns.texts();
    }

    /** By which way the records come in. */
    public ReadPath readPath() {
        return feed.path();
    }

    /** The type in which values were recorded; of columns of several types the one with the least distance between values. */
    SourceType sourceType() {
        return feed.sourceType();
    }

    /** The same table, walked in another way. */
    RecordSource fedBy(Feed other) {
        return new RecordSource(session, columns, channels, files, rows, other);
    }

    TableColumns columns() {
        return columns;
    }

    Session session() {
        return session;
    }

    <R> JavaRDD<R> over(PartitionTask<R> task) {
        return feed.over(task);
    }

    /** Holds the job's count against the independent one. */
    void requireAll(long read) {
        if (rows >= 0 && rows != read) {
            throw Fault.storage("records read by the job differ from those counted apart from it")
                    .found(read)
                    .expected(rows)
                    .remedy("run it again when the files are no longer being written");
        }
    }
}
