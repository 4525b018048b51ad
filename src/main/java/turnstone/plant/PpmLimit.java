package turnstone.plant;

/**
 * A limit on a material in the product, in parts per million of its mass.
 *
 * @param material not a target of the duty
 * @param most_ppm the limit
 * @param use whether a release depends on it
 * @param confidence of the upper bound, one-sided
 */
public record PpmLimit(String material, double most_ppm, Use use, double confidence) {
    /** What a limit is for. */
    public enum Use {
        /** Shown, and nothing depends on it. */
        REPORT,
        /** A release needs the bound to be under it. */
        REQUIREMENT;

        static Use of(String word) {
            return Words.constant(Use.class, word);
        }
    }
}
