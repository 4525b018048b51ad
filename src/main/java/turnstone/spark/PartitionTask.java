package turnstone.spark;

import java.io.Serializable;
import java.util.Iterator;

/** What a job does with the records of one partition; its result is pulled, so that it need not hold all of it. */
@FunctionalInterface
interface PartitionTask<R> extends Serializable {
    Iterator<R> run(RecordCursor cursor);
}
