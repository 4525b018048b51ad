package turnstone.trial;

import java.time.LocalDate;
import java.util.Map;
import java.util.OptionalDouble;
import java.util.TreeMap;
import java.util.TreeSet;
import java.util.function.Function;
import turnstone.decide.Quantiles;
import turnstone.plant.Duty;

/**
 * The gain of a candidate over what is in service over several days, on the same showings.
 *
 * <p>Where the duty fixes a purity, the figure is recovery where each side's own frontier, traced from all the judged records, has that purity;
 * where it fixes a recovery, purity there. Both sides' cuts are found in the same way on the same records, so that neither side gains by being
 * less pure, and the error of the cut is in the error of the gain. Otherwise the figure is recovery by the decision for the nearest material.
 *
 * <p>With B blocks (a sorter on a day), G the gain from all and G_b that without block b, the pseudo-values B·G − (B − 1)·G_b stand for the
 * blocks: their mean deviation over √B is the standard error, t has B − 1 degrees of freedom. The point is G itself. (Delete-one jackknife:
 * Quenouille 1956, Tukey 1958, from memory.)
 */
final class GainEstimator {
    private static final double NO_SPREAD = 1e-13;

    private record Block(String sorter, LocalDate day) implements Comparable<Block> {
        @Override
        public int compareTo(Block other) {
            int bySorter = sorter.compareTo(other.sorter);
            return bySorter != 0 ? bySorter : day.compareTo(other.day);
        }
    }

    private record Sums(FrontierSums candidate, FrontierSums inService) {}

    private final Duty duty;
    private final Map<String, TrialShowing> showings;
    private final DutyFigure figure;

    private GainEstimator(Duty duty, Map<String, TrialShowing> showings, DutyFigure figure) {
        this.duty = duty;
        this.showings = showings;
        this.figure = figure;
    }

    /** From scores: at the figure that the duty fixes, else by the decision for the nearest material. */
    static Gain ofScores(
            Duty duty, ScoreHistogram candidate, ScoreHistogram inService, Map<String, TrialShowing> showings) {
        return new GainEstimator(duty, showings, DutyFigure.of(duty)).gain(candidate, inService);
    }

    /** From tallies: recovery by the decision for the nearest material. */
    static Gain ofTallies(Duty duty, TrialTally candidate, TrialTally inService, Map<String, TrialShowing> showings) {
        return new GainEstimator(duty, showings, DutyFigure.nearest())
                .gain(ScoreHistogram.ofDecisions(duty, candidate), ScoreHistogram.ofDecisions(duty, inService));
    }

    private Gain gain(ScoreHistogram candidate, ScoreHistogram inService) {
        TreeMap<Block, Sums> blocks = new TreeMap<>();
        int ours = sort(candidate, blocks, Sums::candidate);
        int theirs = sort(inService, blocks, Sums::inService);
        Sums all = new Sums(FrontierSums.empty(duty), FrontierSums.empty(duty));
        blocks.values().forEach(block -> {
            all.candidate().add(block.candidate());
            all.inService().add(block.inService());
        });
        if (ours != theirs || !all.candidate().sameRecords(all.inService())) {
            throw new IllegalArgumentException("the two sides of a trial must judge the same records");
        }
        Size size = new Size(blocks, ours);
        String missing = all.candidate().notShown();
        if (!missing.isEmpty()) {
            return size.without("no records of " + missing + " in the trial");
        }
        OptionalDouble whole = difference(all);
        if (whole.isEmpty()) {
            return size.without("one side does not reach it at any cut");
        }
        return within(size, whole.getAsDouble(), all, blocks);
    }

    private Gain within(Size size, double whole, Sums all, Map<Block, Sums> blocks) {
        int count = blocks.size();
        double[] pseudo = new double[count];
        double mean = 0;
        int i = 0;
        for (Sums block : blocks.values()) {
            Sums rest = new Sums(
                    all.candidate().minus(block.candidate()), all.inService().minus(block.inService()));
            OptionalDouble without = rest.candidate().notShown().isEmpty() ? difference(rest) : OptionalDouble.empty();
            if (without.isEmpty()) {
                return size.pointOnly(whole, "one block of a sorter on a day bears the figure alone; show more");
            }
            pseudo[i] = count * whole - (count - 1) * without.getAsDouble();
            mean += pseudo[i] / count;
            i++;
        }
        double squares = 0;
        for (double value : pseudo) {
            squares += (value - mean) * (value - mean);
        }
        double error = Math.sqrt(squares / (count - 1) / count);
        if (error <= NO_SPREAD && Math.abs(whole) > NO_SPREAD) {
            return size.pointOnly(
                    whole, "interval not given: showings do not differ at all; more showings would give one");
        }
        return size.with(whole, error);
    }

    private OptionalDouble difference(Sums sums) {
        OptionalDouble ours = figure.of().apply(sums.candidate().frontier());
        OptionalDouble theirs = figure.of().apply(sums.inService().frontier());
        return ours.isEmpty() || theirs.isEmpty()
                ? OptionalDouble.empty()
                : OptionalDouble.of(ours.getAsDouble() - theirs.getAsDouble());
    }

    /** Puts every showing into its block; the least number of showings of a material of the infeed. */
    private int sort(ScoreHistogram histogram, Map<Block, Sums> blocks, Function<Sums, FrontierSums> side) {
        TreeMap<String, Integer> perMaterial = new TreeMap<>();
        duty.infeedMix().forEach((material, share) -> {
            if (share > 0) {
                perMaterial.put(material, 0);
            }
        });
        histogram.rows().forEach((key, row) -> {
            TrialShowing showing = showings.get(key.showing());
            if (showing == null) {
                throw new IllegalArgumentException("a showing that the trial does not know: " + key.showing());
            }
            if (duty.sorters().contains(showing.sorter()) && perMaterial.containsKey(key.truth())) {
                Sums sums = blocks.computeIfAbsent(
                        new Block(showing.sorter(), showing.day()),
                        block -> new Sums(FrontierSums.empty(duty), FrontierSums.empty(duty)));
                side.apply(sums).add(key.truth(), row);
                perMaterial.merge(key.truth(), 1, Integer::sum);
            }
        });
        return perMaterial.values().stream().mapToInt(Integer::intValue).min().orElse(0);
    }

    /** On how much a gain rests. */
    private final class Size {
        private final int days;
        private final int sorters;
        private final int blocks;
        private final int leastShowings;

        Size(Map<Block, Sums> blocks, int leastShowings) {
            TreeSet<LocalDate> dates = new TreeSet<>();
            TreeSet<String> machines = new TreeSet<>();
            blocks.keySet().forEach(block -> {
                dates.add(block.day());
                machines.add(block.sorter());
            });
            this.days = dates.size();
            this.sorters = machines.size();
            this.blocks = blocks.size();
            this.leastShowings = leastShowings;
        }

        Gain without(String note) {
            return of(OptionalDouble.empty(), OptionalDouble.empty(), OptionalDouble.empty(), note);
        }

        Gain pointOnly(double point, String note) {
            return of(OptionalDouble.of(point), OptionalDouble.empty(), OptionalDouble.empty(), note);
        }

        Gain with(double point, double error) {
            double reach = error == 0
                    ? 0
                    : error * Quantiles.student(duty.terms().gain().confidence(), blocks - 1);
            return of(OptionalDouble.of(point), OptionalDouble.of(point - reach), OptionalDouble.of(error), "");
        }

        private Gain of(OptionalDouble point, OptionalDouble lower, OptionalDouble error, String note) {
            double confidence = duty.terms().gain().confidence();
            return new Gain(figure.name(), point, lower, error, confidence, days, sorters, blocks, leastShowings, note);
        }
    }
}
