package turnstone.plant;

import java.time.LocalDate;

/**
 * Where a table is and how it is laid out.
 *
 * @param path absolute path or URI; may hold {@code {day}} and file-name globs
 * @param format Parquet or CSV (with a header, gzip by the file's ending)
 * @param layout where the channels are
 */
public record SourceSpec(String path, TableFormat format, ChannelLayout layout) {
    private static final String DAY = "{day}";

    /** Whether each day has a path of its own. */
    public boolean pathByDay() {
        return path.contains(DAY);
    }

    /** The path of a day, the day written as 2026-03-01. */
    public String pathOf(LocalDate day) {
        return path.replace(DAY, day.toString());
    }
}
