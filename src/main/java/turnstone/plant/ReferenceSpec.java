package turnstone.plant;

/**
 * The table of dark and white references.
 *
 * @param source where it is; its path has no {@code {day}}
 * @param columns the names of its key columns
 * @param dark the word in the kind column that marks a dark reference
 * @param white the word that marks a white one
 * @param maxAge_ms the oldest reference that may serve a record, milliseconds
 */
public record ReferenceSpec(SourceSpec source, Columns columns, String dark, String white, long maxAge_ms) {
    /**
     * The names of the key columns.
     *
     * @param kind dark or white
     * @param sorter name of the sorter
     * @param beltColumn pixel across the belt, an integer
     * @param time_ms milliseconds since 1970-01-01T00:00Z
     */
    public record Columns(String kind, String sorter, String beltColumn, String time_ms) {}
}
