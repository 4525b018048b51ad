package turnstone.trial;

/** What the models that judge a record were re-made without. */
public enum TrialForm {
    /** Without the tray group of the record. */
    THIS_FLEET("this fleet"),
    /** Without the tray group and without the instrument of the record. */
    MACHINE_NOT_SEEN("machine not seen");

    private final String label;

    TrialForm(String label) {
        this.label = label;
    }

    /** The words used in files and texts. */
    public String label() {
        return label;
    }
}
