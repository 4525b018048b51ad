package turnstone.spark;

import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import java.util.Arrays;

/** Reads lines of UTF-8 that end in LF or CR LF and knows at which byte it is. */
final class LineReader implements AutoCloseable {
    private static final int CHUNK = 1 << 16;

    private final InputStream in;
    private final byte[] chunk = new byte[CHUNK];
    private byte[] line = new byte[1024];
    private int filled;
    private int next;
    private long position;

    LineReader(InputStream in, long position) {
        this.in = in;
        this.position = position;
    }

    /** The byte after the last line returned, counted in the plain text. */
    long position() {
        return position;
    }

    /** The next line without its ending; null after the last. */
    String next() throws IOException {
        int length = 0;
        boolean any = false;
        while (true) {
            if (next == filled) {
                filled = in.read(chunk);
                next = 0;
                if (filled < 0) {
                    filled = 0;
                    return any ? text(length) : null;
                }
                continue;
            }
            any = true;
            int end = next;
            while (end < filled && chunk[end] != '\n') {
                end++;
            }
            length = append(length, end);
            boolean ended = end < filled;
            position += end - next + (ended ? 1 : 0);
            next = ended ? end + 1 : end;
            if (ended) {
                return text(length);
            }
        }
    }

    private int append(int length, int end) {
        int more = end - next;
        if (length + more > line.length) {
            line = Arrays.copyOf(line, Math.max(2 * line.length, length + more));
        }
        System.arraycopy(chunk, next, line, length, more);
        return length + more;
    }

    private String text(int length) {
        int end = length > 0 && line[length - 1] == '\r' ? length - 1 : length;
        return new String(line, 0, end, StandardCharsets.UTF_8);
    }

    @Override
    public void close() throws IOException {
        in.close();
    }
}
