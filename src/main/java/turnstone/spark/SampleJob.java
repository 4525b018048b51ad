package turnstone.spark;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Iterator;
import java.util.List;
import java.util.stream.IntStream;
import org.apache.spark.api.java.JavaRDD;
import org.apache.spark.sql.Dataset;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.RowFactory;
import org.apache.spark.sql.SaveMode;
import org.apache.spark.sql.types.DataTypes;
import org.apache.spark.sql.types.StructType;
import turnstone.fault.Fault;
import turnstone.measure.ReferenceKind;
import turnstone.sample.SamplePlant;
import turnstone.sample.SampleRecord;
import turnstone.sample.SampleReference;
import turnstone.sample.SampleShowing;
import turnstone.sample.SampleSize;

/**
 * Writes the invented plant: {@code records/DAY} and {@code references} as Parquet, then {@code plant.yaml}. The plant file comes last: where
 * it is, all the rest is.
 *
 * <p>Each task makes its own showings from the seed, so nothing but numbers goes to the workers.
 */
public final class SampleJob {
    private static final int FILES_A_NIGHT = 2;

    private SampleJob() {}

    /**
     * Writes a plant's folder.
     *
     * @return the records written
     * @throws Fault of kind storage where the folder can't be written
     */
    public static long write(Session session, SamplePlant plant, Path folder) {
        long records = 0;
        for (LocalDate night : plant.nights()) {
            records +=
                    writeNight(session, plant, night, folder.resolve("records").resolve(night.toString()));
        }
        writeReferences(session, plant, folder.resolve("references"));
        try {
            Files.write(
                    folder.resolve("plant.yaml"), plant.plantYaml(Path.of("")).getBytes(StandardCharsets.UTF_8));
        } catch (IOException e) {
            throw Fault.storage("the invented plant can't be written")
                    .at(folder.toString())
                    .found(e.getClass().getSimpleName() + " " + e.getMessage())
                    .because(e);
        }
        return records;
    }

    private static long writeNight(Session session, SamplePlant plant, LocalDate night, Path target) {
        int showings = plant.showings(night).size();
        SampleSize size = plant.size();
        long seed = plant.seed();
        List<Integer> numbers = IntStream.range(0, showings).boxed().toList();
        JavaRDD<Row> rows = session.context()
                .parallelize(numbers, FILES_A_NIGHT)
                .mapPartitions(taken -> {
                    SamplePlant again = SamplePlant.of(size, seed);
                    List<SampleShowing> all = again.showings(night);
                    return flat(taken, number -> again.records(all.get(number)));
                });
        save(session.spark().createDataFrame(rows, recordSchema()), target);
        return SparkTrouble.guard(
                "counting the invented plant",
                () -> session.spark().read().parquet(target.toUri().toString()).count());
    }

    private interface Maker {
        List<SampleRecord> records(int number);
    }

    private static Iterator<Row> flat(Iterator<Integer> numbers, Maker maker) {
        return new Iterator<>() {
            private Iterator<SampleRecord> current = List.<SampleRecord>of().iterator();

            @Override
            public boolean hasNext() {
                while (!current.hasNext() && numbers.hasNext()) {
                    current = maker.records(numbers.next()).iterator();
                }
                return current.hasNext();
            }

            @Override
            public Row next() {
                if (!hasNext()) {
                    throw new java.util.NoSuchElementException();
                }
                return row(current.next());
            }
        };
    }

    private static Row row(SampleRecord record) {
        return RowFactory.create(
                record.day().toString(),
                record.sorter(),
                record.showing(),
                record.tray(),
                record.material(),
                record.piece(),
                record.beltColumn(),
                record.time_ms(),
                record.counts());
    }

    private static StructType recordSchema() {
        return new StructType()
                .add("day", DataTypes.StringType)
                .add("sorter", DataTypes.StringType)
                .add("showing", DataTypes.StringType)
                .add("tray", DataTypes.StringType)
                .add("material", DataTypes.StringType)
                .add("piece", DataTypes.StringType)
                .add("belt_column", DataTypes.IntegerType)
                .add("time_ms", DataTypes.LongType)
                .add("counts", DataTypes.createArrayType(DataTypes.IntegerType, false));
    }

    private static void writeReferences(Session session, SamplePlant plant, Path target) {
        List<Row> rows = new ArrayList<>();
        for (LocalDate night : plant.nights()) {
            for (SampleReference reference : plant.references(night)) {
                rows.add(RowFactory.create(
                        reference.kind() == ReferenceKind.DARK ? "dark" : "white",
                        reference.sorter(),
                        reference.beltColumn(),
                        reference.time_ms(),
                        reference.values()));
            }
        }
        StructType schema = new StructType()
                .add("kind", DataTypes.StringType)
                .add("sorter", DataTypes.StringType)
                .add("belt_column", DataTypes.IntegerType)
                .add("time_ms", DataTypes.LongType)
                .add("counts", DataTypes.createArrayType(DataTypes.DoubleType, false));
        save(session.spark().createDataFrame(session.context().parallelize(rows, 1), schema), target);
    }

    private static void save(Dataset<Row> frame, Path target) {
        SparkTrouble.guard("writing the invented plant", () -> {
            frame.write().mode(SaveMode.Overwrite).parquet(target.toUri().toString());
            return target;
        });
    }
}
