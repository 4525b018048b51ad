package turnstone.decide;

import java.io.Serializable;
import java.util.List;
import java.util.Optional;
import turnstone.measure.CountScale;
import turnstone.measure.LaneMath;

/**
 * A model compiled for counts: position, decision, margin, distance and the unfamiliar flag of a record, without allocation.
 *
 * <p>The order of operations, canonical: weight[a][c] = axes[a][c]·step[c], one product; constant[a] = 0 − laneDot(axes[a], centre − offset),
 * the differences rounded first; position[a] = laneDot(weight[a], counts) + constant[a]. Scores and distances run over axes from the first, see
 * {@link DecisionRule}. The residual takes deviation[c] = step[c]·count[c] + (offset[c] − mean[c]) from the decided material's mean, and is
 * laneDot(deviation, deviation) less laneDot(basis[b], deviation)² for each b in order.
 *
 * <p>Not thread-safe: it has scratch of its own. {@link #copy} is for another thread and shares what is not written to.
 */
public final class Projector implements Serializable {
    private static final long serialVersionUID = 1L;

    private final int channels;
    private final String[] materials;
    private final double[][] weights;
    private final double[] constants;
    private final double[][] positions;
    private final double[][] scoreWeights;
    private final double[] scoreConstants;
    private final double beyondDistance;
    private final double beyondEnergy;
    private final double[][] basis;
    private final double[] steps;
    private final double[][] shifts;
    private final double[] deviation;

    private Projector(Model model) {
        CountScale scale = model.countScale();
        int r = model.rank();
        channels = scale.channels();
        materials = model.materials().stream().map(ModelMaterial::name).toArray(String[]::new);
        double[][] axes = model.axes();
        double[] centre = model.centre();
        double[] fromOffset = new double[channels];
        steps = new double[channels];
        for (int c = 0; c < channels; c++) {
            fromOffset[c] = centre[c] - scale.offset(c);
            steps[c] = scale.step(c);
        }
        weights = new double[r][channels];
        constants = new double[r];
        for (int a = 0; a < r; a++) {
            for (int c = 0; c < channels; c++) {
                weights[a][c] = axes[a][c] * steps[c];
            }
            constants[a] = 0 - LaneMath.laneDot(axes[a], 0, fromOffset, 0, channels);
        }
        positions = model.materials().stream().map(ModelMaterial::position).toArray(double[][]::new);
        scoreWeights = model.decisionWeights();
        scoreConstants = model.decisionConstants();
        beyondDistance = model.unfamiliarBeyond().orElse(Double.POSITIVE_INFINITY);
        Optional<ResidualTerm> term = model.residual();
        basis = term.map(ResidualTerm::basis).orElse(new double[0][]);
        beyondEnergy = term.map(ResidualTerm::beyond).orElse(Double.POSITIVE_INFINITY);
        shifts = term.isPresent() ? shifts(model, scale) : new double[0][];
        deviation = new double[channels];
    }

    private Projector(Projector other) {
        channels = other.channels;
        materials = other.materials;
        weights = other.weights;
        constants = other.constants;
        positions = other.positions;
        scoreWeights = other.scoreWeights;
        scoreConstants = other.scoreConstants;
        beyondDistance = other.beyondDistance;
        beyondEnergy = other.beyondEnergy;
        basis = other.basis;
        steps = other.steps;
        shifts = other.shifts;
        deviation = new double[channels];
    }

    /** Compiles a model. */
    public static Projector of(Model model) {
        return new Projector(model);
    }

    /** The same for another thread. */
    public Projector copy() {
        return new Projector(this);
    }

    /** Counts that a record has. */
    public int channels() {
        return channels;
    }

    /** Coordinates that a position has. */
    public int rank() {
        return weights.length;
    }

    /** Names of the materials, in the model's order. */
    public List<String> materials() {
        return List.of(materials);
    }

    /** Name of a material, by the index that {@link Judgement#material} gives. */
    public String material(int index) {
        return materials[index];
    }

    /** The position of the record whose counts begin at {@code counts[from]}: r numbers, written to {@code position}. */
    public void position(double[] counts, int from, double[] position) {
        for (int a = 0; a < weights.length; a++) {
            position[a] = LaneMath.laneDot(weights[a], 0, counts, from, channels) + constants[a];
        }
    }

    /**
     * Decides by position alone: nearest material, margin, distance, and unfamiliar by distance.
     *
     * @return index of the nearest material
     */
    public int decide(double[] position, Judgement out) {
        int best = 0;
        double first = DecisionRule.score(scoreWeights[0], scoreConstants[0], position);
        double second = Double.NEGATIVE_INFINITY;
        for (int k = 1; k < scoreConstants.length; k++) {
            double score = DecisionRule.score(scoreWeights[k], scoreConstants[k], position);
            if (score > first) {
                second = first;
                first = score;
                best = k;
            } else if (score > second) {
                second = score;
            }
        }
        double square = DecisionRule.squaredDistance(position, positions[best]);
        out.set(best, 2 * (first - second), Math.sqrt(square));
        if (square > beyondDistance) {
            out.markUnfamiliar();
        }
        return best;
    }

    /** The score of every material at a position, in the model's order, written to {@code scores}; the largest is the nearest material. */
    public void scores(double[] position, double[] scores) {
        for (int k = 0; k < scoreConstants.length; k++) {
            scores[k] = DecisionRule.score(scoreWeights[k], scoreConstants[k], position);
        }
    }

    /** Position, decision and residual of one record: everything that the model says of it. */
    public void judge(double[] counts, int from, double[] position, Judgement out) {
        position(counts, from, position);
        int decided = decide(position, out);
        if (shifts.length == 0) {
            return;
        }
        double energy = residual(counts, from, shifts[decided]);
        out.residual(energy);
        if (energy > beyondEnergy) {
            out.markUnfamiliar();
        }
    }

    private double residual(double[] counts, int from, double[] shift) {
        for (int c = 0; c < channels; c++) {
            deviation[c] = steps[c] * counts[from + c] + shift[c];
        }
        double energy = LaneMath.laneDot(deviation, 0, deviation, 0, channels);
        for (double[] row : basis) {
            double along = LaneMath.laneDot(row, 0, deviation, 0, channels);
            energy -= along * along;
        }
        return energy;
    }

    private static double[][] shifts(Model model, CountScale scale) {
        double[][] shifts = new double[model.materials().size()][scale.channels()];
        for (int k = 0; k < shifts.length; k++) {
            double[] mean = model.materials().get(k).mean();
            for (int c = 0; c < mean.length; c++) {
                shifts[k][c] = scale.offset(c) - mean[c];
            }
        }
        return shifts;
    }
}
