package turnstone.trial;

/** What a verdict comes to. */
public enum Decision {
    /** Every requirement is met. */
    RELEASE("release"),
    /** One is not, or could not be judged. */
    HOLD("hold");

    private final String label;

    Decision(String label) {
        this.label = label;
    }

    /** The word used in files. */
    public String label() {
        return label;
    }
}
