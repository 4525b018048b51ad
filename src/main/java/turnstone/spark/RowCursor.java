package turnstone.spark;

import java.util.Iterator;
import java.util.function.BooleanSupplier;
import org.apache.spark.rdd.InputFileBlockHolder;
import org.apache.spark.sql.catalyst.InternalRow;
import org.apache.spark.sql.catalyst.util.ArrayData;
import org.apache.spark.unsafe.types.UTF8String;
import turnstone.measure.QuarantineReason;
import turnstone.measure.SourceType;

/** Records from the engine's rows, those of a column batch included. Rows are reused by the engine, so values are copied out. */
final class RowCursor implements RecordCursor {
    private final Iterator<InternalRow> rows;
    private final RowLayout layout;
    private final BooleanSupplier elementsMayBeNull;
    private final TextMemo[] memos;
    private double[] values = {};
    private int channelCount;
    private InternalRow row;
    private long count;
    private QuarantineReason defect;
    private String defectText = "";
    private UTF8String fileBytes;
    private String file = "";

    /**
     * Walks rows.
     *
     * @param elementsMayBeNull whether an array of channels of the row just taken can hold nulls; they are looked for only then
     */
    RowCursor(Iterator<InternalRow> rows, RowLayout layout, BooleanSupplier elementsMayBeNull) {
        this.rows = rows;
        this.elementsMayBeNull = elementsMayBeNull;
        this.layout = layout;
        this.memos = new TextMemo[layout.textAt().length];
        for (int i = 0; i < memos.length; i++) {
            memos[i] = new TextMemo();
        }
    }

    @Override
    public boolean next() {
        if (!rows.hasNext()) {
            return false;
        }
        row = rows.next();
        count++;
        defect = null;
        defectText = "";
        if (layout.layout() == ColumnNames.Layout.ARRAY) {
            readArray();
        } else {
            readColumns();
        }
        return true;
    }

    private void readArray() {
        int at = layout.channelAt()[0];
        if (row.isNullAt(at)) {
            defect = QuarantineReason.WRONG_CHANNEL_COUNT;
            defectText = "no channels";
            return;
        }
        ArrayData array = row.getArray(at);
        hold(array.numElements());
        CellType type = layout.channelTypes()[0];
        if (!elementsMayBeNull.getAsBoolean() || !anyNull(array, channelCount)) {
            type.numbers(array, values, channelCount);
            return;
        }
        for (int i = 0; i < channelCount; i++) {
            values[i] = array.isNullAt(i) ? Double.NaN : type.element(array, i);
        }
    }

    private void hold(int found) {
        channelCount = found;
        if (found > values.length) {
            values = new double[found];
        }
    }

    private static boolean anyNull(ArrayData array, int n) {
        for (int i = 0; i < n; i++) {
            if (array.isNullAt(i)) {
                return true;
            }
        }
        return false;
    }

    private void readColumns() {
        int[] at = layout.channelAt();
        CellType[] types = layout.channelTypes();
        hold(at.length);
        for (int i = 0; i < channelCount; i++) {
            values[i] = row.isNullAt(at[i]) ? Double.NaN : types[i].number(row, at[i]);
        }
    }

    @Override
    public String text(int column) {
        int at = layout.textAt()[column];
        if (row.isNullAt(at)) {
            return null;
        }
        if (layout.textTypes()[column] == CellType.TEXT) {
            return memos[column].of(row.getUTF8String(at));
        }
        return memos[column].of(UTF8String.fromString(layout.textTypes()[column].text(row, at)));
    }

    @Override
    public long whole(int column) {
        int at = layout.textAt()[column];
        return row.isNullAt(at) ? NO_NUMBER : layout.textTypes()[column].whole(row, at);
    }

    @Override
    public double[] channels() {
        return values;
    }

    @Override
    public int channelCount() {
        return channelCount;
    }

    @Override
    public String channelText(int channel) {
        return null;
    }

    @Override
    public SourceType type(int channel) {
        return layout.channelTypes()[layout.layout() == ColumnNames.Layout.ARRAY ? 0 : channel].sourceType();
    }

    @Override
    public QuarantineReason defect() {
        return defect;
    }

    @Override
    public int defectChannel() {
        return -1;
    }

    @Override
    public String defectText() {
        return defectText;
    }

    @Override
    public String file() {
        UTF8String current = InputFileBlockHolder.getInputFilePath();
        if (!current.equals(fileBytes)) {
            fileBytes = current;
            file = current.toString();
        }
        return file;
    }

    @Override
    public long row() {
        return layout.rowAt() < 0 || row.isNullAt(layout.rowAt()) ? count : row.getLong(layout.rowAt()) + 1;
    }
}
