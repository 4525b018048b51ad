package turnstone.store;

import java.io.FilterInputStream;
import java.io.IOException;
import java.io.InputStream;

/** Counts the bytes that are read. */
final class CountingInput extends FilterInputStream {
    private long count;

    CountingInput(InputStream in) {
        super(in);
    }

    long count() {
        return count;
    }

    @Override
    public int read() throws IOException {
        int value = in.read();
        count += value < 0 ? 0 : 1;
        return value;
    }

    @Override
    public int read(byte[] bytes, int from, int length) throws IOException {
        int read = in.read(bytes, from, length);
        count += Math.max(0, read);
        return read;
    }

    @Override
    public boolean markSupported() {
        return false;
    }
}
