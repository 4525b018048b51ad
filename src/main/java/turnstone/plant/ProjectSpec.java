package turnstone.plant;

/**
 * Whether the night ends with the day's positions and decisions as a table.
 *
 * @param write on or off
 * @param form the form of the table
 */
public record ProjectSpec(Write write, TableFormat form) {
    /** Whether the table is written. */
    public enum Write {
        /** Written. */
        ON,
        /** Not written. */
        OFF
    }
}
