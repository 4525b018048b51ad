package turnstone.spark;

import java.io.Serializable;
import java.util.List;
import org.apache.spark.sql.types.StructType;

/**
 * Where texts and channels are in a row. Internal: the arrays are shared and not to be changed.
 *
 * @param rowAt the column that numbers the records of the file, or -1
 */
record RowLayout(
        int[] textAt,
        CellType[] textTypes,
        ColumnNames.Layout layout,
        int[] channelAt,
        CellType[] channelTypes,
        int rowAt)
        implements Serializable {

    /** Internal name of the reader's column for the number of a record in its file. */
    static final String ROW_COLUMN = "_tmp_metadata_row_index";

    /**
     * Finds the columns by name.
     *
     * @param order the names in the order in which the rows have them
     * @param schema the types, by name
     */
    static RowLayout of(TableColumns columns, List<String> order, StructType schema, String place) {
        int[] textAt = columns.texts().stream().mapToInt(order::indexOf).toArray();
        int[] channelAt = columns.channels().stream().mapToInt(order::indexOf).toArray();
        CellType[] textTypes = columns.texts().stream()
                .map(name -> CellType.of(schema.apply(name).dataType(), name, place))
                .toArray(CellType[]::new);
        CellType[] channelTypes = columns.channels().stream()
                .map(name -> columns.layout() == ColumnNames.Layout.ARRAY
                        ? CellType.ofElements(schema.apply(name).dataType(), name, place)
                        : CellType.ofChannel(schema.apply(name).dataType(), name, place))
                .toArray(CellType[]::new);
        int rowAt = order.indexOf(ROW_COLUMN);
        return new RowLayout(textAt, textTypes, columns.layout(), channelAt, channelTypes, rowAt);
    }
}
