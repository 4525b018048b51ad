package turnstone.spark;

import org.apache.spark.api.java.JavaRDD;
import turnstone.measure.SourceType;

/** One way to get at records: lines, rows or column batches. */
interface Feed {
    <R> JavaRDD<R> over(PartitionTask<R> task);

    ReadPath path();

    /** The type in which values were recorded; of several the widest. */
    SourceType sourceType();
}
