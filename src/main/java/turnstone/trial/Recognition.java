package turnstone.trial;

/** What a model made of a record beside its nearest material. */
public enum Recognition {
    /** Within the distances that the model knows. */
    FAMILIAR("familiar"),
    /** Beyond them: decided all the same, never ejected. */
    UNFAMILIAR("unfamiliar"),
    /** Too dark to tell: never decided, never ejected, always counted. */
    NO_SIGNAL("no signal");

    private final String label;

    Recognition(String label) {
        this.label = label;
    }

    /** The word used in files. */
    public String label() {
        return label;
    }

    static Recognition of(String label) {
        for (Recognition value : values()) {
            if (value.label.equals(label)) {
                return value;
            }
        }
        throw new IllegalArgumentException("no such recognition: " + label);
    }
}
