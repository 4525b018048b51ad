package turnstone.store;

import java.io.FilterOutputStream;
import java.io.IOException;
import java.io.OutputStream;

/** Counts the bytes that pass. */
final class CountingStream extends FilterOutputStream {
    private long count;

    CountingStream(OutputStream out) {
        super(out);
    }

    long count() {
        return count;
    }

    @Override
    public void write(int b) throws IOException {
        out.write(b);
        count++;
    }

    @Override
    public void write(byte[] bytes, int from, int length) throws IOException {
        out.write(bytes, from, length);
        count += length;
    }
}
