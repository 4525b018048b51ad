package turnstone.plant;

/**
 * What a candidate must gain over what is in service, and on how many showings that must rest.
 *
 * <p>Held against it: the one-sided lower bound of the paired difference, candidate minus in service, of recovery at the required purity (of
 * purity at the required recovery where the duty fixes that; of recovery by the decision for the nearest material where it fixes neither).
 *
 * @param above the gain that the bound must pass, a share; 0.01 is one point
 * @param confidence of the bound, one-sided, between 0.5 and 1
 * @param days that the trial must have
 * @param sorters that it must have, 2 or more
 * @param showings of each material on each sorter and day, on average
 */
public record GainRule(double above, double confidence, int days, int sorters, int showings) {
    private static final double USUAL_CONFIDENCE = 0.95;
    private static final int USUAL_DAYS = 5;
    private static final int USUAL_SORTERS = 6;
    private static final int USUAL_SHOWINGS = 4;

    /** Checks the numbers. */
    public GainRule {
        if (!(above > -1 && above < 1)) {
            throw new IllegalArgumentException("a gain is a difference of shares, not " + above);
        }
        if (!(confidence > 0.5 && confidence < 1)) {
            throw new IllegalArgumentException("a confidence lies between 0.5 and 1, not " + confidence);
        }
        if (days < 1 || sorters < 2 || showings < 1) {
            throw new IllegalArgumentException("a gain needs a day, two sorters and a showing at least");
        }
    }

    /** Above 0 at 95 %, over 5 days, 6 sorters and 4 showings. */
    public static GainRule standard() {
        return new GainRule(0, USUAL_CONFIDENCE, USUAL_DAYS, USUAL_SORTERS, USUAL_SHOWINGS);
    }
}
