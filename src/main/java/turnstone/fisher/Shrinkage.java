package turnstone.fisher;

import turnstone.fault.Fault;

/** The ridge as a number. */
final class Shrinkage {
    private Shrinkage() {}

    /**
     * The share asked for, or the analytic one of a p × p scatter.
     *
     * <p>ρ = min(1, ((1 − 2/p)·tr(S²) + tr²(S)) / ((n + 1 − 2/p)·(tr(S²) − tr²(S)/p))), n independent units; free of the scale of S. The ridge
     * is ρ/(1 − ρ). Source: Chen, Wiesel, Eldar and Hero 2010, equation 23. Sums of squares in doubles, in index order: the result is a choice,
     * not an estimate that needs more digits.
     *
     * @throws Fault of kind input where ρ is 1: no finite ridge
     */
    static double amount(Ridge ridge, ExtendedMatrix within, DoubleDouble trace) {
        if (ridge instanceof Ridge.Amount given) {
            return given.share();
        }
        long units = ((Ridge.Analytic) ridge).independentUnits();
        double rho = rho(within, trace.high(), units);
        if (rho >= 1) {
            throw Fault.input("the analytic ridge shrinks the within scatter away")
                    .found(units + " independent units for " + within.columns + " channels")
                    .remedy("give the ridge as a number, such as 0.001, or show more");
        }
        return rho / (1 - rho);
    }

    static double rho(ExtendedMatrix within, double trace, long units) {
        int p = within.columns;
        double squares = 0;
        for (double[] row : within.high) {
            for (double element : row) {
                squares += element * element;
            }
        }
        double above = (1 - 2.0 / p) * squares + trace * trace;
        double below = (units + 1 - 2.0 / p) * (squares - trace * trace / p);
        return below > above ? above / below : 1;
    }
}
