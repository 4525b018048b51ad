package turnstone.spark;

/**
 * How a projection is written.
 *
 * @param out the folder to make; it must not exist or be empty
 * @param form of the table of positions
 * @param mostQuarantined the largest share of quarantined records, 0 to 1; above it nothing is written
 * @param quarantineKept how many quarantined records are written; their counts are complete whatever this is
 */
public record ProjectSettings(String out, TableSpec.Form form, double mostQuarantined, int quarantineKept) {
    /** Checks the numbers. */
    public ProjectSettings {
        if (!(mostQuarantined >= 0 && mostQuarantined <= 1) || quarantineKept < 0) {
            throw new IllegalArgumentException("a setting of the projection is out of range");
        }
    }
}
