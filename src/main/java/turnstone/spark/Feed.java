package turnstone.spark;

import org.apache.spark.api.java.JavaRDD;

/** One way to get at records: lines, rows or column batches. */
interface Feed {
    <R> JavaRDD<R> over(PartitionTask<R> task);

    ReadPath path();
}
