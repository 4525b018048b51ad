package turnstone.spark;

import java.io.Serializable;

/**
 * One input file as found.
 *
 * @param path its full address
 * @param bytes its size
 * @param modified_ms when it was last changed, milliseconds since 1970
 * @param rows its records, counted on the driver and apart from the job: Parquet footer, or lines
 */
public record SourceFile(String path, long bytes, long modified_ms, long rows) implements Serializable {
    SourceFile withRows(long counted) {
        return new SourceFile(path, bytes, modified_ms, counted);
    }
}
