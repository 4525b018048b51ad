package turnstone.ledger;

import java.io.DataInputStream;
import java.io.EOFException;
import java.io.IOException;
import java.io.InputStream;
import java.math.BigInteger;
import java.nio.charset.StandardCharsets;
import java.util.Arrays;
import java.util.zip.CRC32C;
import java.util.zip.CheckedInputStream;

/** Reads the fields that the parts of a day are made of; anything that can't be right is an {@link IOException} that says what. */
final class PartInput {
    private final CRC32C checksum = new CRC32C();
    private final DataInputStream in;

    PartInput(InputStream source) {
        in = new DataInputStream(new CheckedInputStream(source, checksum));
    }

    void magic(byte[] magic) throws IOException {
        byte[] found = new byte[magic.length];
        in.readFully(found);
        if (!Arrays.equals(found, magic)) {
            throw new IOException("another kind of file: magic " + Arrays.toString(found));
        }
    }

    void version(int newest) throws IOException {
        int version = in.readInt();
        if (version < 1 || version > newest) {
            throw new IOException("version " + version + ", this program reads 1 to " + newest);
        }
    }

    /** A number of things, between {@code least} and {@code most}. */
    int count(String what, int least, int most) throws IOException {
        int value = in.readInt();
        if (value < least || value > most) {
            throw new IOException(what + " out of range: " + value);
        }
        return value;
    }

    long records(String what) throws IOException {
        long value = in.readLong();
        if (value < 0) {
            throw new IOException(what + " is negative: " + value);
        }
        return value;
    }

    String text() throws IOException {
        byte[] utf8 = new byte[in.readUnsignedShort()];
        in.readFully(utf8);
        return new String(utf8, StandardCharsets.UTF_8);
    }

    byte[] bytes(int most) throws IOException {
        int length = count("length", 0, most);
        // Read as it comes: a damaged length must not claim the memory first.
        byte[] bytes = in.readNBytes(length);
        if (bytes.length < length) {
            throw new EOFException("ends inside a field of " + length + " bytes");
        }
        return bytes;
    }

    BigInteger sum() throws IOException {
        byte[] bytes = new byte[PartOutput.SUM_BYTES];
        in.readFully(bytes);
        return new BigInteger(bytes);
    }

    /** Checks the checksum, and that nothing follows it. */
    void end() throws IOException {
        int computed = (int) checksum.getValue();
        int stated = in.readInt();
        if (computed != stated) {
            throw new IOException(
                    "checksum is " + Integer.toHexString(computed) + ", not " + Integer.toHexString(stated));
        }
        if (in.read() >= 0) {
            throw new IOException("something follows the end");
        }
    }
}
