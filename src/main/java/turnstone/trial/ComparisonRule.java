package turnstone.trial;

/**
 * The requirement that holds for every duty as soon as something is in service: the candidate recovers no less, but for a stated loss.
 *
 * <p>Held against it: the lower end of the interval of the paired difference of decision recovery, candidate minus in service, on the same
 * records of the same showings, each side without the tray group of the record.
 *
 * @param allowedLoss of recovery, a share, 0 or more
 * @param confidence of the interval, two-sided, between 0.5 and 1
 */
public record ComparisonRule(double allowedLoss, double confidence) {
    /** What the requirement is called in files and texts. */
    public static final String NAME = "decision recovery against in service, tray not seen, lower bound";

    /** Checks both numbers. */
    public ComparisonRule {
        if (!(allowedLoss >= 0 && allowedLoss <= 1)) {
            throw new IllegalArgumentException("an allowed loss is a share, not " + allowedLoss);
        }
        if (!(confidence >= 0.5 && confidence < 1)) {
            throw new IllegalArgumentException("a confidence lies between 0.5 and 1, not " + confidence);
        }
    }

    /** One point of recovery, at the lower end of a 90 % interval. */
    public static ComparisonRule standard() {
        return new ComparisonRule(0.01, 0.90);
    }
}
