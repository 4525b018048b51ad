package turnstone.plant;

/** The form of a table on disk. */
public enum TableFormat {
    /** Apache Parquet. */
    PARQUET,
    /** Text with a header line, fields between commas, gzip by the file's ending. */
    CSV;

    static TableFormat of(String word) {
        return Words.constant(TableFormat.class, word);
    }
}
