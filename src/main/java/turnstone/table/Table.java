package turnstone.table;

import java.util.EnumMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import turnstone.spark.ColumnNames;
import turnstone.spark.KeyColumn;
import turnstone.spark.RecordSource;
import turnstone.spark.Session;
import turnstone.spark.TableSpec;

/**
 * Which table, and which of its columns.
 *
 * @param path file, folder or pattern; CSV by its ending or those of its files, else Parquet
 * @param label the column with the truth; empty where there is none
 * @param channels the columns that are channels; empty for every column but the label
 * @param array the one column that holds all channels as an array; empty where there is one column per channel
 */
public record Table(String path, Optional<String> label, List<String> channels, Optional<String> array) {
    public Table {
        channels = List.copyOf(channels);
    }

    /** Finds and counts the files; columns that are neither label nor channel are left. */
    RecordSource open(Session session) {
        return RecordSource.open(session, spec(session, names()));
    }

    /** Finds and counts the files; columns that are neither label nor channel are carried through. */
    RecordSource openCarrying(Session session) {
        return RecordSource.open(session, spec(session, names().carryingOthers()));
    }

    private TableSpec spec(Session session, ColumnNames names) {
        return new TableSpec(List.of(path), TableSpec.Form.of(session, path), names);
    }

    private ColumnNames names() {
        Map<KeyColumn, String> keys = new EnumMap<>(KeyColumn.class);
        label.ifPresent(column -> keys.put(KeyColumn.MATERIAL, column));
        if (array.isPresent()) {
            return ColumnNames.array(keys, array.get(), 0);
        }
        return channels.isEmpty() ? ColumnNames.allBut(label.orElseThrow()) : ColumnNames.columns(keys, channels);
    }
}
