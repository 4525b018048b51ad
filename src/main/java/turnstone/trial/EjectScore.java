package turnstone.trial;

import java.io.Serializable;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.TreeSet;
import java.util.stream.Collectors;
import turnstone.plant.Duty;

/**
 * Puts one record into a bin of {@link ScoreBins} from the scores that a model gives it.
 *
 * <p>What a duty ejects: its targets where the product is ejected, the other materials of its infeed where the product is passed. The
 * magnitude is 2·(largest score among those − largest among the others), either way round, scores being the linear ones of which the largest
 * is the nearest material. Allocation-free and without state, so one object serves all threads.
 */
public final class EjectScore implements Serializable {
    private static final long serialVersionUID = 1L;

    private final boolean[] ejects;

    private EjectScore(boolean[] ejects) {
        this.ejects = ejects;
    }

    /** For a duty and the materials of a model, in the model's order. */
    public static EjectScore of(Duty duty, List<String> materials) {
        return of(ejected(duty, materials), materials)
                .orElseThrow(() -> new IllegalArgumentException(
                        "duty " + duty.name() + " ejects every material of the model, or no material of it"));
    }

    /** For the names of the materials that are ejected; empty where they are all of the model's, or none, so that no score tells them apart. */
    public static Optional<EjectScore> of(Set<String> ejected, List<String> materials) {
        boolean[] ejects = new boolean[materials.size()];
        int count = 0;
        for (int k = 0; k < ejects.length; k++) {
            ejects[k] = ejected.contains(materials.get(k));
            count += ejects[k] ? 1 : 0;
        }
        return count == 0 || count == ejects.length ? Optional.empty() : Optional.of(new EjectScore(ejects));
    }

    /** Those of these materials that a duty ejects. */
    public static Set<String> ejected(Duty duty, List<String> materials) {
        return materials.stream()
                .filter(material -> Sendings.ejects(duty, material))
                .collect(Collectors.toCollection(TreeSet::new));
    }

    /**
     * The bin of a record.
     *
     * @param decided index of the nearest material
     * @param scores one for each material, the largest the nearest
     */
    public int bin(int decided, double[] scores) {
        double ejected = Double.NEGATIVE_INFINITY;
        double kept = Double.NEGATIVE_INFINITY;
        for (int k = 0; k < ejects.length; k++) {
            if (ejects[k]) {
                ejected = Math.max(ejected, scores[k]);
            } else {
                kept = Math.max(kept, scores[k]);
            }
        }
        return ejects[decided] ? ScoreBins.ejected(2 * (ejected - kept)) : ScoreBins.kept(2 * (kept - ejected));
    }
}
