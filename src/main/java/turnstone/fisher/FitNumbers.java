package turnstone.fisher;

import java.util.List;

/** The results of a fit as plain fields, shared by nobody outside the package and not changed once the fit is made. */
final class FitNumbers {
    long[] records;
    long degreesOfFreedom;
    double ridge;
    double reciprocalCondition;
    /** All λ, kept or not. */
    double[] ratios;

    double[] shares;
    double wilks;
    double[][] axes;
    double axisStorageCost;
    double[] centre;
    double[][] means;
    /** Positions of the means on all axes with λ above zero; those kept come first. */
    double[][] allPositions;

    ResidualNorm residual;
    List<String> remarks;
    /** W in head-output units, without ridge. */
    ExtendedMatrix headWithin;

    /** Copies with the kept axes and positions multiplied by a rotation [r][r]. */
    FitNumbers turned(double[][] rotation) {
        FitNumbers result = new FitNumbers();
        result.records = records;
        result.degreesOfFreedom = degreesOfFreedom;
        result.ridge = ridge;
        result.reciprocalCondition = reciprocalCondition;
        result.ratios = ratios;
        result.shares = shares;
        result.wilks = wilks;
        result.axisStorageCost = axisStorageCost;
        result.centre = centre;
        result.means = means;
        result.residual = residual;
        result.remarks = remarks;
        result.headWithin = headWithin;
        result.axes = new double[axes.length][];
        for (int i = 0; i < axes.length; i++) {
            result.axes[i] = new double[axes[0].length];
            for (int c = 0; c < axes[0].length; c++) {
                double sum = 0;
                for (int k = 0; k < axes.length; k++) {
                    sum += rotation[i][k] * axes[k][c];
                }
                result.axes[i][c] = sum;
            }
        }
        result.allPositions = new double[allPositions.length][];
        for (int m = 0; m < allPositions.length; m++) {
            result.allPositions[m] = allPositions[m].clone();
            for (int i = 0; i < axes.length; i++) {
                double sum = 0;
                for (int k = 0; k < axes.length; k++) {
                    sum += rotation[i][k] * allPositions[m][k];
                }
                result.allPositions[m][i] = sum;
            }
        }
        return result;
    }
}
