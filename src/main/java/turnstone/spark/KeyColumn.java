package turnstone.spark;

/** The columns of a record that are not channels. */
public enum KeyColumn {
    /** ISO date of the showing. */
    DAY("day"),
    /** Name of the machine. */
    SORTER("sorter"),
    /** Identity of the showing, unique in the fleet. */
    SHOWING("showing"),
    /** Name of the tray. */
    TRAY("tray"),
    /** Name of the material; the label of a plain table. */
    MATERIAL("material"),
    /** Name of the piece, where known. */
    PIECE("piece"),
    /** Position across the belt, where references are used. */
    BELT_COLUMN("belt column"),
    /** Milliseconds since 1970-01-01T00:00Z, where references are used. */
    TIME("time"),
    /** Dark or white, in a table of references. */
    KIND("kind");

    private final String label;

    KeyColumn(String label) {
        this.label = label;
    }

    /** The word for it in messages. */
    public String label() {
        return label;
    }
}
