package turnstone.ledger;

import java.io.DataOutputStream;
import java.io.IOException;
import java.io.OutputStream;
import java.math.BigInteger;
import java.nio.charset.StandardCharsets;
import java.util.zip.CRC32C;
import java.util.zip.CheckedOutputStream;

/** Writes the fields that the parts of a day are made of, big-endian, with a running checksum. */
final class PartOutput {
    /** Length of an exact sum: 128 bits. */
    static final int SUM_BYTES = 16;

    private final CRC32C checksum = new CRC32C();
    private final DataOutputStream out;

    PartOutput(OutputStream target) {
        out = new DataOutputStream(new CheckedOutputStream(target, checksum));
    }

    void magic(byte[] magic) throws IOException {
        out.write(magic);
    }

    void int4(int value) throws IOException {
        out.writeInt(value);
    }

    void int8(long value) throws IOException {
        out.writeLong(value);
    }

    void text(String text) throws IOException {
        byte[] utf8 = text.getBytes(StandardCharsets.UTF_8);
        out.writeShort(utf8.length);
        out.write(utf8);
    }

    void bytes(byte[] bytes) throws IOException {
        out.writeInt(bytes.length);
        out.write(bytes);
    }

    void sum(BigInteger value) throws IOException {
        byte[] least = value.toByteArray();
        byte fill = (byte) (value.signum() < 0 ? -1 : 0);
        for (int i = least.length; i < SUM_BYTES; i++) {
            out.writeByte(fill);
        }
        out.write(least);
    }

    /** The checksum of everything before, as the last field. */
    void end() throws IOException {
        out.flush();
        out.writeInt((int) checksum.getValue());
        out.flush();
    }
}
