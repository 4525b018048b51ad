package turnstone.trial;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Random;
import java.util.SplittableRandom;
import java.util.TreeMap;
import turnstone.plant.Duty;
import turnstone.plant.DutyTerms;
import turnstone.plant.Required;
import turnstone.plant.Requirement;

/**
 * An invented plant at tally level whose truth is known: scores of four materials on a fleet of sorters.
 *
 * <p>A record's score is sd·(distance + sorter + night + showing + own), the last standard normal; the spreads of the others are drawn anew for
 * every plant. The candidate's score shares all of these and has a shift, and spreads by sorter, night and showing, of its own; the two sides'
 * own terms are correlated. So the share beyond a cut is a normal probability, and figures of the fleet are sums of such.
 */
final class DrawnPlant {
    static final Map<String, Double> MIX = new TreeMap<>(Map.of("PET", 0.45, "tray", 0.20, "PP", 0.25, "PVC", 0.10));
    private static final Map<String, Double> SCORE_DEVIATION = Map.of("PET", 6.0, "tray", 6.0, "PP", 11.0, "PVC", 12.0);
    private static final int HALVINGS = 40;

    /** Effects of one side, by sorter or night and material. */
    private static final class Effects {
        final Map<String, Double> bySorter = new TreeMap<>();
        final Map<String, Double> byNight = new TreeMap<>();
        double sorterSpread;
        double nightSpread;
        double showingSpread;

        double sorter(String sorter, String material) {
            return bySorter.getOrDefault(sorter + "/" + material, 0.0);
        }

        double night(int night, String material) {
            return byNight.getOrDefault(night + "/" + material, 0.0);
        }
    }

    final List<String> sorters = new ArrayList<>();
    final Duty duty;
    private final Random random;
    private final Map<String, Double> distance = new TreeMap<>();
    private final Effects shared = new Effects();
    private final Effects own = new Effects();
    private final double purity;
    /** Correlation of the two sides' own terms. */
    private final double correlation;

    private double shift;

    DrawnPlant(long seed, int sorterCount) {
        // Neighbouring seeds of Random begin alike.
        random = new Random(new SplittableRandom(seed).nextLong());
        for (int s = 0; s < sorterCount; s++) {
            sorters.add("sorter " + (10 + s));
        }
        distance.put("PET", between(1.4, 1.8));
        distance.put("tray", -between(1.4, 1.8));
        distance.put("PP", -between(2.4, 2.9));
        distance.put("PVC", -between(2.6, 3.2));
        draw(shared, between(0.15, 0.40), between(0.05, 0.15), between(0.20, 0.40));
        draw(own, between(0.03, 0.08), between(0.01, 0.03), between(0.03, 0.10));
        purity = between(0.94, 0.97);
        correlation = between(0.96, 0.99);
        Required required = new Required(Requirement.Figure.DECISION_PURITY, purity);
        duty = new Duty("PET out", List.of("PET"), Duty.Stream.EJECTED, sorters, MIX, List.of())
                .with(DutyTerms.standard().requiring(required));
    }

    private double between(double from, double to) {
        return from + (to - from) * random.nextDouble();
    }

    private void draw(Effects effects, double sorterSpread, double nightSpread, double showingSpread) {
        effects.sorterSpread = sorterSpread;
        effects.nightSpread = nightSpread;
        effects.showingSpread = showingSpread;
        for (String material : MIX.keySet()) {
            for (String sorter : sorters) {
                effects.bySorter.put(sorter + "/" + material, sorterSpread * random.nextGaussian());
            }
        }
    }

    /** Draws what the nights to come have in common. */
    private void drawNights(int nights) {
        for (Effects effects : List.of(shared, own)) {
            for (int night = 0; night < nights; night++) {
                for (String material : MIX.keySet()) {
                    effects.byNight.put(night + "/" + material, effects.nightSpread * random.nextGaussian());
                }
            }
        }
    }

    /** Moves the candidate until its true gain in recovery at the required purity, on this fleet and over nights without end, is this. */
    void gain(double wanted) {
        double low = -1;
        double high = 1;
        double inService = recoveryAtPurity(Side.IN_SERVICE);
        for (int i = 0; i < HALVINGS; i++) {
            shift = (low + high) / 2;
            if (recoveryAtPurity(Side.CANDIDATE) - inService < wanted) {
                low = shift;
            } else {
                high = shift;
            }
        }
    }

    private double recoveryAtPurity(Side side) {
        double low = -30;
        double high = 60;
        for (int i = 0; i < HALVINGS; i++) {
            double cut = (low + high) / 2;
            if (figures(side, cut)[0] < purity) {
                low = cut;
            } else {
                high = cut;
            }
        }
        return figures(side, high)[1];
    }

    /** Whether the true purity of what is in service, at a cut of {@link ScoreBins}, is what the duty requires. */
    boolean holdsPurity(int cut) {
        return figures(Side.IN_SERVICE, ScoreBins.edge(cut))[0] >= purity;
    }

    Duty duty(DutyTerms.CutRule rule) {
        DutyTerms terms = duty.terms();
        return duty.with(new DutyTerms(
                terms.mixDeviation(), terms.costs(), terms.required(), rule, terms.gain(), List.of(), List.of()));
    }

    /** True purity and recovery of the fleet at a cut, nights and showings without end. */
    private double[] figures(Side side, double cut) {
        Map<String, Double> shares = new TreeMap<>();
        for (String material : MIX.keySet()) {
            double sum = 0;
            for (String sorter : sorters) {
                double spread = 1 + square(shared.nightSpread) + square(shared.showingSpread) + ownVariance(side);
                sum += beyond(side, sorter, material, 0, spread, cut);
            }
            shares.put(material, sum / sorters.size());
        }
        return figures(shares);
    }

    private double ownVariance(Side side) {
        return side == Side.IN_SERVICE ? 0 : square(own.nightSpread) + square(own.showingSpread);
    }

    private double beyond(Side side, String sorter, String material, double night, double spread, double cut) {
        double middle = distance.get(material) + shared.sorter(sorter, material) + night;
        if (side == Side.CANDIDATE) {
            middle += own.sorter(sorter, material) + (distance.get(material) > 0 ? shift : -shift);
        }
        return Normal.below((middle - cut / SCORE_DEVIATION.get(material)) / Math.sqrt(spread));
    }

    /** True purity and recovery of this fleet on the first night, by the decision for the nearest material, of what is in service. */
    double[] fleetTonight() {
        Map<String, Double> shares = new TreeMap<>();
        for (String material : MIX.keySet()) {
            double sum = 0;
            for (String sorter : sorters) {
                double spread = 1 + square(shared.showingSpread);
                sum += beyond(Side.IN_SERVICE, sorter, material, shared.night(0, material), spread, 0);
            }
            shares.put(material, sum / sorters.size());
        }
        return figures(shares);
    }

    /** The same over all machines that might have been drawn. */
    double[] machinesTonight() {
        return machine(Map.of(), square(shared.sorterSpread));
    }

    /** The same of one machine more, drawn now. */
    double[] newMachineTonight() {
        Map<String, Double> drawn = new TreeMap<>();
        MIX.keySet().forEach(material -> drawn.put(material, shared.sorterSpread * random.nextGaussian()));
        return machine(drawn, 0);
    }

    private double[] machine(Map<String, Double> sorter, double sorterVariance) {
        Map<String, Double> shares = new TreeMap<>();
        for (String material : MIX.keySet()) {
            double spread = 1 + square(shared.showingSpread) + sorterVariance;
            double middle = distance.get(material) + sorter.getOrDefault(material, 0.0) + shared.night(0, material);
            shares.put(material, Normal.below(middle / Math.sqrt(spread)));
        }
        return figures(shares);
    }

    private static double[] figures(Map<String, Double> shares) {
        double target = 0;
        double sent = 0;
        for (Map.Entry<String, Double> share : shares.entrySet()) {
            double mass = MIX.get(share.getKey()) * share.getValue();
            target += share.getKey().equals("PET") ? mass : 0;
            sent += mass;
        }
        return new double[] {target / sent, target / MIX.get("PET")};
    }

    /** What was counted over some nights. */
    static final class Nights {
        final List<TrialShowing> showings = new ArrayList<>();
        final ScoreHistogram candidate = ScoreHistogram.empty();
        final ScoreHistogram inService = ScoreHistogram.empty();

        Map<String, TrialShowing> byId() {
            Map<String, TrialShowing> map = new LinkedHashMap<>();
            showings.forEach(showing -> map.put(showing.showing(), showing));
            return map;
        }
    }

    /** Shows every material on every sorter on every night. */
    Nights show(int nights, int showingsEach, int records) {
        drawNights(nights);
        Nights shown = new Nights();
        for (int night = 0; night < nights; night++) {
            for (String sorter : sorters) {
                for (String material : MIX.keySet()) {
                    for (int k = 0; k < showingsEach; k++) {
                        show(shown, night, sorter, material, records);
                    }
                }
            }
        }
        return shown;
    }

    private void show(Nights shown, int night, String sorter, String material, int records) {
        String id = String.format("s%06d", shown.showings.size());
        LocalDate day = LocalDate.of(2026, 3, 1).plusDays(night);
        shown.showings.add(new TrialShowing(id, day, sorter, sorter, material + "-1", 1, material));
        double deviation = SCORE_DEVIATION.get(material);
        double middle = distance.get(material)
                + shared.sorter(sorter, material)
                + shared.night(night, material)
                + shared.showingSpread * random.nextGaussian();
        double candidate = middle
                + own.sorter(sorter, material)
                + own.night(night, material)
                + own.showingSpread * random.nextGaussian()
                + (distance.get(material) > 0 ? shift : -shift);
        for (int i = 0; i < records; i++) {
            double common = Math.sqrt(correlation) * random.nextGaussian();
            double ours = deviation * (candidate + common + Math.sqrt(1 - correlation) * random.nextGaussian());
            double theirs = deviation * (middle + common + Math.sqrt(1 - correlation) * random.nextGaussian());
            shown.candidate.add(id, material, bin(ours), 1);
            shown.inService.add(id, material, bin(theirs), 1);
        }
    }

    private static int bin(double score) {
        return score >= 0 ? ScoreBins.ejected(score) : ScoreBins.kept(-score);
    }

    private static double square(double x) {
        return x * x;
    }
}
