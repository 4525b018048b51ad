package turnstone.spark;

import java.util.List;

/**
 * A table of records on some file system.
 *
 * @param paths files, folders (read with all below them, but names that begin with {@code .} or {@code _}) or patterns
 * @param form how the files are written
 * @param columns what the columns mean
 */
public record TableSpec(List<String> paths, Form form, ColumnNames columns) {
    /** How a table is written. */
    public enum Form {
        /** Apache Parquet. */
        PARQUET,
        /** Comma-separated, with a header, UTF-8; also compressed as {@code .gz}. */
        CSV;

        /** By the ending of a file name: {@code .csv}, {@code .csv.gz}, {@code .txt}; anything else is taken for Parquet. */
        public static Form byName(String path) {
            String plain = path.endsWith(".gz") ? path.substring(0, path.length() - 3) : path;
            return plain.endsWith(".csv") || plain.endsWith(".txt") ? CSV : PARQUET;
        }
    }

    /** Copies the list. */
    public TableSpec {
        paths = List.copyOf(paths);
        if (paths.isEmpty()) {
            throw new IllegalArgumentException("no path");
        }
    }
}
