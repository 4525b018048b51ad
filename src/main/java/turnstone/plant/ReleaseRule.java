package turnstone.plant;

/** Who puts a candidate with the verdict `release` in service. */
public enum ReleaseRule {
    /** A person, by command. */
    BY_HAND,
    /** The night does. */
    AUTOMATIC;

    static ReleaseRule of(String word) {
        return Words.constant(ReleaseRule.class, word);
    }
}
