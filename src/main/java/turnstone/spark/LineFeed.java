package turnstone.spark;

import java.util.Iterator;
import java.util.List;
import org.apache.hadoop.conf.Configuration;
import org.apache.spark.api.java.JavaRDD;
import org.apache.spark.api.java.JavaSparkContext;
import org.apache.spark.broadcast.Broadcast;
import org.apache.spark.util.SerializableConfiguration;
import turnstone.measure.SourceType;

/** Records from the lines of CSV files. */
final class LineFeed implements Feed {
    private final JavaSparkContext context;
    private final List<CsvSplit> splits;
    private final LineLayout layout;
    private final Configuration configuration;

    LineFeed(JavaSparkContext context, List<CsvSplit> splits, LineLayout layout, Configuration configuration) {
        this.context = context;
        this.splits = List.copyOf(splits);
        this.layout = layout;
        this.configuration = configuration;
    }

    @Override
    public <R> JavaRDD<R> over(PartitionTask<R> task) {
        Broadcast<SerializableConfiguration> settings = context.broadcast(new SerializableConfiguration(configuration));
        LineLayout columns = layout;
        return context.parallelize(splits, Math.max(1, splits.size()))
                .mapPartitions((Iterator<CsvSplit> part) ->
                        task.run(new LineCursor(part, columns, settings.value().value())));
    }

    @Override
    public SourceType sourceType() {
        return SourceType.DECIMAL;
    }

    @Override
    public ReadPath path() {
        return ReadPath.LINES;
    }
}
