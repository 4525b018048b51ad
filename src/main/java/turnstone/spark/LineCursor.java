package turnstone.spark;

import java.io.IOException;
import java.util.HashMap;
import java.util.Iterator;
import java.util.List;
import java.util.Map;
import org.apache.hadoop.conf.Configuration;
import turnstone.measure.QuarantineReason;
import turnstone.measure.SourceType;

/** Records of CSV splits, parsed by this program: no type inference, no field lost or invented. */
final class LineCursor implements RecordCursor {
    private static final int MOST_REMEMBERED = 100_000;

    private final Iterator<CsvSplit> splits;
    private final LineLayout layout;
    private final Configuration configuration;
    private double[] values = {};
    private int channelCount;
    private final Map<String, String> remembered = new HashMap<>();
    private CsvSplit split;
    private LineReader lines;
    private long row;
    private List<String> fields = List.of();
    private String[] elements = {};
    private QuarantineReason defect;
    private int defectChannel;
    private String defectText;

    LineCursor(Iterator<CsvSplit> splits, LineLayout layout, Configuration configuration) {
        this.splits = splits;
        this.layout = layout;
        this.configuration = configuration;
    }

    @Override
    public boolean next() {
        try {
            while (true) {
                if (lines == null && !openNext()) {
                    return false;
                }
                String line = lines.position() < split.end() ? lines.next() : null;
                if (line == null) {
                    lines.close();
                    lines = null;
                    continue;
                }
                row++;
                if (row > 1 && !line.isEmpty()) {
                    parse(line);
                    return true;
                }
            }
        } catch (IOException e) {
            throw CsvScan.unreadable(split.file(), e);
        }
    }

    private boolean openNext() throws IOException {
        if (!splits.hasNext()) {
            return false;
        }
        split = splits.next();
        lines = new LineReader(CsvScan.open(split.file(), split.start(), configuration), split.start());
        row = split.firstRow() - 1;
        return true;
    }

    private void parse(String line) {
        fields = CsvLine.fields(line, split.file(), row);
        defect = null;
        defectChannel = -1;
        defectText = "";
        if (fields.size() != layout.columns()) {
            flaw(QuarantineReason.WRONG_CHANNEL_COUNT, -1, fields.size() + " fields");
            return;
        }
        if (layout.layout() == ColumnNames.Layout.ARRAY) {
            elements = LineLayout.elements(fields.get(layout.channelAt()[0]));
        }
        channelCount = layout.layout() == ColumnNames.Layout.ARRAY ? elements.length : layout.channelAt().length;
        if (channelCount > values.length) {
            values = new double[channelCount];
        }
        for (int c = 0; c < channelCount; c++) {
            value(c, channelText(c));
        }
    }

    private void value(int channel, String text) {
        switch (Decimals.reading(text)) {
            case NON_FINITE -> values[channel] = Double.NaN;
            case NOT_A_NUMBER -> flaw(QuarantineReason.NOT_A_NUMBER, channel, text);
            case NUMBER -> {
                try {
                    values[channel] = Double.parseDouble(text);
                } catch (NumberFormatException e) {
                    flaw(QuarantineReason.NOT_A_NUMBER, channel, text);
                }
            }
        }
    }

    private void flaw(QuarantineReason reason, int channel, String text) {
        if (defect == null) {
            defect = reason;
            defectChannel = channel;
            defectText = text;
        }
    }

    @Override
    public String text(int column) {
        int at = layout.textAt()[column];
        if (at >= fields.size() || fields.get(at).isEmpty()) {
            return null;
        }
        if (remembered.size() > MOST_REMEMBERED) {
            remembered.clear();
        }
        return remembered.computeIfAbsent(fields.get(at), text -> text);
    }

    @Override
    public long whole(int column) {
        String text = text(column);
        if (text == null) {
            return NO_NUMBER;
        }
        try {
            return Long.parseLong(text);
        } catch (NumberFormatException e) {
            return NO_NUMBER;
        }
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
        return layout.layout() == ColumnNames.Layout.ARRAY
                ? elements[channel]
                : fields.get(layout.channelAt()[channel]);
    }

    @Override
    public SourceType type(int channel) {
        return SourceType.DECIMAL;
    }

    @Override
    public QuarantineReason defect() {
        return defect;
    }

    @Override
    public int defectChannel() {
        return defectChannel;
    }

    @Override
    public String defectText() {
        return defectText;
    }

    @Override
    public String file() {
        return split.file();
    }

    @Override
    public long row() {
        return row - 1;
    }
}
