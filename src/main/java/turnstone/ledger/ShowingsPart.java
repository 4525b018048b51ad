package turnstone.ledger;

import java.io.IOException;
import java.io.InputStream;
import java.io.OutputStream;
import java.math.BigInteger;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;

/**
 * The layout of a day's showings. Big-endian; texts are a two-byte length and UTF-8.
 *
 * <table>
 * <caption>Version 1</caption>
 * <tr><th>field</th><th>bytes</th><th>content</th></tr>
 * <tr><td>magic</td><td>8</td><td>{@code TURNSHOW}</td></tr>
 * <tr><td>version</td><td>4</td><td>1</td></tr>
 * <tr><td>channels</td><td>4</td><td>d, from 1</td></tr>
 * <tr><td>showings</td><td>4</td><td>s, from 0; then s times, in ascending order of the id, each once:</td></tr>
 * <tr><td>showing, sorter, instrument, tray, material</td><td>2 + length each</td><td>texts</td></tr>
 * <tr><td>tray group</td><td>4</td><td>from 0</td></tr>
 * <tr><td>accepted, no signal, quarantined</td><td>8 each</td><td>records, from 0</td></tr>
 * <tr><td>sums</td><td>16 each</td><td>d integers in two's complement: over the accepted records, the sum of counts of each channel</td></tr>
 * <tr><td>checksum</td><td>4</td><td>CRC-32C of all before; the end of the file</td></tr>
 * </table>
 */
final class ShowingsPart {
    private static final byte[] MAGIC = "TURNSHOW".getBytes(StandardCharsets.US_ASCII);
    private static final int VERSION = 1;

    private ShowingsPart() {}

    static void write(DayMoments day, OutputStream target) throws IOException {
        PartOutput out = new PartOutput(target);
        out.magic(MAGIC);
        out.int4(VERSION);
        out.int4(day.channels());
        out.int4(day.showings().size());
        for (ShowingSums showing : day.showings().values()) {
            out.text(showing.showing());
            out.text(showing.sorter());
            out.text(showing.instrument());
            out.text(showing.tray());
            out.text(showing.material());
            out.int4(showing.trayGroup());
            out.int8(showing.records());
            out.int8(showing.noSignal());
            out.int8(showing.quarantined());
            for (BigInteger sum : showing.sums()) {
                out.sum(sum);
            }
        }
        out.end();
    }

    static List<ShowingSums> read(InputStream source) throws IOException {
        PartInput in = new PartInput(source);
        in.magic(MAGIC);
        in.version(VERSION);
        int channels = in.count("channels", 1, Integer.MAX_VALUE);
        int count = in.count("number of showings", 0, Integer.MAX_VALUE);
        List<ShowingSums> showings = new ArrayList<>();
        for (int s = 0; s < count; s++) {
            ShowingSums showing = readOne(in, channels);
            if (s > 0 && showings.get(s - 1).showing().compareTo(showing.showing()) >= 0) {
                throw new IOException("showing " + showing.showing() + " is out of order");
            }
            showings.add(showing);
        }
        in.end();
        return showings;
    }

    private static ShowingSums readOne(PartInput in, int channels) throws IOException {
        String showing = in.text();
        String sorter = in.text();
        String instrument = in.text();
        String tray = in.text();
        String material = in.text();
        int trayGroup = in.count("tray group", 0, Integer.MAX_VALUE);
        long records = in.records("accepted");
        long noSignal = in.records("no signal");
        long quarantined = in.records("quarantined");
        List<BigInteger> sums = new ArrayList<>();
        for (int i = 0; i < channels; i++) {
            sums.add(in.sum());
        }
        return new ShowingSums(
                showing, sorter, instrument, tray, trayGroup, material, records, noSignal, quarantined, sums);
    }
}
