package turnstone.spark;

import java.io.DataInputStream;
import java.io.DataOutputStream;
import java.io.IOException;
import java.io.Serializable;
import java.util.Comparator;

/**
 * A record that is not a measurement.
 *
 * @param file where it was read
 * @param row its number in the file, from 1, without a header
 * @param reason the label of the reason
 * @param channel the first channel to blame, from 1; 0 where none is
 * @param found what was there
 * @param day its key as read, empty where missing; so are the others
 * @param sorter see day
 * @param showing see day
 * @param tray see day
 * @param material see day
 */
public record QuarantinedRecord(
        String file,
        long row,
        String reason,
        int channel,
        String found,
        String day,
        String sorter,
        String showing,
        String tray,
        String material)
        implements Serializable, Comparable<QuarantinedRecord> {
    /** The first line of the table of quarantined records. */
    public static final String CSV_HEADER = "file,row,reason,channel,found,day,sorter,showing,tray,material";

    private static final int LONGEST_TEXT = 4096;

    private static final Comparator<QuarantinedRecord> ORDER = Comparator.comparing(QuarantinedRecord::file)
            .thenComparingLong(QuarantinedRecord::row)
            .thenComparing(QuarantinedRecord::csv);

    @Override
    public int compareTo(QuarantinedRecord other) {
        return ORDER.compare(this, other);
    }

    /** One line of the table, without its end. */
    public String csv() {
        return String.join(
                ",",
                CsvLine.field(file),
                Long.toString(row),
                reason,
                channel == 0 ? "" : Integer.toString(channel),
                CsvLine.field(found),
                CsvLine.field(day),
                CsvLine.field(sorter),
                CsvLine.field(showing),
                CsvLine.field(tray),
                CsvLine.field(material));
    }

    void write(DataOutputStream out) throws IOException {
        Payloads.writeText(out, file);
        out.writeLong(row);
        Payloads.writeText(out, reason);
        out.writeInt(channel);
        for (String text : new String[] {found, day, sorter, showing, tray, material}) {
            Payloads.writeText(out, text.length() <= LONGEST_TEXT ? text : text.substring(0, LONGEST_TEXT));
        }
    }

    static QuarantinedRecord read(DataInputStream in) throws IOException {
        return new QuarantinedRecord(
                Payloads.readText(in),
                in.readLong(),
                Payloads.readText(in),
                in.readInt(),
                Payloads.readText(in),
                Payloads.readText(in),
                Payloads.readText(in),
                Payloads.readText(in),
                Payloads.readText(in),
                Payloads.readText(in));
    }
}
