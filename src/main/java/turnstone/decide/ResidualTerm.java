package turnstone.decide;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import turnstone.json.Json;

/**
 * Judges what lies outside the axes: with Q the rows of the basis, |y|² − |Q·y|² for y the record less the mean of its material.
 *
 * <p>Within the materials that energy has a known mean and, as a multiple of chi-square, degrees of freedom (Satterthwaite 1946); the limit is
 * its upper quantile at the stated share.
 */
public final class ResidualTerm {
    private final double[][] basis;
    private final double expectedEnergy;
    private final double degreesOfFreedom;
    private final double beyond;

    private ResidualTerm(double[][] basis, double expectedEnergy, double degreesOfFreedom, double beyond) {
        this.basis = ModelNumbers.copy(basis);
        this.expectedEnergy = expectedEnergy;
        this.degreesOfFreedom = degreesOfFreedom;
        this.beyond = beyond;
    }

    static ResidualTerm of(double[][] basis, double expectedEnergy, double degreesOfFreedom, double share) {
        double beyond = expectedEnergy / degreesOfFreedom * Quantiles.chiSquare(1 - share, degreesOfFreedom);
        return new ResidualTerm(basis, expectedEnergy, degreesOfFreedom, beyond);
    }

    /** Orthonormal rows of d numbers that span the axes. */
    public double[][] basis() {
        return ModelNumbers.copy(basis);
    }

    /** The energy beyond which a record is unfamiliar, in squared pretreated units. */
    public double beyond() {
        return beyond;
    }

    ObjectNode json() {
        ObjectNode node = Json.object();
        node.set("basis", ModelNumbers.json(basis));
        return node.put("expectedEnergy", expectedEnergy)
                .put("degreesOfFreedom", degreesOfFreedom)
                .put("beyond", beyond);
    }

    static ResidualTerm fromJson(JsonNode node, int channels) {
        JsonNode rows = node.required("basis");
        return new ResidualTerm(
                ModelNumbers.matrix(rows, rows.size(), channels, "residual.basis"),
                ModelNumbers.number(node.required("expectedEnergy"), "residual.expectedEnergy"),
                ModelNumbers.number(node.required("degreesOfFreedom"), "residual.degreesOfFreedom"),
                ModelNumbers.number(node.required("beyond"), "residual.beyond"));
    }
}
