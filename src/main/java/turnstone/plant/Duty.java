package turnstone.plant;

import java.util.List;
import java.util.Map;

/**
 * A named task of the plant.
 *
 * @param name unique in the plant
 * @param targets materials wanted in the product, in plant order, groups written out
 * @param productStream where the product goes
 * @param sorters the machines that do it, in plant order
 * @param infeedMix share by mass of each material in the infeed, together 1; a material that is not listed has none
 * @param requirements what must hold for a release, whatever is in service
 * @param terms the figure that is fixed, the gain over what is in service, guards, limits and costs
 */
public record Duty(
        String name,
        List<String> targets,
        Stream productStream,
        List<String> sorters,
        Map<String, Double> infeedMix,
        List<Requirement> requirements,
        DutyTerms terms) {
    /** The two ways off the belt. */
    public enum Stream {
        /** The air valves send the product off. */
        EJECTED,
        /** The product is what is left. */
        PASSED;

        static Stream of(String word) {
            return Words.constant(Stream.class, word);
        }
    }

    /** A duty with {@linkplain DutyTerms#standard standard terms}. */
    public Duty(
            String name,
            List<String> targets,
            Stream productStream,
            List<String> sorters,
            Map<String, Double> infeedMix,
            List<Requirement> requirements) {
        this(name, targets, productStream, sorters, infeedMix, requirements, DutyTerms.standard());
    }

    /** Keeps copies. */
    public Duty {
        targets = List.copyOf(targets);
        sorters = List.copyOf(sorters);
        infeedMix = Map.copyOf(infeedMix);
        requirements = List.copyOf(requirements);
    }

    /** The shares by mass in the order of these materials, 0 where none is listed. */
    public double[] mixInOrder(List<String> materials) {
        double[] shares = new double[materials.size()];
        for (int k = 0; k < shares.length; k++) {
            shares[k] = infeedMix.getOrDefault(materials.get(k), 0.0);
        }
        return shares;
    }

    /** The same duty with other terms. */
    public Duty with(DutyTerms other) {
        return new Duty(name, targets, productStream, sorters, infeedMix, requirements, other);
    }
}
