package turnstone.spark;

import java.io.Serializable;
import java.util.List;

/** Where texts and channels are among the fields of a line. Internal: the arrays are shared and not to be changed. */
record LineLayout(int columns, int[] textAt, ColumnNames.Layout layout, int[] channelAt) implements Serializable {

    static LineLayout of(TableColumns columns, List<String> header) {
        int[] textAt = columns.texts().stream().mapToInt(header::indexOf).toArray();
        int[] channelAt = columns.channels().stream().mapToInt(header::indexOf).toArray();
        return new LineLayout(header.size(), textAt, columns.layout(), channelAt);
    }

    /** The numbers of an array field: separated by blanks or semicolons, brackets around them or not. */
    static String[] elements(String field) {
        String text = field.strip();
        if (text.startsWith("[") && text.endsWith("]")) {
            text = text.substring(1, text.length() - 1).strip();
        }
        return text.isEmpty() ? new String[0] : text.split("\\s*;\\s*|\\s+", -1);
    }
}
