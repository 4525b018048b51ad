package turnstone.shelf;

/** What an entry of the shelf's journal does. */
public enum Action {
    /** Puts a model in service. */
    RELEASE("release"),
    /** Puts the model that was in service before the current one back. */
    REVERT("revert"),
    /** Takes a model out of service for good, and puts back what ran before it wherever it was in service. */
    WITHDRAW("withdraw");

    private final String label;

    Action(String label) {
        this.label = label;
    }

    /** The word in files and messages. */
    public String label() {
        return label;
    }

    static Action of(String label) {
        for (Action action : values()) {
            if (action.label.equals(label)) {
                return action;
            }
        }
        throw new IllegalArgumentException("no action is called " + label);
    }
}
