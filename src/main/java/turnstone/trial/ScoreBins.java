package turnstone.trial;

/**
 * The bins of a score: how far a record lies on the side of the ejected materials, in squared within-variance units.
 *
 * <p>The magnitude of a score is the difference between the smallest squared distance (prior term included) to a material that the duty
 * ejects and the smallest to any other, 0 or more; its side is the decision's, so a tie goes where the decision goes. Bins of a magnitude:
 * 64 of width 1/8 below 8, then 32 to each doubling up to 1024, then one for all that is larger: {@value #SIDE} on each side,
 * {@value #COUNT} in all, 0 the farthest away from ejection. Every edge is a sum of few powers of two, so a magnitude falls into the same
 * bin on every machine.
 *
 * <p>A cut is the number of the first bin that is ejected: {@value #SIDE} is the decision for the nearest material, {@value #COUNT} ejects
 * nothing.
 */
public final class ScoreBins {
    /** Bins on one side of the decision for the nearest material. */
    public static final int SIDE = 289;
    /** All bins. */
    public static final int COUNT = 2 * SIDE;
    /** The cut that ejects what is nearest to an ejected material. */
    public static final int NEAREST = SIDE;

    private static final double EVEN_BELOW = 8;
    private static final int EVEN = 64;
    private static final int TO_DOUBLING = 32;
    private static final double LARGEST = 1024;

    private ScoreBins() {}

    /** The bin of a record that was decided to be one of the ejected materials. */
    public static int ejected(double magnitude) {
        return SIDE + steps(magnitude);
    }

    /** The bin of a record that was decided to be any other material. */
    public static int kept(double magnitude) {
        return SIDE - 1 - steps(magnitude);
    }

    /** The score at which a bin begins, for people; the first bin has no such edge. */
    public static double edge(int bin) {
        if (bin < 1 || bin > COUNT) {
            throw new IllegalArgumentException("bins with an edge are 1 to " + COUNT + ", not " + bin);
        }
        return bin >= SIDE ? magnitude(bin - SIDE) : -magnitude(SIDE - bin);
    }

    private static int steps(double magnitude) {
        if (!(magnitude >= 0)) {
            throw new IllegalArgumentException("a magnitude is 0 or more, not " + magnitude);
        }
        if (magnitude >= LARGEST) {
            return SIDE - 1;
        }
        if (magnitude < EVEN_BELOW) {
            return (int) (magnitude * EVEN / EVEN_BELOW);
        }
        int doublings = Math.getExponent(magnitude) - Math.getExponent(EVEN_BELOW);
        double from = Math.scalb(EVEN_BELOW, doublings);
        return EVEN + TO_DOUBLING * doublings + (int) ((magnitude - from) * TO_DOUBLING / from);
    }

    private static double magnitude(int steps) {
        if (steps == SIDE) {
            return Double.POSITIVE_INFINITY;
        }
        if (steps < EVEN) {
            return steps * EVEN_BELOW / EVEN;
        }
        double from = Math.scalb(EVEN_BELOW, (steps - EVEN) / TO_DOUBLING);
        return from + from * ((steps - EVEN) % TO_DOUBLING) / TO_DOUBLING;
    }
}
