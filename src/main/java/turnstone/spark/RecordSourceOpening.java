package turnstone.spark;

import java.util.ArrayList;
import java.util.List;
import org.apache.hadoop.conf.Configuration;
import org.apache.spark.sql.Dataset;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.SparkSession;
import org.apache.spark.sql.internal.SQLConf;
import scala.jdk.javaapi.CollectionConverters;
import turnstone.fault.Fault;

/** Opens files as a source: finds them, counts them, checks their columns against the first one's. */
final class RecordSourceOpening {
    /** CSV files are cut after about so many bytes. */
    static final long CSV_SPLIT_BYTES = 32L << 20;

    /** Above this many columns the engine would turn column batches into rows of its own accord; raised on this branch only. */
    private static final String WIDEST_TABLE = "100000";

    private RecordSourceOpening() {}

    static RecordSource open(Session session, TableSpec spec, long csvSplitBytes) {
        Configuration configuration = session.spark().sparkContext().hadoopConfiguration();
        List<SourceFile> files = SourceFiles.find(spec.paths(), configuration);
        return spec.form() == TableSpec.Form.CSV
                ? csv(session, spec.columns(), files, configuration, csvSplitBytes)
                : parquet(session, spec.columns(), files, configuration);
    }

    private static RecordSource csv(
            Session session,
            ColumnNames names,
            List<SourceFile> files,
            Configuration configuration,
            long csvSplitBytes) {
        List<CsvScan> scans = new ArrayList<>();
        List<CsvSplit> splits = new ArrayList<>();
        List<SourceFile> counted = new ArrayList<>();
        for (SourceFile file : files) {
            CsvScan scan = CsvScan.of(file.path(), csvSplitBytes, configuration);
            scans.add(scan);
            splits.addAll(scan.splits());
            counted.add(file.withRows(scan.records()));
        }
        SourceFiles.refuseCopies(counted, configuration);
        CsvScan first = scans.get(0);
        scans.forEach(scan -> requireSameHeader(first, scan));
        TableColumns columns = TableColumns.resolve(names, first.header(), first.file());
        int channels = columns.layout() == ColumnNames.Layout.COLUMNS
                ? columns.channels().size()
                : arrayChannels(names, columns, first, configuration);
        LineLayout layout = LineLayout.of(columns, first.header());
        Feed feed = new LineFeed(session.context(), splits, layout, configuration);
        return new RecordSource(session, columns, channels, counted, total(counted), feed);
    }

    private static void requireSameHeader(CsvScan first, CsvScan other) {
        if (first.header().equals(other.header())) {
            return;
        }
        int at = 0;
        int both = Math.min(first.header().size(), other.header().size());
        while (at < both && first.header().get(at).equals(other.header().get(at))) {
            at++;
        }
        String found = at < other.header().size() ? "\"" + other.header().get(at) + "\"" : "no more columns";
        String expected = at < first.header().size() ? "\"" + first.header().get(at) + "\"" : "no more columns";
        throw Fault.input("the header differs from the first file's at column " + (at + 1))
                .at(other.file())
                .found(found)
                .expected(expected + " as in " + first.file());
    }

    private static int arrayChannels(
            ColumnNames names, TableColumns columns, CsvScan first, Configuration configuration) {
        if (names.channelCount() > 0) {
            return names.channelCount();
        }
        try (LineReader lines = new LineReader(CsvScan.open(first.file(), 0, configuration), 0)) {
            lines.next();
            String line = lines.next();
            int at = first.header().indexOf(columns.channels().get(0));
            List<String> fields = line == null ? List.of() : CsvLine.fields(line, first.file(), 2);
            int found = at < fields.size() ? LineLayout.elements(fields.get(at)).length : 0;
            if (found == 0) {
                throw Fault.input("the first record has no channels").at(first.file());
            }
            return found;
        } catch (java.io.IOException e) {
            throw CsvScan.unreadable(first.file(), e);
        }
    }

    private static RecordSource parquet(
            Session session, ColumnNames names, List<SourceFile> files, Configuration configuration) {
        SparkSession own = session.spark().newSession();
        own.conf().set("spark.sql.codegen.maxFields", WIDEST_TABLE);
        SQLConf settings = own.sessionState().conf();
        List<ParquetScan> scans = new ArrayList<>();
        List<SourceFile> counted = new ArrayList<>();
        TableColumns columns = null;
        for (SourceFile file : files) {
            ParquetScan scan = ParquetScan.of(file.path(), configuration, settings);
            TableColumns found = TableColumns.resolve(names, scan.names(), scan.file());
            if (columns == null) {
                columns = found;
            } else if (!columns.equals(found)) {
                throw Fault.input("the columns differ from the first file's").at(scan.file());
            }
            scans.add(scan);
            counted.add(file.withRows(scan.records()));
        }
        SourceFiles.refuseCopies(counted, configuration);
        ParquetScan first = scans.get(0);
        for (ParquetScan scan : scans) {
            scan.requireSame(first, columns);
        }
        Dataset<Row> frame = own.read()
                .schema(first.toRead(columns))
                .option("recursiveFileLookup", "true")
                .parquet(files.stream().map(SourceFile::path).toArray(String[]::new));
        int channels = parquetChannels(names, columns, frame, first.file());
        Feed feed = RecordSource.feed(frame, columns, first.file());
        return new RecordSource(session, columns, channels, counted, total(counted), feed);
    }

    private static int parquetChannels(ColumnNames names, TableColumns columns, Dataset<Row> frame, String place) {
        if (columns.layout() == ColumnNames.Layout.COLUMNS) {
            return columns.channels().size();
        }
        String column = columns.channels().get(0);
        CellType.ofElements(frame.schema().apply(column).dataType(), column, place);
        if (names.channelCount() > 0) {
            return names.channelCount();
        }
        List<Row> first = SparkTrouble.guard(
                "reading the first record",
                () -> frame.select(frame.col(column)).limit(1).collectAsList());
        if (first.isEmpty() || first.get(0).isNullAt(0)) {
            throw Fault.input("the first record has no channels").at(place);
        }
        return CollectionConverters.asJava(first.get(0).getSeq(0)).size();
    }

    private static long total(List<SourceFile> files) {
        return files.stream().mapToLong(SourceFile::rows).sum();
    }
}
