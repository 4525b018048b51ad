package turnstone.spark;

import java.util.HashMap;
import java.util.Map;
import java.util.function.LongConsumer;
import org.apache.spark.scheduler.AccumulableInfo;
import org.apache.spark.scheduler.SparkListener;
import org.apache.spark.scheduler.SparkListenerExecutorMetricsUpdate;
import org.apache.spark.scheduler.SparkListenerJobStart;
import org.apache.spark.scheduler.SparkListenerTaskEnd;
import scala.Tuple4;
import scala.collection.Iterator;
import scala.collection.immutable.Seq;

/**
 * Tells how many records a job has read so far, from the engine's own metrics: for the eye only, no result rests on it. Starts anew with each
 * job; a task that runs reports with the engine's heartbeat.
 */
public final class ReadProgress extends SparkListener {
    private static final String RECORDS_READ = "internal.metrics.input.recordsRead";

    private final LongConsumer told;
    private final Map<Long, Long> byTask = new HashMap<>();

    private ReadProgress(LongConsumer told) {
        this.told = told;
    }

    /** Tells this consumer from now on, on a thread of the engine. */
    public static void tell(Session session, LongConsumer told) {
        session.spark().sparkContext().addSparkListener(new ReadProgress(told));
    }

    @Override
    public synchronized void onJobStart(SparkListenerJobStart start) {
        byTask.clear();
    }

    @Override
    public synchronized void onTaskEnd(SparkListenerTaskEnd end) {
        if (end.taskMetrics() != null) {
            note(end.taskInfo().taskId(), end.taskMetrics().inputMetrics().recordsRead());
        }
    }

    @Override
    public synchronized void onExecutorMetricsUpdate(SparkListenerExecutorMetricsUpdate update) {
        Iterator<Tuple4<Object, Object, Object, Seq<AccumulableInfo>>> tasks =
                update.accumUpdates().iterator();
        while (tasks.hasNext()) {
            var task = tasks.next();
            Iterator<AccumulableInfo> metrics = task._4().iterator();
            while (metrics.hasNext()) {
                AccumulableInfo metric = metrics.next();
                if (metric.name().contains(RECORDS_READ) && metric.update().isDefined()) {
                    note((Long) task._1(), ((Number) metric.update().get()).longValue());
                }
            }
        }
    }

    private void note(long task, long records) {
        byTask.merge(task, records, Math::max);
        told.accept(byTask.values().stream().mapToLong(Long::longValue).sum());
    }
}
