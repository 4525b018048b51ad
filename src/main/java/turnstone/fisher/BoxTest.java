package turnstone.fisher;

import turnstone.fault.Fault;

/**
 * Box's M: whether the materials scatter alike within themselves, which the shared within scatter takes for granted.
 *
 * <p>M = (n − g)·ln|Sw| − Σ (n_k − 1)·ln|S_k| in pretreated units, without ridge; S_k over n_k − 1. With its χ² and F approximations. Source: G. E. P.
 * Box, Biometrika 36 (1949), 317–346. A diagnostic: on many records it rejects differences that do no harm.
 *
 * @param m the statistic, 0 where all scatters are equal
 * @param chiSquare M·(1 − c₁)
 * @param f the F approximation
 * @param degreesOfFreedom of χ², and the first of F: p(p + 1)(g − 1)/2
 * @param secondDegreesOfFreedom the second of F
 */
public record BoxTest(double m, double chiSquare, double f, double degreesOfFreedom, double secondDegreesOfFreedom) {
    /**
     * Computes the statistic of a request's cells.
     *
     * @throws Fault of kind input where the scatter of a material, or of all, is singular: every material needs more records than channels
     * @throws IllegalArgumentException where the cells do not all have one weight
     */
    public static BoxTest of(FitRequest request) {
        Scatter scatter = Scatter.of(request);
        Parts parts = scatter.head().parts();
        double pooledFreedom = scatter.degreesOfFreedom();
        double m = pooledFreedom * logDeterminant(scatter.within().copy(), pooledFreedom, "all materials together");
        double inverses = 0;
        double inverseSquares = 0;
        for (int k = 0; k < parts.materials(); k++) {
            if (parts.of(k).size() > 1 || parts.of(k).get(0).weight() != 1) {
                throw new IllegalArgumentException("Box's M is defined for records as counted");
            }
            double freedom = parts.records(k) - 1.0;
            ExtendedMatrix own = scatter.tail().sandwich(scatter.head().ofMaterial(k));
            m -= freedom
                    * logDeterminant(
                            own, freedom, "material " + request.materials().get(k));
            inverses += 1 / freedom;
            inverseSquares += 1 / (freedom * freedom);
        }
        return approximations(
                m,
                scatter.within().columns,
                parts.materials(),
                inverses - 1 / pooledFreedom,
                inverseSquares - 1 / (pooledFreedom * pooledFreedom));
    }

    private static BoxTest approximations(double m, double p, double g, double inverses, double inverseSquares) {
        double first = inverses * (2 * p * p + 3 * p - 1) / (6 * (p + 1) * (g - 1));
        double second = inverseSquares * (p - 1) * (p + 2) / (6 * (g - 1));
        double freedom = p * (p + 1) * (g - 1) / 2;
        double excess = second - first * first;
        double other = (freedom + 2) / Math.abs(excess);
        double f;
        if (excess > 0) {
            f = m * (1 - first - freedom / other) / freedom;
        } else {
            double scale = other / (1 - first + 2 / other);
            f = other * m / (freedom * (scale - m));
        }
        return new BoxTest(m, m * (1 - first), f, freedom, other);
    }

    private static double logDeterminant(ExtendedMatrix scatter, double freedom, String whose) {
        int p = scatter.columns;
        if (freedom < p) {
            throw singular(whose).found((long) freedom + " degrees of freedom").expected("at least " + p);
        }
        double[] powers = WithinFactor.equilibrate(scatter);
        Factor factor = Factor.of(scatter, p * WithinFactor.SINGULAR_PIVOT);
        if (!factor.setAside().isEmpty()) {
            throw singular(whose);
        }
        double sum = 0;
        for (int i = 0; i < p; i++) {
            sum += StrictMath.log(factor.pivot(i).high() / freedom) - 2 * StrictMath.log(powers[i]);
        }
        return sum;
    }

    private static Fault singular(String whose) {
        return Fault.input("Box's M needs a scatter that is not singular")
                .at(whose)
                .remedy("give more records of it, or leave out constant and dependent channels");
    }
}
