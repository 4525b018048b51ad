package turnstone.moments;

import java.nio.ByteBuffer;
import java.nio.ByteOrder;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.HexFormat;
import java.util.zip.CRC32C;
import turnstone.fault.Fault;

/**
 * The byte layout of moments, version 1. All integers are big-endian; sums and products are two's complement.
 *
 * <table>
 * <caption>Layout of version 1, for d channels, u bytes a sum and v bytes a product</caption>
 * <tr><th>offset</th><th>bytes</th><th>content</th></tr>
 * <tr><td>0</td><td>4</td><td>magic: the letters {@code TsMo}</td></tr>
 * <tr><td>4</td><td>2</td><td>version: 1</td></tr>
 * <tr><td>6</td><td>1</td><td>u, 1 to 16: the fewest that hold every sum</td></tr>
 * <tr><td>7</td><td>1</td><td>v, 1 to 16: the fewest that hold every product</td></tr>
 * <tr><td>8</td><td>4</td><td>d, 1 to 8192</td></tr>
 * <tr><td>12</td><td>8</td><td>records, 0 to 2^41</td></tr>
 * <tr><td>20</td><td>d u</td><td>sums by channel</td></tr>
 * <tr><td>20 + d u</td><td>v d(d+1)/2</td><td>products: lower triangle with diagonal, by rows</td></tr>
 * <tr><td>end - 4</td><td>4</td><td>CRC-32C (Castagnoli) of everything before it</td></tr>
 * </table>
 *
 * <p>The form is canonical: equal moments have equal bytes. A reader refuses bytes that a writer would not have written.
 */
final class MomentsLayout {
    static final int MAGIC = 0x54734d6f;
    static final short VERSION = 1;

    private static final int HEADER = 20;
    private static final int CHECKSUM = 4;
    private static final int WIDEST = 16;
    private static final String REMEDY = "restore the file from a copy, or post its day again";

    private MomentsLayout() {}

    static byte[] write(Moments moments) {
        int sumWidth = width(moments.sums());
        int productWidth = width(moments.products());
        ByteBuffer out = ByteBuffer.allocate((int) size(moments.channels(), sumWidth, productWidth))
                .order(ByteOrder.BIG_ENDIAN);
        out.putInt(MAGIC).putShort(VERSION).put((byte) sumWidth).put((byte) productWidth);
        out.putInt(moments.channels()).putLong(moments.records());
        put(out, moments.sums(), sumWidth);
        put(out, moments.products(), productWidth);
        out.putInt(checksum(out.array()));
        return out.array();
    }

    static String fingerprint(Moments moments) {
        try {
            return HexFormat.of().formatHex(MessageDigest.getInstance("SHA-256").digest(write(moments)));
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException(e);
        }
    }

    static Moments read(byte[] bytes) {
        if (bytes.length < HEADER + CHECKSUM) {
            throw broken("too short").found(bytes.length + " bytes").expected("at least " + (HEADER + CHECKSUM));
        }
        ByteBuffer in = ByteBuffer.wrap(bytes).order(ByteOrder.BIG_ENDIAN);
        int magic = in.getInt();
        if (magic != MAGIC) {
            throw broken("not moments")
                    .found("first bytes " + HexFormat.of().toHexDigits(magic))
                    .expected(HexFormat.of().toHexDigits(MAGIC));
        }
        short version = in.getShort();
        if (version != VERSION) {
            throw broken("another version of the layout").found(version).expected(VERSION);
        }
        int sumWidth = in.get();
        int productWidth = in.get();
        int channels = in.getInt();
        checkRange("bytes of a sum", sumWidth, 1, WIDEST);
        checkRange("bytes of a product", productWidth, 1, WIDEST);
        checkRange("channels", channels, 1, Bounds.MOST_CHANNELS);
        long size = size(channels, sumWidth, productWidth);
        if (bytes.length != size) {
            throw broken("wrong length").found(bytes.length + " bytes").expected(size);
        }
        int checksum = checksum(bytes);
        int written = in.getInt(bytes.length - CHECKSUM);
        if (checksum != written) {
            throw broken("checksum differs: the bytes changed")
                    .found(HexFormat.of().toHexDigits(checksum))
                    .expected(HexFormat.of().toHexDigits(written));
        }
        long records = in.getLong();
        checkRange("records", records, 0, Bounds.MOST_RECORDS);
        WideSums sums = take(in, channels, sumWidth);
        WideSums products = take(in, Bounds.triangle(channels), productWidth);
        return checked(new Moments(channels, records, sums, products), sumWidth, productWidth);
    }

    private static Moments checked(Moments moments, int sumWidth, int productWidth) {
        checkRange("bytes of a sum", sumWidth, width(moments.sums()), width(moments.sums()));
        checkRange("bytes of a product", productWidth, width(moments.products()), width(moments.products()));
        for (int i = 0; i < moments.channels(); i++) {
            if (!MomentsAccumulator.possible(
                    moments.records(),
                    moments.sumHigh(i),
                    moments.sumLow(i),
                    moments.productHigh(i, i),
                    moments.productLow(i, i))) {
                throw broken("no records have such sums").found("a scatter below zero in channel " + i);
            }
        }
        return moments;
    }

    private static void checkRange(String what, long found, long least, long most) {
        if (found < least || found > most) {
            throw broken(what + " out of range")
                    .found(found)
                    .expected(least == most ? String.valueOf(least) : least + " to " + most);
        }
    }

    private static Fault broken(String what) {
        return Fault.storage("moments can't be read: " + what).remedy(REMEDY);
    }

    private static long size(int channels, int sumWidth, int productWidth) {
        return HEADER + (long) channels * sumWidth + (long) Bounds.triangle(channels) * productWidth + CHECKSUM;
    }

    /** Fewest bytes that hold every entry: one bit for the sign, and as many as the widest entry needs. */
    private static int width(WideSums values) {
        long high = 0;
        long low = 0;
        for (int i = 0; i < values.length(); i++) {
            long sign = values.high(i) >> 63;
            high |= values.high(i) ^ sign;
            low |= values.low(i) ^ sign;
        }
        int bits = high != 0 ? 128 - Long.numberOfLeadingZeros(high) : 64 - Long.numberOfLeadingZeros(low);
        return bits / 8 + 1;
    }

    private static void put(ByteBuffer out, WideSums values, int width) {
        int at = out.position();
        for (int i = 0; i < values.length(); i++, at += width) {
            if (at + WIDEST > out.limit()) {
                putBytes(out, at, values.high(i), values.low(i), width);
            } else if (width <= Long.BYTES) {
                // Writes past the value; what follows it is written later.
                out.putLong(at, values.low(i) << (Long.SIZE - Byte.SIZE * width));
            } else {
                int upper = width - Long.BYTES;
                out.putLong(at, values.high(i) << (Long.SIZE - Byte.SIZE * upper));
                out.putLong(at + upper, values.low(i));
            }
        }
        out.position(at);
    }

    private static void putBytes(ByteBuffer out, int at, long high, long low, int width) {
        for (int b = width - 1; b >= 0; b--) {
            out.put(at + width - 1 - b, (byte)
                    (b >= Long.BYTES ? high >> (Byte.SIZE * (b - Long.BYTES)) : low >> (Byte.SIZE * b)));
        }
    }

    /** Each value is the end of eight bytes, or of twice eight: there are always so many before it, the header's among them. */
    private static WideSums take(ByteBuffer in, int length, int width) {
        WideSums values = new WideSums(length);
        int at = in.position();
        for (int i = 0; i < length; i++, at += width) {
            long last = in.getLong(at + width - Long.BYTES);
            if (width <= Long.BYTES) {
                long low = extended(last, width);
                values.set(i, low >> (Long.SIZE - 1), low);
            } else {
                int upper = width - Long.BYTES;
                values.set(i, extended(in.getLong(at + upper - Long.BYTES), upper), last);
            }
        }
        in.position(at);
        return values;
    }

    /** The last bytes of a word with their sign. */
    private static long extended(long word, int bytes) {
        int shift = Long.SIZE - Byte.SIZE * bytes;
        return word << shift >> shift;
    }

    private static int checksum(byte[] bytes) {
        CRC32C crc = new CRC32C();
        crc.update(bytes, 0, bytes.length - CHECKSUM);
        return (int) crc.getValue();
    }
}
