package turnstone.audit;

/**
 * What a trial predicted for a duty: figures of decisions, by mass under the duty's mix.
 *
 * @param purity decision purity, 0 to 1
 * @param recovery decision recovery, 0 to 1
 * @param targetShare of the infeed, by mass, 0 to 1
 * @param product where the product goes
 */
public record Predicted(double purity, double recovery, double targetShare, Product product) {
    /** The two ways off the belt. */
    public enum Product {
        /** The air valves send the product off. */
        EJECTED,
        /** The product is what is left. */
        PASSED
    }

    /**
     * The purity of a bale when valves behave so: each kilogram that is decided to be ejected is, with the ejection efficiency, and each
     * that is decided to be left is carried along with the co-ejection, whatever it is made of.
     *
     * @return 0 to 1, or not a number where nothing at all reaches the product
     */
    public double balePurity(Valves valves) {
        double targetSent = targetShare * recovery;
        double otherSent = purity > 0 ? targetSent * (1 - purity) / purity : 0;
        double targetKept = targetShare - targetSent;
        double otherKept = 1 - targetShare - otherSent;
        double sent = product == Product.EJECTED ? valves.ejectionEfficiency() : 1 - valves.coEjection();
        double kept = product == Product.EJECTED ? valves.coEjection() : 1 - valves.ejectionEfficiency();
        double target = targetSent * sent + targetKept * kept;
        return target / (target + otherSent * sent + otherKept * kept);
    }
}
