package turnstone.trial;

import java.time.LocalDate;
import java.util.EnumMap;
import java.util.Map;
import turnstone.plant.DutyTerms;
import turnstone.plant.Requirement;

/** Counts, over independently drawn plants, how often intervals hold the truth and how often candidates are released. */
final class TrialProof {
    static final double CONFIDENCE = 0.90;
    static final int NIGHTS = 5;
    static final int SORTERS = 6;
    static final int SHOWINGS = 4;
    static final int RECORDS = 100;
    private static final int[] FLEETS = {6, 8, 10, 12};

    /** How often an interval held the truth of purity and of recovery, and how wide it was on average, in points. */
    record Coverage(int plants, int purityHeld, int recoveryHeld, double purityWidth, double recoveryWidth) {
        Coverage plus(Estimate purity, double truePurity, Estimate recovery, double trueRecovery) {
            return new Coverage(
                    plants + 1,
                    purityHeld + holds(purity, truePurity),
                    recoveryHeld + holds(recovery, trueRecovery),
                    purityWidth + width(purity),
                    recoveryWidth + width(recovery));
        }

        private static int holds(Estimate estimate, double truth) {
            return estimate.lower().orElseThrow() <= truth
                            && truth <= estimate.upper().orElseThrow()
                    ? 1
                    : 0;
        }

        private static double width(Estimate estimate) {
            return 100 * (estimate.upper().orElseThrow() - estimate.lower().orElseThrow());
        }
    }

    /** How often a candidate of a true gain was released, with the mean of what was found and of its error, in points. */
    record Releases(int trials, int released, double found, double error, double deviation) {}

    private TrialProof() {}

    static Map<Requirement.Reach, Coverage> coverage(long seed, int plants) {
        Map<Requirement.Reach, Coverage> counted = new EnumMap<>(Requirement.Reach.class);
        for (int p = 0; p < plants; p++) {
            DrawnPlant plant = new DrawnPlant(seed + p, FLEETS[p % FLEETS.length]);
            DrawnPlant.Nights night = plant.show(1, SHOWINGS, RECORDS);
            for (Requirement.Reach reach : Requirement.Reach.values()) {
                double[] truth = switch (reach) {
                    case THIS_FLEET_TONIGHT -> plant.fleetTonight();
                    case MACHINES_LIKE_THESE -> plant.machinesTonight();
                    case ONE_NEW_MACHINE -> plant.newMachineTonight();
                };
                Estimate purity = estimate(Requirement.Figure.DECISION_PURITY, reach, plant, night);
                Estimate recovery = estimate(Requirement.Figure.DECISION_RECOVERY, reach, plant, night);
                counted.merge(
                        reach,
                        new Coverage(0, 0, 0, 0, 0).plus(purity, truth[0], recovery, truth[1]),
                        (all, one) -> all.plus(purity, truth[0], recovery, truth[1]));
            }
        }
        return counted;
    }

    private static Estimate estimate(
            Requirement.Figure figure, Requirement.Reach reach, DrawnPlant plant, DrawnPlant.Nights night) {
        return new Estimator(night.showings)
                .estimate(figure, reach, plant.duty, night.inService, ScoreBins.NEAREST, CONFIDENCE);
    }

    static Releases releases(long seed, int trials, double trueGain) {
        int released = 0;
        double found = 0;
        double squares = 0;
        double error = 0;
        for (int t = 0; t < trials; t++) {
            DrawnPlant plant = new DrawnPlant(seed + t, SORTERS);
            plant.gain(trueGain);
            DrawnPlant.Nights nights = plant.show(NIGHTS, SHOWINGS, RECORDS);
            Gain gain = GainEstimator.ofScores(plant.duty, nights.candidate, nights.inService, nights.byId());
            released += gain.lower().orElse(0) > 0 ? 1 : 0;
            double miss = 100 * (gain.point().orElseThrow() - trueGain);
            found += 100 * gain.point().orElseThrow() / trials;
            squares += miss * miss / trials;
            error += 100 * gain.standardError().orElseThrow() / trials;
        }
        return new Releases(trials, released, found, error, Math.sqrt(squares));
    }

    /** Mean misses of the plain and of the nested figure of the rung that was chosen, and what the choice lost to the best rung, in points. */
    record Ladders(int plants, double plainMiss, double nestedMiss, double nestedError, double lost) {}

    static Ladders ladders(long seed, int plants) {
        double plain = 0;
        double nested = 0;
        double squares = 0;
        double lost = 0;
        for (int p = 0; p < plants; p++) {
            DrawnLadder ladder = new DrawnLadder(seed + p, FLEETS[p % FLEETS.length]);
            double miss = 100 * (ladder.choice.nested().orElseThrow() - ladder.truth);
            plain += 100 * (ladder.choice.plain() - ladder.truth) / plants;
            nested += miss / plants;
            squares += miss * miss / plants;
            lost += 100 * (ladder.best - ladder.truth) / plants;
        }
        return new Ladders(plants, plain, nested, Math.sqrt((squares - nested * nested) / plants), lost);
    }

    /** Of plants whose cut was set on some nights, those where it was, and where the fleet's true purity is then what is required. */
    record Cuts(int plants, int set, int held) {}

    static Cuts cuts(long seed, int plants, DutyTerms.CutRule rule) {
        int set = 0;
        int held = 0;
        for (int p = 0; p < plants; p++) {
            DrawnPlant plant = new DrawnPlant(seed + p, SORTERS);
            DrawnPlant.Nights nights = plant.show(CutChoice.LEAST_DAYS, SHOWINGS, RECORDS);
            CutChoice choice =
                    CutChoice.of(plant.duty(rule), nights.inService, nights.showings, LocalDate.of(2026, 4, 1));
            if (choice.cut().isPresent()) {
                set++;
                held += plant.holdsPurity(choice.cut().getAsInt()) ? 1 : 0;
            }
        }
        return new Cuts(plants, set, held);
    }
}
