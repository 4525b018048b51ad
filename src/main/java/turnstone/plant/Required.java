package turnstone.plant;

/**
 * The figure that a duty fixes; the other one is what a candidate may gain.
 *
 * @param figure decision purity or decision recovery
 * @param share between 0 and 1, both excluded
 */
public record Required(Requirement.Figure figure, double share) {
    /** Checks the share. */
    public Required {
        if (!(share > 0 && share < 1)) {
            throw new IllegalArgumentException("a required share lies between 0 and 1, not " + share);
        }
    }
}
