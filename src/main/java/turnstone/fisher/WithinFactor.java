package turnstone.fisher;

import java.util.ArrayList;
import java.util.List;
import turnstone.fault.Fault;

/**
 * The ridged within scatter of one fit, equilibrated by powers of two and factored, with everything that is checked on the way.
 *
 * <p>S = W + ridge·tr(W)/p·I in pretreated units; scaled to E·S·E, E a diagonal of powers of two that brings the diagonal between 1 and 4. A
 * pivot of the scaled matrix at or below p·2^-94 is singular: an exactly collinear channel leaves about 2^-106 there, of either sign.
 */
final class WithinFactor {
    /** Per channel, the share of a pivot that rounding in double-double may leave of an exact zero, with eight bits to spare. */
    static final double SINGULAR_PIVOT = 0x1p-94;

    private final double ridge;
    private final double[] equilibration;
    private final Whitening whitening;
    private final double reciprocalCondition;
    private final List<String> remarks;

    private WithinFactor(
            double ridge,
            double[] equilibration,
            Whitening whitening,
            double reciprocalCondition,
            List<String> remarks) {
        this.ridge = ridge;
        this.equilibration = equilibration;
        this.whitening = whitening;
        this.reciprocalCondition = reciprocalCondition;
        this.remarks = remarks;
    }

    static WithinFactor of(FitRequest request, Scatter scatter) {
        ExtendedMatrix within = scatter.within();
        int p = within.columns;
        if (scatter.degreesOfFreedom() < 1) {
            throw Fault.input("no record more than there are materials: nothing is known of the scatter within them")
                    .found(scatter.head().parts().total().records() + " records of "
                            + request.materials().size() + " materials")
                    .remedy("give more records per material");
        }
        DoubleDouble trace = DoubleDouble.ZERO;
        for (int i = 0; i < p; i++) {
            trace = trace.plus(within.at(i, i));
        }
        if (trace.high() == 0) {
            throw Fault.input("no channel varies within any material").remedy("give records that differ");
        }
        double ridge = Shrinkage.amount(request.ridge(), within, trace);
        Singularity singularity = new Singularity(request, scatter);
        if (ridge == 0) {
            singularity.refuseConstantChannels();
        }
        ExtendedMatrix scaled = within.copy();
        DoubleDouble added = trace.times(ridge).over(DoubleDouble.of(p));
        for (int i = 0; i < p; i++) {
            scaled.set(i, i, scaled.at(i, i).plus(added));
        }
        double[] equilibration = equilibrate(scaled);
        Factor factor = Factor.of(scaled, p * SINGULAR_PIVOT);
        if (!factor.setAside().isEmpty()) {
            throw singularity.fault(factor, equilibration, ridge);
        }
        SpectralEstimate estimate = new SpectralEstimate(factor);
        List<String> remarks = new ArrayList<>();
        if (ridge == 0) {
            new RoundingNoise(request, scatter).check(estimate, equilibration).ifPresent(remarks::add);
        }
        return new WithinFactor(
                ridge, equilibration, new Whitening(factor), estimate.reciprocalCondition(), List.copyOf(remarks));
    }

    /** Scales a symmetric matrix in place to a diagonal between 1 and 4; returns the powers of two. */
    static double[] equilibrate(ExtendedMatrix symmetric) {
        int p = symmetric.columns;
        double[] powers = new double[p];
        for (int i = 0; i < p; i++) {
            double diagonal = symmetric.high[i][i];
            powers[i] = diagonal > 0 ? Math.scalb(1.0, -Math.floorDiv(Math.getExponent(diagonal), 2)) : 1;
        }
        scale(symmetric, powers);
        return powers;
    }

    static void scale(ExtendedMatrix symmetric, double[] powers) {
        int p = symmetric.columns;
        for (int i = 0; i < p; i++) {
            double own = powers[i];
            for (int j = 0; j < p; j++) {
                double factor = own * powers[j];
                symmetric.high[i][j] *= factor;
                symmetric.low[i][j] *= factor;
            }
        }
    }

    /** Rows in pretreated units to rows in units where S is the identity. */
    ExtendedMatrix whiten(ExtendedMatrix rows) {
        ExtendedMatrix result = rows.copy();
        equilibrateRows(result);
        whitening.whiten(result);
        return result;
    }

    /** Directions where S is the identity to axes in pretreated units, with axis·S·axisᵀ = 1. */
    ExtendedMatrix unwhiten(ExtendedMatrix rows) {
        ExtendedMatrix result = rows.copy();
        whitening.unwhiten(result);
        equilibrateRows(result);
        return result;
    }

    private void equilibrateRows(ExtendedMatrix rows) {
        for (int k = 0; k < rows.rows; k++) {
            for (int j = 0; j < rows.columns; j++) {
                rows.high[k][j] *= equilibration[j];
                rows.low[k][j] *= equilibration[j];
            }
        }
    }

    double ridge() {
        return ridge;
    }

    double reciprocalCondition() {
        return reciprocalCondition;
    }

    List<String> remarks() {
        return remarks;
    }
}
