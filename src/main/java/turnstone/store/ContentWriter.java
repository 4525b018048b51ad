package turnstone.store;

import java.io.IOException;
import java.io.OutputStream;

/** Writes the content of one file, front to back. It doesn't close the stream. */
@FunctionalInterface
public interface ContentWriter {
    /** Writes everything. */
    void writeTo(OutputStream out) throws IOException;
}
