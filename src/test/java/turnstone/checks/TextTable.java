package turnstone.checks;

import java.io.IOException;
import java.io.InputStream;
import java.io.OutputStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.Random;
import java.util.zip.GZIPOutputStream;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.RowFactory;
import org.apache.spark.sql.types.DataTypes;
import org.apache.spark.sql.types.StructField;
import org.apache.spark.sql.types.StructType;
import turnstone.spark.Session;

/**
 * A table as its text: the label first, then one column per channel, as the files of {@code checks/data} have it.
 *
 * @param header names of the columns
 * @param rows cells of each record, as written
 */
record TextTable(List<String> header, List<List<String>> rows) {
    static final String LABEL = "label";

    static TextTable resource(String set) throws IOException {
        try (InputStream in = TextTable.class.getResourceAsStream("/checks/data/" + set + ".csv")) {
            return of(new String(in.readAllBytes(), StandardCharsets.UTF_8));
        }
    }

    static TextTable of(String csv) {
        List<List<String>> lines =
                csv.lines().map(line -> List.of(line.split(",", -1))).toList();
        return new TextTable(lines.get(0), lines.subList(1, lines.size()));
    }

    /** The meat spectra labelled by fat content, 20 % and more or less: the rule stands in meat-nir-fat20.json. */
    static TextTable meatByFat() throws IOException {
        TextTable spectra = resource("meat-nir");
        TextTable reference = resource("meat-nir-reference");
        int fat = reference.header().indexOf("fat");
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < spectra.rows().size(); i++) {
            List<String> row = new ArrayList<>(spectra.rows().get(i));
            row.set(0, Double.parseDouble(reference.rows().get(i).get(fat)) >= 20 ? "fat20plus" : "below20");
            rows.add(row);
        }
        return new TextTable(spectra.header(), rows);
    }

    /** Iris as another widely copied file has it; the two records stand in iris.json. */
    static TextTable irisVariant() throws IOException {
        TextTable iris = resource("iris");
        List<List<String>> rows = new ArrayList<>(iris.rows());
        rows.set(34, List.of("setosa", "4.9", "3.1", "1.5", "0.1"));
        rows.set(37, List.of("setosa", "4.9", "3.1", "1.5", "0.1"));
        return new TextTable(iris.header(), rows);
    }

    /** Records from..to, numbered from 1, both included. */
    TextTable records(int from, int to) {
        return new TextTable(header, rows.subList(from - 1, to));
    }

    TextTable shuffled(long seed) {
        List<List<String>> mixed = new ArrayList<>(rows);
        Collections.shuffle(mixed, new Random(seed));
        return new TextTable(header, mixed);
    }

    String csv() {
        StringBuilder text = new StringBuilder(String.join(",", header)).append('\n');
        rows.forEach(row -> text.append(String.join(",", row)).append('\n'));
        return text.toString();
    }

    Path toCsv(Path file) throws IOException {
        return Files.writeString(file, csv());
    }

    Path toGzip(Path file) throws IOException {
        try (OutputStream out = new GZIPOutputStream(Files.newOutputStream(file))) {
            out.write(csv().getBytes(StandardCharsets.UTF_8));
        }
        return file;
    }

    /** A folder of so many files, records dealt out in turn. */
    Path toFiles(Path folder, int files) throws IOException {
        Files.createDirectories(folder);
        for (int f = 0; f < files; f++) {
            List<List<String>> dealt = new ArrayList<>();
            for (int i = f; i < rows.size(); i += files) {
                dealt.add(rows.get(i));
            }
            new TextTable(header, dealt).toCsv(folder.resolve("records-" + f + ".csv"));
        }
        return folder;
    }

    /** A folder of one Parquet file, channels as doubles. */
    Path toParquet(Session session, Path folder) {
        StructType schema = new StructType(header.stream()
                .map(name -> DataTypes.createStructField(
                        name, name.equals(LABEL) ? DataTypes.StringType : DataTypes.DoubleType, true))
                .toArray(StructField[]::new));
        List<Row> typed = rows.stream().map(this::typed).toList();
        session.spark().createDataFrame(typed, schema).coalesce(1).write().parquet(folder.toString());
        return folder;
    }

    private Row typed(List<String> row) {
        Object[] cells = new Object[row.size()];
        for (int c = 0; c < cells.length; c++) {
            cells[c] = header.get(c).equals(LABEL) ? (Object) row.get(c) : Double.valueOf(row.get(c));
        }
        return RowFactory.create(cells);
    }
}
