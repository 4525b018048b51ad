package turnstone.decide;

/**
 * Nearest material in within-variance units with −2·ln of the decision prior, in its linear form.
 *
 * <p>The squared distance with prior of a position p to material k is |p − m_k|² − 2 ln π_k = |p|² − 2 s_k, with the score s_k = m_k·p + c_k and
 * c_k = ln π_k − |m_k|²/2. The largest score wins; ties go to the first material in the model's order. Every sum runs over axes in order from
 * the first, each product rounded before it is added, the constant last.
 */
final class DecisionRule {
    private DecisionRule() {}

    static double[][] weights(double[][] positions) {
        return ModelNumbers.copy(positions);
    }

    static double[] constants(double[][] positions, double[] priors) {
        double[] constants = new double[priors.length];
        for (int k = 0; k < priors.length; k++) {
            double square = 0;
            for (double coordinate : positions[k]) {
                square += coordinate * coordinate;
            }
            constants[k] = StrictMath.log(priors[k]) - square / 2;
        }
        return constants;
    }

    static double score(double[] weights, double constant, double[] position) {
        double sum = 0;
        for (int a = 0; a < weights.length; a++) {
            sum += weights[a] * position[a];
        }
        return sum + constant;
    }

    static double squaredDistance(double[] from, double[] to) {
        double sum = 0;
        for (int a = 0; a < from.length; a++) {
            double difference = from[a] - to[a];
            sum += difference * difference;
        }
        return sum;
    }
}
