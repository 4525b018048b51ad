package turnstone.store;

import java.io.IOException;
import java.io.InputStream;

/**
 * Reads the content of one file, front to back. It may stop early and doesn't close the stream.
 *
 * @param <T> what it makes of the content
 */
@FunctionalInterface
public interface ContentReader<T> {
    /** Reads what it needs. */
    T readFrom(InputStream in) throws IOException;
}
