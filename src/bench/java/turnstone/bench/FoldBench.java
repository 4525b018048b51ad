package turnstone.bench;

import java.io.IOException;
import java.math.BigDecimal;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import java.util.SplittableRandom;
import java.util.function.LongSupplier;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.apache.spark.api.java.JavaRDD;
import org.apache.spark.mllib.linalg.Vector;
import org.apache.spark.mllib.linalg.Vectors;
import org.apache.spark.mllib.linalg.distributed.RowMatrix;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.RowFactory;
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
 * <p>Arguments: records (1000000), channels (128), materials (12), rounds (5), task slots (2). Prints medians in milliseconds and their ratios.
 */
public final class FoldBench {
    private static final long SEED = 20_260_301;

    private FoldBench() {}

    public static void main(String[] arguments) throws IOException {
        int[] numbers = {1_000_000, 128, 12, 5, 2};
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
        List<LongSupplier> subjects = List.of(
                () -> scan(session, table),
                () -> fold(session, table, numbers[0], numbers[1]),
                () -> covariance(session, table));
        List<String> names = List.of("bare scan", "fold", "computeCovariance");
        long[][] times = new long[subjects.size()][rounds];
        for (int round = -1; round < rounds; round++) {
            for (int s = 0; s < subjects.size(); s++) {
                long elapsed_ms = subjects.get(s).getAsLong() / 1_000_000;
                if (round >= 0) {
                    times[s][round] = elapsed_ms;
                }
            }
        }
        long[] medians = Arrays.stream(times).mapToLong(FoldBench::median).toArray();
        for (int s = 0; s < medians.length; s++) {
            System.out.println(names.get(s) + ": median " + medians[s] + " ms of " + Arrays.toString(times[s]));
        }
        System.out.println("fold / bare scan: " + (double) medians[1] / medians[0]);
        System.out.println("computeCovariance / fold: " + (double) medians[2] / medians[1]);
        System.out.println("Java " + System.getProperty("java.version") + ", " + numbers[4] + " slots, "
                + numbers[0] + " x " + numbers[1] + ", " + numbers[2] + " materials");
    }

    private static long median(long[] times) {
        long[] sorted = times.clone();
        Arrays.sort(sorted);
        return sorted[sorted.length / 2];
    }

    private static void write(Session session, String table, int records, int channels, int materials) {
        int parts = 8;
        List<Integer> numbers = IntStream.range(0, parts).boxed().toList();
        JavaRDD<Row> rows = session.context().parallelize(numbers, parts).flatMap(part -> {
            SplittableRandom random = new SplittableRandom(SEED + part);
            return IntStream.range(0, records / parts)
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

    private static long scan(Session session, String table) {
        long start = System.nanoTime();
        session.spark().read().parquet(table).write().format("noop").mode("overwrite").save();
        return System.nanoTime() - start;
    }

    private static long fold(Session session, String table, int records, int channels) {
        long start = System.nanoTime();
        ColumnNames columns =
                ColumnNames.array(java.util.Map.of(KeyColumn.MATERIAL, "material"), "channels", channels);
        RecordSource source =
                RecordSource.open(session, new TableSpec(List.of(table), TableSpec.Form.PARQUET, columns));
        CountScale scale =
                CountScale.uniform(channels, BigDecimal.ONE, new BigDecimal("0.00001"), Precision.COARSE);
        FoldResult result =
                FoldJob.run(source, IntakeSpec.table(HeadSpec.none(channels), scale), FoldSettings.usual());
        if (result.counts().accepted() != records / 8 * 8) {
            throw new IllegalStateException("records are missing: " + result.counts().accepted());
        }
        return System.nanoTime() - start;
    }

    private static long covariance(Session session, String table) {
        long start = System.nanoTime();
        JavaRDD<Vector> rows = session.spark().read().parquet(table).select("channels").javaRDD().map(row -> {
            List<Float> values = new ArrayList<>(row.<Float>getList(0));
            return Vectors.dense(values.stream().mapToDouble(Float::doubleValue).toArray());
        });
        new RowMatrix(rows.rdd()).computeCovariance();
        return System.nanoTime() - start;
    }

    private static void remove(Path folder) throws IOException {
        try (Stream<Path> below = Files.walk(folder)) {
            for (Path path : below.sorted(Comparator.reverseOrder()).toList()) {
                Files.delete(path);
            }
        }
    }
}
