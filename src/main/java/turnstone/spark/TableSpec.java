package turnstone.spark;

import java.util.List;
import turnstone.fault.Fault;

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

        /**
         * By the ending of the name or, for a folder or pattern that doesn't say, by the names of the files there.
         *
         * @throws Fault of kind input where there are none, or files of both forms
         */
        public static Form of(Session session, String path) {
            if (byName(path) == CSV) {
                return CSV;
            }
            List<SourceFile> files = SourceFiles.find(
                    List.of(path), session.spark().sparkContext().hadoopConfiguration());
            long text =
                    files.stream().filter(file -> byName(file.path()) == CSV).count();
            if (text > 0 && text < files.size()) {
                throw Fault.input("files of two forms")
                        .at(path)
                        .found(text + " of " + files.size() + " are CSV by their names")
                        .remedy("give those of one form, by a pattern");
            }
            return text > 0 ? CSV : PARQUET;
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
