package turnstone.trial;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Random;
import java.util.SplittableRandom;
import turnstone.plant.Duty;

/** An invented ladder at tally level whose truth is known: recovery of one material on every rung, and what a choice among them is worth. */
final class DrawnLadder {
    private static final int RUNGS = 8;
    private static final double RUNG_SPREAD = 0.04;
    private static final double CORRELATION = 0.97;
    private static final int SHOWINGS = 4;
    private static final int RECORDS = 100;

    final RungChoice choice;
    /** True recovery of the chosen rung over all machines like these. */
    final double truth;
    /** True recovery of the best rung. */
    final double best;

    DrawnLadder(long seed, int sorterCount) {
        Random random = new Random(new SplittableRandom(seed).nextLong());
        double middle = 1.4 + 0.4 * random.nextDouble();
        double sorterSpread = 0.15 + 0.25 * random.nextDouble();
        double showingSpread = 0.2 + 0.2 * random.nextDouble();
        double ownSorter = 0.05 + 0.10 * random.nextDouble();
        double ownShowing = 0.03 + 0.07 * random.nextDouble();
        double[] shift = new double[RUNGS];
        Map<RungChoice.Rung, TrialTally> ladder = new LinkedHashMap<>();
        List<RungChoice.Rung> rungs = new ArrayList<>();
        for (int r = 0; r < RUNGS; r++) {
            shift[r] = RUNG_SPREAD * random.nextGaussian();
            rungs.add(new RungChoice.Rung("rung " + r, 1e-8 * Math.pow(10, r), 10));
            ladder.put(rungs.get(r), TrialTally.empty());
        }
        List<TrialShowing> showings = new ArrayList<>();
        List<String> sorters = new ArrayList<>();
        for (int s = 0; s < sorterCount; s++) {
            String sorter = "sorter " + (10 + s);
            sorters.add(sorter);
            double here = middle + sorterSpread * random.nextGaussian();
            double[] own = new double[RUNGS];
            for (int r = 0; r < RUNGS; r++) {
                own[r] = shift[r] + ownSorter * random.nextGaussian();
            }
            for (int k = 0; k < SHOWINGS; k++) {
                String id = "s" + (1000 + showings.size());
                showings.add(new TrialShowing(id, LocalDate.of(2026, 3, 1), sorter, sorter, "PET-1", 1, "PET"));
                show(random, here + showingSpread * random.nextGaussian(), own, ownShowing, id, ladder, rungs);
            }
        }
        Duty duty = new Duty("PET out", List.of("PET"), Duty.Stream.EJECTED, sorters, Map.of("PET", 1.0), List.of());
        choice = RungChoice.ofTallies(duty, ladder, showings);
        double spread = Math.sqrt(1
                + sorterSpread * sorterSpread
                + showingSpread * showingSpread
                + ownSorter * ownSorter
                + ownShowing * ownShowing);
        truth = Normal.below((middle + shift[rungs.indexOf(choice.chosen())]) / spread);
        double most = 0;
        for (double one : shift) {
            most = Math.max(most, Normal.below((middle + one) / spread));
        }
        best = most;
    }

    private static void show(
            Random random,
            double middle,
            double[] own,
            double ownShowing,
            String id,
            Map<RungChoice.Rung, TrialTally> ladder,
            List<RungChoice.Rung> rungs) {
        double[] at = new double[RUNGS];
        for (int r = 0; r < RUNGS; r++) {
            at[r] = middle + own[r] + ownShowing * random.nextGaussian();
        }
        for (int i = 0; i < RECORDS; i++) {
            double common = Math.sqrt(CORRELATION) * random.nextGaussian();
            for (int r = 0; r < RUNGS; r++) {
                double score = at[r] + common + Math.sqrt(1 - CORRELATION) * random.nextGaussian();
                String decided = score > 0 ? "PET" : "PP";
                ladder.get(rungs.get(r)).add(new TallyCell(id, "PET", decided, Recognition.FAMILIAR));
            }
        }
    }
}
