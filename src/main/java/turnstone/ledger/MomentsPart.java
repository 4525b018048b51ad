package turnstone.ledger;

import java.io.IOException;
import java.io.InputStream;
import java.io.OutputStream;
import java.nio.charset.StandardCharsets;
import java.util.Map;
import java.util.SortedMap;
import java.util.function.BiConsumer;
import turnstone.moments.Moments;

/**
 * The layout of a day's moments by key. Big-endian; texts are a two-byte length and UTF-8.
 *
 * <table>
 * <caption>Version 1</caption>
 * <tr><th>field</th><th>bytes</th><th>content</th></tr>
 * <tr><td>magic</td><td>8</td><td>{@code TURNMOMS}</td></tr>
 * <tr><td>version</td><td>4</td><td>1</td></tr>
 * <tr><td>channels</td><td>4</td><td>d, from 1</td></tr>
 * <tr><td>keys</td><td>4</td><td>k, from 0; then k times, in ascending order of the key, each once:</td></tr>
 * <tr><td>instrument</td><td>2 + length</td><td>text</td></tr>
 * <tr><td>material</td><td>2 + length</td><td>text</td></tr>
 * <tr><td>tray group</td><td>4</td><td>from 0</td></tr>
 * <tr><td>moments</td><td>4 + length</td><td>the bytes of {@link Moments#toBytes()}, of d channels and at least 1 record</td></tr>
 * <tr><td>checksum</td><td>4</td><td>CRC-32C of all before; the end of the file</td></tr>
 * </table>
 *
 * <p>Written and read one key at a time, so that a file may be larger than memory.
 */
final class MomentsPart {
    private static final byte[] MAGIC = "TURNMOMS".getBytes(StandardCharsets.US_ASCII);
    private static final int VERSION = 1;
    /** Far more than moments of any number of channels that fit an array. */
    private static final int MOST_MOMENTS_BYTES = Integer.MAX_VALUE - 16;

    private MomentsPart() {}

    static void write(DayMoments day, OutputStream target) throws IOException {
        PartOutput out = new PartOutput(target);
        out.magic(MAGIC);
        out.int4(VERSION);
        out.int4(day.channels());
        SortedMap<LedgerKey, Moments> moments = day.moments();
        out.int4(moments.size());
        for (Map.Entry<LedgerKey, Moments> entry : moments.entrySet()) {
            out.text(entry.getKey().instrument());
            out.text(entry.getKey().material());
            out.int4(entry.getKey().trayGroup());
            out.bytes(entry.getValue().toBytes());
        }
        out.end();
    }

    /**
     * Hands over key by key, in ascending order.
     *
     * @return number of channels
     */
    static int read(InputStream source, BiConsumer<LedgerKey, Moments> each) throws IOException {
        PartInput in = new PartInput(source);
        in.magic(MAGIC);
        in.version(VERSION);
        int channels = in.count("channels", 1, Integer.MAX_VALUE);
        int keys = in.count("number of keys", 0, Integer.MAX_VALUE);
        LedgerKey before = null;
        for (int k = 0; k < keys; k++) {
            String instrument = in.text();
            String material = in.text();
            LedgerKey key = new LedgerKey(instrument, material, in.count("tray group", 0, Integer.MAX_VALUE));
            if (before != null && before.compareTo(key) >= 0) {
                throw new IOException(key + " comes after " + before);
            }
            Moments moments = Moments.fromBytes(in.bytes(MOST_MOMENTS_BYTES));
            if (moments.channels() != channels || moments.records() == 0) {
                throw new IOException(key + " has moments of " + moments.channels() + " channels and "
                        + moments.records() + " records");
            }
            each.accept(key, moments);
            before = key;
        }
        in.end();
        return channels;
    }
}
