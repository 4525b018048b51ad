package turnstone.trial;

import java.util.Locale;

/** The long form of the proof: {@code scripts/soak trial}. */
final class TrialSoak {
    private TrialSoak() {}

    public static void main(String[] arguments) {
        int plants = Integer.parseInt(arguments[0]);
        int trials = Integer.parseInt(arguments[1]);
        long seed = Long.parseLong(arguments[2]);
        TrialProof.coverage(seed, plants)
                .forEach((reach, c) -> System.out.printf(
                        Locale.ROOT,
                        "%s: %d plants, purity %.1f %%, recovery %.1f %%, widths %.2f %.2f%n",
                        reach.label(),
                        c.plants(),
                        100.0 * c.purityHeld() / c.plants(),
                        100.0 * c.recoveryHeld() / c.plants(),
                        c.purityWidth() / c.plants(),
                        c.recoveryWidth() / c.plants()));
        System.out.println(TrialProof.ladders(seed, plants));
        for (double gain : new double[] {-0.01, 0, 0.01}) {
            TrialProof.Releases r = TrialProof.releases(seed, trials, gain);
            System.out.printf(Locale.ROOT, "gain %+.2f: %s%n", 100 * gain, r);
        }
    }
}
