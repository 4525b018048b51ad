package turnstone.spark;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import java.util.stream.Stream;
import org.apache.spark.sql.Dataset;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.functions;
import org.apache.spark.sql.types.DataTypes;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import turnstone.fault.Fault;
import turnstone.ledger.LedgerKey;
import turnstone.measure.Precision;

@ExtendWith(SharedSession.class)
class RecordSourceTest {
    private static final long SEED = 7;

    @TempDir
    Path folder;

    private static FoldResult fold(RecordSource source) {
        return FoldJob.run(source, InventedDay.intake(Precision.COARSE), FoldSettings.usual());
    }

    private static Map<LedgerKey, String> fingerprints(FoldResult result) {
        Map<LedgerKey, String> prints = new TreeMap<>();
        result.moments().forEach((key, moments) -> prints.put(key, moments.fingerprint()));
        return prints;
    }

    private RecordSource csv(Session session, Path... files) {
        List<String> paths = Stream.of(files).map(Path::toString).toList();
        return RecordSource.open(session, new TableSpec(paths, TableSpec.Form.CSV, InventedDay.asColumns()));
    }

    private static RecordSource parquet(Session session, Path path, ColumnNames names) {
        return RecordSource.open(session, new TableSpec(List.of(path.toString()), TableSpec.Form.PARQUET, names));
    }

    @Test
    void parquetAndCsvGiveTheSameSums(Session session) {
        List<InventedDay.Invented> records = InventedDay.records(6, SEED);
        Path arrays = folder.resolve("day=01/arrays");
        InventedDay.arrayFrame(session, records, DataTypes.DoubleType)
                .repartition(3)
                .write()
                .parquet(arrays.toString());
        Path columns = folder.resolve("columns");
        InventedDay.columnsFrame(session, records).coalesce(1).write().parquet(columns.toString());
        Path plain = folder.resolve("plain.csv");
        InventedDay.write(plain, InventedDay.csv(records));
        Path packed = folder.resolve("packed.csv.gz");
        InventedDay.write(packed, InventedDay.csv(InventedDay.shuffled(records, SEED)));

        FoldResult expected = fold(csv(session, plain));
        assertThat(expected.counts().accepted()).isEqualTo(216);
        assertThat(expected.readPath()).isEqualTo(ReadPath.LINES);
        assertThat(fingerprints(fold(csv(session, packed)))).isEqualTo(fingerprints(expected));
        RecordSource cut = RecordSourceOpening.open(
                session, new TableSpec(List.of(plain.toString()), TableSpec.Form.CSV, InventedDay.asColumns()), 1000);
        FoldResult inPieces = fold(cut);
        assertThat(inPieces.partitions()).isGreaterThan(20);
        assertThat(fingerprints(inPieces)).isEqualTo(fingerprints(expected));
        for (FoldResult found : List.of(
                fold(parquet(session, folder.resolve("day=01"), InventedDay.asArray())),
                fold(parquet(session, columns, InventedDay.asColumns())),
                fold(parquet(session, columns, ColumnNames.numbered(InventedDay.keyNames(), "c"))))) {
            assertThat(found.readPath()).isEqualTo(ReadPath.COLUMN_BATCHES);
            assertThat(fingerprints(found)).isEqualTo(fingerprints(expected));
            assertThat(found.files().stream().mapToLong(SourceFile::rows).sum()).isEqualTo(216);
        }
    }

    @Test
    void nothingAboveTheScanIsSkipped(Session session) {
        List<InventedDay.Invented> records = InventedDay.records(4, SEED);
        Path file = folder.resolve("frame");
        InventedDay.arrayFrame(session, records, DataTypes.FloatType)
                .coalesce(1)
                .write()
                .parquet(file.toString());
        Dataset<Row> bare = session.spark().read().parquet(file.toString());
        FoldResult all = fold(RecordSource.ofFrame(session, bare, InventedDay.asArray(), 144));
        assertThat(all.readPath()).isEqualTo(ReadPath.COLUMN_BATCHES);

        FoldResult filtered = fold(RecordSource.ofFrame(
                session, bare.filter(functions.col("sorter").equalTo("avocet")), InventedDay.asArray(), 48));
        assertThat(filtered.readPath()).isEqualTo(ReadPath.ROWS);
        assertThat(filtered.counts().accepted()).isEqualTo(48);

        FoldResult cast = fold(RecordSource.ofFrame(
                session,
                bare.withColumn("channels", functions.col("channels").cast("array<double>")),
                InventedDay.asArray(),
                144));
        assertThat(cast.readPath()).isEqualTo(ReadPath.ROWS);
        assertThat(fingerprints(cast)).isEqualTo(fingerprints(all));

        Dataset<Row> reordered = bare.select("channels", "material", "tray", "showing", "sorter", "day");
        assertThat(fingerprints(fold(RecordSource.ofFrame(session, reordered, InventedDay.asArray(), 144))))
                .isEqualTo(fingerprints(all));

        bare.cache();
        Dataset<Row> cached = session.spark().read().parquet(file.toString());
        FoldResult fromCache = fold(RecordSource.ofFrame(session, cached, InventedDay.asArray(), 144));
        assertThat(fromCache.readPath()).isEqualTo(ReadPath.ROWS);
        assertThat(fingerprints(fromCache)).isEqualTo(fingerprints(all));
        bare.unpersist();
    }

    @Test
    void aMissingElementOfAnArrayIsNeverReadAsANumber(Session session) {
        List<InventedDay.Invented> records = InventedDay.records(3, SEED);
        Path file = folder.resolve("nulls");
        InventedDay.arrayFrame(session, records, DataTypes.FloatType)
                .withColumn(
                        "channels",
                        functions.expr(
                                "CASE WHEN sorter = 'curlew' THEN transform(channels, (x, i) -> IF(i = 5, NULL, x))"
                                        + " WHEN sorter = 'dunlin' THEN NULL ELSE channels END"))
                .coalesce(1)
                .write()
                .parquet(file.toString());
        FoldResult found = fold(parquet(session, file, InventedDay.asArray()));
        assertThat(found.readPath()).isEqualTo(ReadPath.COLUMN_BATCHES);
        assertThat(found.counts().accepted()).isEqualTo(36);
        assertThat(found.counts().quarantined())
                .containsEntry("non finite", 36L)
                .containsEntry("wrong channel count", 36L);
        assertThat(found.counts().quarantine())
                .filteredOn(record -> record.sorter().equals("curlew"))
                .allSatisfy(record -> assertThat(record.channel()).isEqualTo(6));
    }

    @Test
    void originsAreFilesAndRowNumbers(Session session) {
        List<InventedDay.Invented> records = new ArrayList<>(InventedDay.records(6, SEED));
        InventedDay.Invented sound = records.get(100);
        records.set(
                100,
                new InventedDay.Invented(
                        sound.day(), "ibis", sound.showing(), sound.tray(), sound.material(), sound.channels()));
        Path file = folder.resolve("one");
        InventedDay.arrayFrame(session, records, DataTypes.DoubleType)
                .coalesce(1)
                .write()
                .parquet(file.toString());
        Path text = folder.resolve("one.csv");
        InventedDay.write(text, InventedDay.csv(records));
        for (FoldResult found :
                List.of(fold(parquet(session, file, InventedDay.asArray())), fold(csv(session, text)))) {
            assertThat(found.counts().quarantine()).singleElement().satisfies(record -> {
                assertThat(record.row()).isEqualTo(101);
                assertThat(record.file()).contains("one");
                assertThat(record.found()).isEqualTo("ibis");
            });
        }
    }

    @Test
    void linesThatAreNoRecordsAreQuarantined(Session session) {
        List<InventedDay.Invented> records = InventedDay.records(1, SEED);
        String[] lines = InventedDay.csv(records).split("\n");
        lines[3] = lines[3] + ",1";
        lines[4] = lines[4].substring(0, lines[4].lastIndexOf(','));
        lines[5] = lines[5].substring(0, lines[5].lastIndexOf(',')) + ",1d";
        lines[6] = lines[6].substring(0, lines[6].lastIndexOf(',')) + ",";
        lines[7] = lines[7].substring(0, lines[7].lastIndexOf(',')) + ",NaN";
        Path file = folder.resolve("flawed.csv");
        InventedDay.write(file, "\uFEFF" + String.join("\r\n", lines) + "\r\n\r\n");
        FoldResult found = fold(csv(session, file));
        assertThat(found.counts().read()).isEqualTo(36);
        assertThat(found.counts().quarantined())
                .containsEntry("wrong channel count", 2L)
                .containsEntry("not a number", 2L)
                .containsEntry("non finite", 1L)
                .hasSize(3);
        assertThat(found.counts().quarantine())
                .filteredOn(record -> record.reason().equals("not a number"))
                .extracting(QuarantinedRecord::row, QuarantinedRecord::channel, QuarantinedRecord::found)
                .containsExactly(
                        org.assertj.core.groups.Tuple.tuple(5L, 12, "1d"),
                        org.assertj.core.groups.Tuple.tuple(6L, 12, ""));
    }

    @Test
    void whatCanNotBeTheTableIsRefusedWithTheFilesName(Session session) throws IOException {
        List<InventedDay.Invented> records = InventedDay.records(1, SEED);
        Path first = folder.resolve("a.csv");
        InventedDay.write(first, InventedDay.csv(records));
        Path swapped = folder.resolve("b.csv");
        InventedDay.write(swapped, InventedDay.csv(records.subList(0, 5)).replaceFirst("c3,c4", "c4,c3"));
        assertThatThrownBy(() -> csv(session, first, swapped))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("b.csv")
                .hasMessageContaining("found \"c4\", expected \"c3\"");
        Path copy = folder.resolve("copy.csv");
        Files.copy(first, copy);
        assertThatThrownBy(() -> csv(session, first, copy))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("by size and SHA-256");
        assertThatThrownBy(() -> csv(session, first, first))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("the same file is given twice");
        assertThatThrownBy(() -> csv(session, folder.resolve("none.csv")))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("no files");
        Path unclosed = folder.resolve("unclosed.csv");
        InventedDay.write(unclosed, InventedDay.csv(records) + "\"2026-03-01\nand more");
        assertThatThrownBy(() -> fold(csv(session, unclosed)))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("unclosed.csv row 38")
                .hasMessageContaining("runs over the end of the line");
        Path broken = folder.resolve("broken.parquet");
        Files.writeString(broken, "no Parquet at all");
        assertThatThrownBy(() -> parquet(session, broken, InventedDay.asArray()))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("broken.parquet: not a readable Parquet file");
        Path cut = folder.resolve("cut.csv.gz");
        InventedDay.write(cut, InventedDay.csv(records));
        byte[] whole = Files.readAllBytes(cut);
        Files.write(cut, java.util.Arrays.copyOf(whole, whole.length - 20));
        assertThatThrownBy(() -> csv(session, cut))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("cut.csv.gz: the file can't be read; found it ends too early");
    }

    @Test
    void columnsThatAreMissingOrOfTheWrongTypeAreNamed(Session session) {
        Path file = folder.resolve("typed");
        InventedDay.columnsFrame(session, InventedDay.records(1, SEED))
                .withColumn("c2", functions.lit("text"))
                .write()
                .parquet(file.toString());
        assertThatThrownBy(() -> parquet(session, file, InventedDay.asColumns()))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("column \"c2\" has the wrong type; found string");
        assertThatThrownBy(() -> parquet(session, file, InventedDay.asArray()))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("the channel column \"channels\" is missing");
    }
}
