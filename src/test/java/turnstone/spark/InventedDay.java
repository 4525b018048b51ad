package turnstone.spark;

import java.io.IOException;
import java.io.OutputStream;
import java.io.UncheckedIOException;
import java.math.BigDecimal;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Collections;
import java.util.EnumMap;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Random;
import java.util.Set;
import java.util.SplittableRandom;
import java.util.zip.GZIPOutputStream;
import org.apache.spark.sql.Dataset;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.RowFactory;
import org.apache.spark.sql.types.DataType;
import org.apache.spark.sql.types.DataTypes;
import org.apache.spark.sql.types.StructField;
import org.apache.spark.sql.types.StructType;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.Instrument;
import turnstone.measure.Precision;

/** A small invented day of records, written in every form that is read. */
final class InventedDay {
    static final LocalDate DAY = LocalDate.of(2026, 3, 1);
    static final int CHANNELS = 12;
    static final List<String> SORTERS = List.of("avocet", "curlew", "dunlin");
    static final List<String> MATERIALS = List.of("PET bottle", "PE-HD", "PP");
    static final List<String> KEYS = List.of("day", "sorter", "showing", "tray", "material");

    /** One record: its keys and its channels, which are thousandths. */
    record Invented(String day, String sorter, String showing, String tray, String material, Channels values) {
        Invented(String day, String sorter, String showing, String tray, String material, double[] channels) {
            this(day, sorter, showing, tray, material, new Channels(channels));
        }

        double[] channels() {
            return values.values.clone();
        }

        List<String> keys() {
            List<String> keys = new ArrayList<>();
            Collections.addAll(keys, day, sorter, showing, tray, material);
            return keys;
        }
    }

    /** Numbers that nobody changes. */
    static final class Channels {
        private final double[] values;

        Channels(double[] values) {
            this.values = values.clone();
        }
    }

    private InventedDay() {}

    static List<Invented> records(int perShowing, long seed) {
        SplittableRandom random = new SplittableRandom(seed);
        List<Invented> records = new ArrayList<>();
        for (String sorter : SORTERS) {
            for (String material : MATERIALS) {
                for (int tray = 0; tray < 4; tray++) {
                    String name = material + " tray " + tray;
                    for (int i = 0; i < perShowing; i++) {
                        double[] channels = new double[CHANNELS];
                        for (int c = 0; c < CHANNELS; c++) {
                            channels[c] = random.nextInt(-90_000, 90_000) / 1000.0;
                        }
                        records.add(
                                new Invented(DAY.toString(), sorter, sorter + "/" + name, name, material, channels));
                    }
                }
            }
        }
        return records;
    }

    static List<Invented> shuffled(List<Invented> records, long seed) {
        List<Invented> other = new ArrayList<>(records);
        Collections.shuffle(other, new Random(seed));
        return other;
    }

    static IntakeSpec intake(Precision precision) {
        Map<String, Instrument> instruments = new HashMap<>();
        for (String sorter : SORTERS) {
            instruments.put(sorter, Instrument.withoutWavelengths(sorter, LocalDate.of(2026, 1, 1), CHANNELS));
        }
        return IntakeSpec.day(
                DAY,
                IntakeSpec.OtherDays.QUARANTINE,
                Set.copyOf(MATERIALS),
                instruments,
                (material, tray) -> tray.charAt(tray.length() - 1) - '0',
                HeadSpec.none(CHANNELS),
                null,
                CountScale.uniform(CHANNELS, BigDecimal.ZERO, new BigDecimal("0.001"), precision));
    }

    static Map<KeyColumn, String> keyNames() {
        Map<KeyColumn, String> names = new EnumMap<>(KeyColumn.class);
        names.put(KeyColumn.DAY, "day");
        names.put(KeyColumn.SORTER, "sorter");
        names.put(KeyColumn.SHOWING, "showing");
        names.put(KeyColumn.TRAY, "tray");
        names.put(KeyColumn.MATERIAL, "material");
        return names;
    }

    static List<String> channelNames() {
        List<String> names = new ArrayList<>();
        for (int c = 1; c <= CHANNELS; c++) {
            names.add("c" + c);
        }
        return names;
    }

    static ColumnNames asArray() {
        return ColumnNames.array(keyNames(), "channels", CHANNELS);
    }

    static ColumnNames asColumns() {
        return ColumnNames.columns(keyNames(), channelNames());
    }

    static Dataset<Row> arrayFrame(Session session, List<Invented> records, DataType element) {
        List<StructField> fields = keyFields();
        fields.add(DataTypes.createStructField("channels", DataTypes.createArrayType(element), true));
        List<Row> rows = new ArrayList<>();
        for (Invented record : records) {
            List<Object> cells = new ArrayList<>(record.keys());
            List<Object> values = new ArrayList<>();
            for (double value : record.channels()) {
                values.add(element.equals(DataTypes.FloatType) ? (Object) (float) value : (Object) value);
            }
            cells.add(values.toArray());
            rows.add(RowFactory.create(cells.toArray()));
        }
        return session.spark().createDataFrame(rows, new StructType(fields.toArray(StructField[]::new)));
    }

    static Dataset<Row> columnsFrame(Session session, List<Invented> records) {
        List<StructField> fields = keyFields();
        channelNames().forEach(name -> fields.add(DataTypes.createStructField(name, DataTypes.DoubleType, true)));
        List<Row> rows = new ArrayList<>();
        for (Invented record : records) {
            List<Object> cells = new ArrayList<>(record.keys());
            for (double value : record.channels()) {
                cells.add(value);
            }
            rows.add(RowFactory.create(cells.toArray()));
        }
        return session.spark().createDataFrame(rows, new StructType(fields.toArray(StructField[]::new)));
    }

    private static List<StructField> keyFields() {
        List<StructField> fields = new ArrayList<>();
        KEYS.forEach(name -> fields.add(DataTypes.createStructField(name, DataTypes.StringType, true)));
        return fields;
    }

    static String csv(List<Invented> records) {
        StringBuilder text = new StringBuilder(String.join(",", KEYS));
        channelNames().forEach(name -> text.append(',').append(name));
        text.append('\n');
        for (Invented record : records) {
            text.append(String.join(",", record.keys()));
            for (double value : record.channels()) {
                text.append(',').append(BigDecimal.valueOf(value).toPlainString());
            }
            text.append('\n');
        }
        return text.toString();
    }

    static void write(Path file, String text) {
        try (OutputStream plain = Files.newOutputStream(file);
                OutputStream out = file.toString().endsWith(".gz") ? new GZIPOutputStream(plain) : plain) {
            out.write(text.getBytes(StandardCharsets.UTF_8));
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
