package turnstone.bench;

import com.sun.management.OperatingSystemMXBean;
import java.io.IOException;
import java.lang.management.ManagementFactory;
import java.math.BigDecimal;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import java.util.SplittableRandom;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.apache.spark.api.java.JavaRDD;
import org.apache.spark.mllib.linalg.Vector;
import org.apache.spark.mllib.linalg.Vectors;
import org.apache.spark.mllib.linalg.distributed.RowMatrix;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.RowFactory;
import org.apache.spark.sql.execution.FileSourceScanExec;
import org.apache.spark.sql.execution.SparkPlan;
import org.apache.spark.sql.types.DataTypes;
import org.apache.spark.sql.types.StructType;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.Precision;
import turnstone.spark.ColumnNames;
import turnstone.spark.FoldJob;
import turnstone.spark.FoldResult;
import turnstone.spark.FoldSettings;
import turnstone.spark.IntakeSpec;
import turnstone.spark.KeyColumn;
import turnstone.spark.RecordSource;
import turnstone.spark.Session;
import turnstone.spark.TableSpec;

/**
 * The fold of a table beside a bare scan of it and beside MLlib's {@code RowMatrix.computeCovariance} on the same rows, in one run and in turn.
 *
 * <p>Arguments: records (1000000), channels (128), materials (12), rounds (7), task slots (2). Prints medians of wall and processor
 * time (of the whole process, collector and compilers included: other load disturbs it less), and medians of the ratios of the same round.
 */
public final class FoldBench {
    private static final long SEED = 20_260_301;
    private static final int PARTS = 8;
    private static final int WARM_UP_ROUNDS = 2;
    private static final double NANOS_PER_MS = 1e6;
    private static final OperatingSystemMXBean PROCESS =
            (OperatingSystemMXBean) ManagementFactory.getOperatingSystemMXBean();

    private FoldBench() {}

    public static void main(String[] arguments) throws IOException {
        int[] numbers = {1_000_000, 128, 12, 7, 2};
        for (int i = 0; i < arguments.length; i++) {
            numbers[i] = Integer.parseInt(arguments[i]);
        }
        Path folder = Files.createTempDirectory("turnstone-bench-");
        try (Session session = Session.open(Session.Settings.local("fold benchmark", numbers[4]))) {
            run(session, folder.resolve("records").toString(), numbers);
        } finally {
            remove(folder);
        }
    }

    private static void run(Session session, String table, int[] numbers) {
        write(session, table, numbers[0], numbers[1], numbers[2]);
        int rounds = numbers[3];
        List<String> names = List.of("bare scan", "column batches", "fold", "computeCovariance");
        List<Runnable> subjects = List.of(
                () -> scan(session, table),
                () -> batches(session, table),
                () -> fold(session, table, numbers[0], numbers[1]),
                () -> covariance(session, table));
        double[][] wall_ms = new double[subjects.size()][rounds];
        double[][] processor_ms = new double[subjects.size()][rounds];
        for (int round = -WARM_UP_ROUNDS; round < rounds; round++) {
            for (int s = 0; s < subjects.size(); s++) {
                long start = System.nanoTime();
                long before = PROCESS.getProcessCpuTime();
                subjects.get(s).run();
                if (round >= 0) {
                    processor_ms[s][round] = (PROCESS.getProcessCpuTime() - before) / NANOS_PER_MS;
                    wall_ms[s][round] = (System.nanoTime() - start) / NANOS_PER_MS;
                }
            }
        }
        System.out.printf(
                "Java %s, %d processors, %d task slots, %d x %d floats as Parquet, %d materials, medians of %d rounds in turn%n",
                Runtime.version(),
                Runtime.getRuntime().availableProcessors(),
                numbers[4],
                numbers[0],
                numbers[1],
                numbers[2],
                rounds);
        System.out.printf("%-18s %12s %22s%n", "", "wall, ms", "processor time, ms");
        for (int s = 0; s < names.size(); s++) {
            System.out.printf("%-18s %12.0f %22.0f%n", names.get(s), median(wall_ms[s]), median(processor_ms[s]));
        }
        print("fold / bare scan", wall_ms[2], wall_ms[0], processor_ms[2], processor_ms[0]);
        print("fold / column batches", wall_ms[2], wall_ms[1], processor_ms[2], processor_ms[1]);
        print("computeCovariance / fold", wall_ms[3], wall_ms[2], processor_ms[3], processor_ms[2]);
    }

    /** Medians of the ratios of the same round. */
    private static void print(String what, double[] wall, double[] otherWall, double[] cpu, double[] otherCpu) {
        System.out.printf("%-26s %6.2f × %22.2f ×%n", what, ratio(wall, otherWall), ratio(cpu, otherCpu));
    }

    private static double ratio(double[] ours, double[] theirs) {
        double[] ratios = new double[ours.length];
        Arrays.setAll(ratios, i -> ours[i] / theirs[i]);
        return median(ratios);
    }

    private static double median(double[] values) {
        double[] sorted = values.clone();
        Arrays.sort(sorted);
        return sorted[sorted.length / 2];
    }

    private static void write(Session session, String table, int records, int channels, int materials) {
        List<Integer> numbers = IntStream.range(0, PARTS).boxed().toList();
        JavaRDD<Row> rows = session.context().parallelize(numbers, PARTS).flatMap(part -> {
            SplittableRandom random = new SplittableRandom(SEED + part);
            return IntStream.range(0, records / PARTS)
                    .mapToObj(i -> row(random, channels, "material " + random.nextInt(materials)))
                    .iterator();
        });
        StructType schema = new StructType()
                .add("material", DataTypes.StringType)
                .add("channels", DataTypes.createArrayType(DataTypes.FloatType, false));
        session.spark().createDataFrame(rows, schema).write().parquet(table);
    }

    private static Row row(SplittableRandom random, int channels, String material) {
        float[] values = new float[channels];
        for (int c = 0; c < channels; c++) {
            values[c] = random.nextInt(200_000) / 100_000f;
        }
        return RowFactory.create(material, values);
    }

    private static void scan(Session session, String table) {
        session.spark()
                .read()
                .parquet(table)
                .write()
                .format("noop")
                .mode("overwrite")
                .save();
    }

    /** The engine's own column batches, every array looked at and no more. */
    private static void batches(Session session, String table) {
        SparkPlan plan = session.spark().read().parquet(table).queryExecution().executedPlan();
        while (!(plan instanceof FileSourceScanExec)) {
            plan = plan.children().head();
        }
        long values = plan.executeColumnar()
                .toJavaRDD()
                .map(batch -> {
                    long seen = 0;
                    for (int r = 0; r < batch.numRows(); r++) {
                        seen += batch.column(1).getArray(r).numElements();
                    }
                    return seen;
                })
                .fold(0L, Long::sum);
        if (values == 0) {
            throw new IllegalStateException("no values");
        }
    }

    private static void fold(Session session, String table, int records, int channels) {
        ColumnNames columns =
                ColumnNames.array(java.util.Map.of(KeyColumn.MATERIAL, "material"), "channels", channels);
        RecordSource source =
                RecordSource.open(session, new TableSpec(List.of(table), TableSpec.Form.PARQUET, columns));
        CountScale scale =
                CountScale.uniform(channels, BigDecimal.ONE, new BigDecimal("0.00001"), Precision.COARSE);
        FoldResult result =
                FoldJob.run(source, IntakeSpec.table(HeadSpec.none(channels), scale), FoldSettings.usual());
        if (result.counts().accepted() != (long) (records / PARTS) * PARTS) {
            throw new IllegalStateException("records are missing: " + result.counts().accepted());
        }
    }

    /** MLlib on the same rows, brought to its vectors by the shortest way there is: no boxed number, no copy but the one to double. */
    private static void covariance(Session session, String table) {
        JavaRDD<Vector> rows = session.spark()
                .read()
                .parquet(table)
                .select("channels")
                .queryExecution()
                .toRdd()
                .toJavaRDD()
                .map(row -> {
                    float[] values = row.getArray(0).toFloatArray();
                    double[] wide = new double[values.length];
                    for (int c = 0; c < wide.length; c++) {
                        wide[c] = values[c];
                    }
                    return Vectors.dense(wide);
                });
        new RowMatrix(rows.rdd()).computeCovariance();
    }

    private static void remove(Path folder) throws IOException {
        try (Stream<Path> below = Files.walk(folder)) {
            for (Path path : below.sorted(Comparator.reverseOrder()).toList()) {
                Files.delete(path);
            }
        }
    }
}
