package turnstone.cluster;

import java.util.List;
import java.util.stream.IntStream;
import org.apache.spark.SparkEnv;
import org.apache.spark.api.java.JavaSparkContext;
import org.apache.spark.sql.SparkSession;
import scala.Tuple2;

/** A small program for the cluster: sums 1 to 1000 in eight tasks, names the executors that took part, ends with the code it was given. */
public final class SumJob {
    private SumJob() {}

    public static void main(String[] arguments) {
        SparkSession session = SparkSession.builder().appName("sum").getOrCreate();
        JavaSparkContext context = JavaSparkContext.fromSparkContext(session.sparkContext());
        List<Tuple2<String, Integer>> parts = context.parallelize(
                        IntStream.rangeClosed(1, 1000).boxed().toList(), 8)
                .glom()
                .map(numbers -> {
                    // Long enough for both executors to be handed a share.
                    Thread.sleep(200);
                    return new Tuple2<>(
                            SparkEnv.get().executorId(),
                            numbers.stream().mapToInt(Integer::intValue).sum());
                })
                .collect();
        System.out.println("sum " + parts.stream().mapToInt(Tuple2::_2).sum());
        System.out.println("executors "
                + parts.stream().map(Tuple2::_1).distinct().sorted().toList());
        session.stop();
        System.exit(Integer.parseInt(arguments[0]));
    }
}
