package turnstone.spark;

/** The way by which records come in; the numbers do not depend on it. */
public enum ReadPath {
    /** Lines of text, parsed by this program. */
    LINES,
    /** The engine's rows. */
    ROWS,
    /** The engine's column batches, straight from the scan. */
    COLUMN_BATCHES
}
