package turnstone.measure;

import java.io.Serializable;

/**
 * Where a record was read, for messages and the quarantine.
 *
 * @param file as the source names it
 * @param row counted from 1, without the header
 */
public record RecordOrigin(String file, long row) implements Serializable {
    @Override
    public String toString() {
        return file + " row " + row;
    }
}
