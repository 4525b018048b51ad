package turnstone.trial;

import java.io.Serializable;
import java.util.List;
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
        boolean[] ejects = new boolean[materials.size()];
        boolean some = false;
        boolean all = true;
        for (int k = 0; k < ejects.length; k++) {
            ejects[k] = Sendings.ejects(duty, materials.get(k));
            some |= ejects[k];
            all &= ejects[k];
        }
        if (!some || all) {
            throw new IllegalArgumentException(
                    "duty " + duty.name() + " ejects " + (some ? "every" : "no") + " material of the model");
        }
        return new EjectScore(ejects);
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
