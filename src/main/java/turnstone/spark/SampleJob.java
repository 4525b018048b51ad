package turnstone.spark;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Iterator;
import java.util.List;
import java.util.NoSuchElementException;
import java.util.stream.IntStream;
import org.apache.spark.api.java.JavaRDD;
import org.apache.spark.sql.Dataset;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.SaveMode;
import org.apache.spark.sql.SparkSession;
import org.apache.spark.sql.catalyst.InternalRow;
import org.apache.spark.sql.catalyst.expressions.GenericInternalRow;
import org.apache.spark.sql.catalyst.expressions.UnsafeArrayData;
import org.apache.spark.sql.types.DataTypes;
import org.apache.spark.sql.types.StructType;
import org.apache.spark.unsafe.types.UTF8String;
import turnstone.fault.Fault;
import turnstone.measure.ReferenceKind;
import turnstone.sample.SampleMaker;
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
    /** The column that a night's folder is named by while it is written; its value again is in the column of the day. */
    private static final String NIGHT = "night";

    private SampleJob() {}

    /**
     * Writes a plant's folder.
     *
     * @return the records written
     * @throws Fault of kind storage where the folder can't be written
     */
    public static long write(Session session, SamplePlant plant, Path folder) {
        try {
            Path records = folder.resolve("records");
            writeNights(session, plant, folder.resolve("records.aside"), records);
            writeReferences(session, plant, folder.resolve("references"));
            long written = count(session, records);
            Files.write(
                    folder.resolve("plant.yaml"), plant.plantYaml(Path.of("")).getBytes(StandardCharsets.UTF_8));
            return written;
        } catch (IOException e) {
            throw Fault.storage("the invented plant can't be written")
                    .at(folder.toString())
                    .found(e.getClass().getSimpleName() + " " + e.getMessage())
                    .because(e);
        }
    }

    /** All nights by one job, each into a folder of its own, which then gets its name. */
    private static void writeNights(Session session, SamplePlant plant, Path aside, Path records) throws IOException {
        SampleSize size = plant.size();
        long seed = plant.seed();
        List<LocalDate> nights = plant.nights();
        List<Integer> parts =
                IntStream.range(0, nights.size() * FILES_A_NIGHT).boxed().toList();
        JavaRDD<InternalRow> rows = session.context()
                .parallelize(parts, parts.size())
                .mapPartitions(taken -> {
                    SamplePlant again = SamplePlant.of(size, seed);
                    return new Rows(again.maker(), showings(again, taken));
                });
        SparkSession own = session.spark().newSession();
        // A task has one night: with a writer held open for it, its records need no sorting by night.
        own.conf().set("spark.sql.maxConcurrentOutputFileWriters", "2");
        SparkTrouble.guard("writing the invented plant", () -> {
            frame(own, rows, recordSchema())
                    .write()
                    .mode(SaveMode.Overwrite)
                    .partitionBy(NIGHT)
                    .parquet(aside.toUri().toString());
            return aside;
        });
        FileTree.delete(records);
        Files.createDirectories(records);
        for (LocalDate night : nights) {
            Files.move(aside.resolve(NIGHT + "=" + night), records.resolve(night.toString()));
        }
        FileTree.delete(aside);
    }

    /** The showings of these parts; a part is one of the files of a night. */
    private static Iterator<SampleShowing> showings(SamplePlant plant, Iterator<Integer> parts) {
        List<SampleShowing> taken = new ArrayList<>();
        parts.forEachRemaining(part -> {
            List<SampleShowing> all = plant.showings(plant.nights().get(part / FILES_A_NIGHT));
            int file = part % FILES_A_NIGHT;
            taken.addAll(all.subList(all.size() * file / FILES_A_NIGHT, all.size() * (file + 1) / FILES_A_NIGHT));
        });
        return taken.iterator();
    }

    private static long count(Session session, Path records) {
        return SparkTrouble.guard(
                "counting the invented plant",
                () -> session.spark()
                        .read()
                        .option("recursiveFileLookup", "true")
                        .parquet(records.toUri().toString())
                        .count());
    }

    /** Record after record as the engine's own rows, so that no number is boxed. */
    private static final class Rows implements Iterator<InternalRow> {
        private final SampleMaker maker;
        private final Iterator<SampleShowing> showings;
        private Iterator<SampleRecord> current = List.<SampleRecord>of().iterator();

        Rows(SampleMaker maker, Iterator<SampleShowing> showings) {
            this.maker = maker;
            this.showings = showings;
        }

        @Override
        public boolean hasNext() {
            while (!current.hasNext() && showings.hasNext()) {
                current = maker.records(showings.next()).iterator();
            }
            return current.hasNext();
        }

        @Override
        public InternalRow next() {
            if (!hasNext()) {
                throw new NoSuchElementException();
            }
            return row(current.next());
        }
    }

    private static InternalRow row(SampleRecord record) {
        UTF8String day = UTF8String.fromString(record.day().toString());
        return new GenericInternalRow(new Object[] {
            day,
            UTF8String.fromString(record.sorter()),
            UTF8String.fromString(record.showing()),
            UTF8String.fromString(record.tray()),
            UTF8String.fromString(record.material()),
            UTF8String.fromString(record.piece()),
            record.beltColumn(),
            record.time_ms(),
            UnsafeArrayData.fromPrimitiveArray(record.counts()),
            day
        });
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
                .add("counts", DataTypes.createArrayType(DataTypes.IntegerType, false))
                .add(NIGHT, DataTypes.StringType);
    }

    private static void writeReferences(Session session, SamplePlant plant, Path target) {
        List<InternalRow> rows = new ArrayList<>();
        for (LocalDate night : plant.nights()) {
            for (SampleReference reference : plant.references(night)) {
                rows.add(new GenericInternalRow(new Object[] {
                    UTF8String.fromString(reference.kind() == ReferenceKind.DARK ? "dark" : "white"),
                    UTF8String.fromString(reference.sorter()),
                    reference.beltColumn(),
                    reference.time_ms(),
                    UnsafeArrayData.fromPrimitiveArray(reference.values())
                }));
            }
        }
        StructType schema = new StructType()
                .add("kind", DataTypes.StringType)
                .add("sorter", DataTypes.StringType)
                .add("belt_column", DataTypes.IntegerType)
                .add("time_ms", DataTypes.LongType)
                .add("counts", DataTypes.createArrayType(DataTypes.DoubleType, false));
        SparkTrouble.guard("writing the invented plant", () -> {
            frame(session.spark(), session.context().parallelize(rows, 1), schema)
                    .write()
                    .mode(SaveMode.Overwrite)
                    .parquet(target.toUri().toString());
            return target;
        });
    }

    private static Dataset<Row> frame(SparkSession spark, JavaRDD<InternalRow> rows, StructType schema) {
        return ((org.apache.spark.sql.classic.SparkSession) spark).internalCreateDataFrame(rows.rdd(), schema, false);
    }
}
