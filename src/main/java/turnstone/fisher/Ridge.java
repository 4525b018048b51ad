package turnstone.fisher;

/**
 * The amount added to the diagonal of the within scatter, as a share of its mean diagonal, in pretreated units.
 *
 * <p>Either a number, or analytic: the oracle-approximating shrinkage ρ of Y. Chen, A. Wiesel, Y. C. Eldar and A. O. Hero,
 * IEEE Transactions on Signal Processing 58 (2010), 5016–5029, equation 23, which as a ridge is ρ/(1 − ρ).
 */
public sealed interface Ridge {
    /** No ridge. */
    Ridge NONE = new Amount(0);

    /** A share of the mean diagonal: 0 or more. */
    static Ridge amount(double share) {
        return new Amount(share);
    }

    /**
     * By formula from the scatter itself.
     *
     * @param independentUnits how many independent observations the scatter rests on (showings rather than records where records of
     *     one showing are alike); at least 1
     */
    static Ridge analytic(long independentUnits) {
        return new Analytic(independentUnits);
    }

    /** A given share of the mean diagonal. */
    record Amount(double share) implements Ridge {
        /** Checks the share. */
        public Amount {
            if (!(share >= 0) || Double.isInfinite(share)) {
                throw new IllegalArgumentException("a ridge is 0 or more, and finite: " + share);
            }
        }
    }

    /** Oracle-approximating shrinkage. */
    record Analytic(long independentUnits) implements Ridge {
        /** Checks the number of units. */
        public Analytic {
            if (independentUnits < 1) {
                throw new IllegalArgumentException("at least one independent unit is needed: " + independentUnits);
            }
        }
    }
}
