package turnstone.spark;

import java.io.ByteArrayInputStream;
import java.io.ByteArrayOutputStream;
import java.io.DataInputStream;
import java.io.DataOutputStream;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;

/** Bytes that travel between tasks of one job; never kept on disk by this program. */
final class Payloads {
    private Payloads() {}

    /** Writes into a stream in memory. */
    @FunctionalInterface
    interface Writer {
        void write(DataOutputStream out) throws IOException;
    }

    /** Reads from a stream in memory. */
    @FunctionalInterface
    interface Reader<T> {
        T read(DataInputStream in) throws IOException;
    }

    static byte[] bytes(Writer writer) {
        ByteArrayOutputStream bytes = new ByteArrayOutputStream();
        try (DataOutputStream out = new DataOutputStream(bytes)) {
            writer.write(out);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        return bytes.toByteArray();
    }

    static <T> T read(byte[] bytes, Reader<T> reader) {
        try (DataInputStream in = new DataInputStream(new ByteArrayInputStream(bytes))) {
            return reader.read(in);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    static void writeText(DataOutputStream out, String text) throws IOException {
        byte[] utf8 = text.getBytes(StandardCharsets.UTF_8);
        out.writeInt(utf8.length);
        out.write(utf8);
    }

    static String readText(DataInputStream in) throws IOException {
        byte[] utf8 = new byte[in.readInt()];
        in.readFully(utf8);
        return new String(utf8, StandardCharsets.UTF_8);
    }
}
