package turnstone.plant;

import java.util.Arrays;
import java.util.List;
import java.util.Map;

/**
 * How a candidate is made from the ledger.
 *
 * @param window_days days of the ledger that go in, the newest first
 * @param balance what weights the between and within scatter
 * @param ridge the amount added to the within scatter
 * @param rank axes kept; 0 keeps all
 * @param decisionPrior what the decision rule assumes
 * @param unfamiliarShare the share of good records that may be flagged unfamiliar, 0 to 1
 */
public record RefitRecipe(
        int window_days, Balance balance, Ridge ridge, int rank, Prior decisionPrior, double unfamiliarShare) {
    /** The weight of each member of a kind. */
    public enum Weighting {
        /** By number of records. */
        AS_COUNTED,
        /** All alike. */
        EQUAL;

        static Weighting of(String word) {
            return Words.constant(Weighting.class, word);
        }
    }

    /**
     * Scatter weights.
     *
     * @param instruments between the instruments
     * @param materials between the materials
     */
    public record Balance(Weighting instruments, Weighting materials) {}

    /** The ridge, a share of the mean diagonal of the within scatter in pretreated units. */
    public sealed interface Ridge {
        /**
         * One amount, or a ladder of them.
         *
         * @param rungs at least one, none below 0, ascending
         */
        record Ladder(List<Double> rungs) implements Ridge {
            /** Keeps a copy. */
            public Ladder {
                rungs = List.copyOf(rungs);
            }
        }

        /** By analytic shrinkage, counting showings. */
        record Analytic() implements Ridge {}
    }

    /** What the decision rule assumes about how common each material is. */
    public sealed interface Prior {
        /** All materials alike. */
        record Equal() implements Prior {}

        /** By the records that were fitted. */
        record AsCounted() implements Prior {}

        /**
         * As listed.
         *
         * @param shares by material, every one of the plant's, above 0, together 1
         */
        record Listed(Map<String, Double> shares) implements Prior {
            /** Keeps a copy. */
            public Listed {
                shares = Map.copyOf(shares);
            }

            /** The shares in the order of these materials. */
            public double[] inOrder(List<String> materials) {
                double[] inOrder = new double[materials.size()];
                Arrays.setAll(inOrder, k -> shares.get(materials.get(k)));
                return inOrder;
            }
        }
    }
}
