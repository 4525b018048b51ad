package turnstone.spark;

import java.io.Serializable;
import java.util.List;

/** Where texts and channels are among the fields of a line. The arrays are shared within this package and never written to. */
final class LineLayout implements Serializable {
    private static final long serialVersionUID = 1L;

    private final int columns;
    private final int[] textAt;
    private final ColumnNames.Layout layout;
    private final int[] channelAt;

    private LineLayout(int columns, int[] textAt, ColumnNames.Layout layout, int[] channelAt) {
        this.columns = columns;
        this.textAt = textAt;
        this.layout = layout;
        this.channelAt = channelAt;
    }

    int columns() {
        return columns;
    }

    int[] textAt() {
        return textAt;
    }

    ColumnNames.Layout layout() {
        return layout;
    }

    int[] channelAt() {
        return channelAt;
    }

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
