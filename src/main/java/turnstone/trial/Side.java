package turnstone.trial;

/** The two sides of a trial. */
public enum Side {
    /** The refit that asks to be released. */
    CANDIDATE("candidate"),
    /** What runs now. */
    IN_SERVICE("in service");

    private final String label;

    Side(String label) {
        this.label = label;
    }

    /** The words used in files and texts. */
    public String label() {
        return label;
    }
}
