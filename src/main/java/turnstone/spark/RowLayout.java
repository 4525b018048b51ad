package turnstone.spark;

import java.io.Serializable;
import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import org.apache.spark.sql.types.StructType;
import turnstone.measure.SourceType;

/** Where texts and channels are in a row. The arrays are shared within this package and never written to. */
final class RowLayout implements Serializable {
    private static final long serialVersionUID = 1L;

    /** Internal name of the reader's column for the number of a record in its file. */
    static final String ROW_COLUMN = "_tmp_metadata_row_index";

    private final int[] textAt;
    private final CellType[] textTypes;
    private final ColumnNames.Layout layout;
    private final int[] channelAt;
    private final CellType[] channelTypes;
    private final int rowAt;

    private RowLayout(
            int[] textAt,
            CellType[] textTypes,
            ColumnNames.Layout layout,
            int[] channelAt,
            CellType[] channelTypes,
            int rowAt) {
        this.textAt = textAt;
        this.textTypes = textTypes;
        this.layout = layout;
        this.channelAt = channelAt;
        this.channelTypes = channelTypes;
        this.rowAt = rowAt;
    }

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

    /** The type in which values were recorded: that of the column with the finest values. */
    SourceType sourceType() {
        return Arrays.stream(channelTypes)
                .map(CellType::sourceType)
                .min(Comparator.naturalOrder())
                .orElseThrow();
    }

    int[] textAt() {
        return textAt;
    }

    CellType[] textTypes() {
        return textTypes;
    }

    ColumnNames.Layout layout() {
        return layout;
    }

    int[] channelAt() {
        return channelAt;
    }

    CellType[] channelTypes() {
        return channelTypes;
    }

    /** The column that numbers the records of the file, or -1. */
    int rowAt() {
        return rowAt;
    }
}
