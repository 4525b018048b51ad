package turnstone.trial;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.OptionalDouble;
import java.util.SortedMap;
import java.util.TreeMap;
import java.util.TreeSet;
import java.util.stream.Collectors;
import turnstone.plant.Duty;

/**
 * Which rung of a ladder serves a duty best, and an honest figure for it.
 *
 * <p>The choice is the plain maximum of the duty's figure; of the rungs within {@value #TIE} of it, the one with the most ridge, then the
 * fewest axes, then the first. The maximum flatters the rung that it picks. The nested figure does not: every sorter's records are judged by the
 * rung that the other sorters would choose, and the figure is that of all these records together.
 */
public final class RungChoice {
    /** A tenth of a point. */
    static final double TIE = 0.001;

    /** Sorters without which no choice can be left to the others. */
    private static final int LEAST_SORTERS = 2;

    /**
     * One rung.
     *
     * @param name for people, unique in the ladder
     * @param ridge as a share of the within scatter's mean diagonal
     * @param axes kept
     */
    public record Rung(String name, double ridge, int axes) {}

    private final Rung chosen;
    private final double plain;
    private final OptionalDouble nested;
    private final SortedMap<String, Rung> chosenWithout;
    private final ScoreHistogram nestedScores;

    private RungChoice(
            Rung chosen,
            double plain,
            OptionalDouble nested,
            SortedMap<String, Rung> chosenWithout,
            ScoreHistogram nestedScores) {
        this.chosen = chosen;
        this.plain = plain;
        this.nested = nested;
        this.chosenWithout = chosenWithout;
        this.nestedScores = nestedScores;
    }

    /** From the scores of every rung on the same showings, in the ladder's order, at the figure of the duty. */
    public static RungChoice ofScores(Duty duty, Map<Rung, ScoreHistogram> ladder, Iterable<TrialShowing> showings) {
        return of(duty, DutyFigure.of(duty), ladder, showings);
    }

    /** From the tallies of every rung on the same showings, by recovery with the decision for the nearest material. */
    public static RungChoice ofTallies(Duty duty, Map<Rung, TrialTally> ladder, Iterable<TrialShowing> showings) {
        Map<Rung, ScoreHistogram> scores = new LinkedHashMap<>();
        ladder.forEach((rung, tally) -> scores.put(rung, ScoreHistogram.ofDecisions(duty, tally)));
        return of(duty, DutyFigure.nearest(), scores, showings);
    }

    private static RungChoice of(
            Duty duty, DutyFigure figure, Map<Rung, ScoreHistogram> ladder, Iterable<TrialShowing> showings) {
        Map<String, String> sorterOf = new HashMap<>();
        showings.forEach(showing -> sorterOf.put(showing.showing(), showing.sorter()));
        List<Rung> rungs = List.copyOf(ladder.keySet());
        Map<Rung, SortedMap<String, FrontierSums>> sums = new LinkedHashMap<>();
        ladder.forEach((rung, scores) -> sums.put(rung, bySorter(duty, scores, sorterOf)));
        TreeSet<String> sorters = new TreeSet<>();
        sums.values().forEach(one -> sorters.addAll(one.keySet()));
        double[] whole = figures(duty, figure, sums, "");
        int best = best(rungs, whole);
        SortedMap<String, Rung> without = new TreeMap<>();
        ScoreHistogram nested = ScoreHistogram.empty();
        FrontierSums nestedSums = FrontierSums.empty(duty);
        if (sorters.size() >= LEAST_SORTERS) {
            for (String sorter : sorters) {
                Rung rung = rungs.get(best(rungs, figures(duty, figure, sums, sorter)));
                without.put(sorter, rung);
                nested.merge(ladder.get(rung).only(showing -> sorter.equals(sorterOf.get(showing))));
                nestedSums.add(sums.get(rung).get(sorter));
            }
        }
        OptionalDouble honest = without.isEmpty() || !nestedSums.notShown().isEmpty()
                ? OptionalDouble.empty()
                : figure.of().apply(nestedSums.frontier());
        return new RungChoice(rungs.get(best), whole[best], honest, without, nested);
    }

    private static SortedMap<String, FrontierSums> bySorter(
            Duty duty, ScoreHistogram scores, Map<String, String> sorterOf) {
        SortedMap<String, FrontierSums> sums = new TreeMap<>();
        scores.rows().forEach((key, row) -> {
            String sorter = sorterOf.get(key.showing());
            if (sorter == null) {
                throw new IllegalArgumentException("a showing that the trial does not know: " + key.showing());
            }
            if (duty.sorters().contains(sorter)) {
                sums.computeIfAbsent(sorter, name -> FrontierSums.empty(duty)).add(key.truth(), row);
            }
        });
        return sums;
    }

    /** The figure of every rung without one sorter; below all others where no cut reaches what the duty fixes. */
    private static double[] figures(
            Duty duty, DutyFigure figure, Map<Rung, SortedMap<String, FrontierSums>> sums, String without) {
        double[] figures = new double[sums.size()];
        int r = 0;
        for (SortedMap<String, FrontierSums> one : sums.values()) {
            FrontierSums all = FrontierSums.empty(duty);
            one.forEach((sorter, part) -> {
                if (!sorter.equals(without)) {
                    all.add(part);
                }
            });
            figures[r++] =
                    all.notShown().isEmpty() ? figure.of().apply(all.frontier()).orElse(-1) : -1;
        }
        return figures;
    }

    private static int best(List<Rung> rungs, double[] figures) {
        double most = Double.NEGATIVE_INFINITY;
        for (double figure : figures) {
            most = Math.max(most, figure);
        }
        List<Integer> tied = new ArrayList<>();
        for (int r = 0; r < figures.length; r++) {
            if (figures[r] >= most - TIE) {
                tied.add(r);
            }
        }
        int best = tied.get(0);
        for (int r : tied) {
            int byRidge = Double.compare(rungs.get(r).ridge(), rungs.get(best).ridge());
            boolean fewer =
                    byRidge == 0 && rungs.get(r).axes() < rungs.get(best).axes();
            if (byRidge > 0 || fewer) {
                best = r;
            }
        }
        return best;
    }

    /** The rung to use. */
    public Rung chosen() {
        return chosen;
    }

    /** The figure by which it was chosen: it flatters. */
    public double plain() {
        return plain;
    }

    /** The figure to report for it; empty with fewer than two sorters, or where no cut reaches what the duty fixes. */
    public OptionalDouble nested() {
        return nested;
    }

    /** What each sorter's records were judged by in the nested figure. */
    public SortedMap<String, Rung> chosenWithout() {
        return new TreeMap<>(chosenWithout);
    }

    /** The scores behind the nested figure, for intervals and gains. */
    public ScoreHistogram nestedScores() {
        return nestedScores;
    }

    /** {@code ridge 1e-4, all axes, chosen by 5 of 6 sorters}. */
    public String agreement() {
        long same = chosenWithout.values().stream().filter(chosen::equals).count();
        String others = chosenWithout.values().stream()
                .filter(rung -> !rung.equals(chosen))
                .map(Rung::name)
                .distinct()
                .collect(Collectors.joining(", "));
        return chosen.name() + ", chosen without each sorter in turn " + same + " of " + chosenWithout.size() + " times"
                + (others.isEmpty() ? "" : "; else " + others);
    }
}
