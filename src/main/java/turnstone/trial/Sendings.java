package turnstone.trial;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.SortedSet;
import java.util.TreeMap;
import java.util.TreeSet;
import java.util.function.UnaryOperator;
import turnstone.plant.Duty;

/**
 * What one side sent to a duty's product stream, by material and showing.
 *
 * <p>A record is ejected where it is familiar and its decided material is one that the duty ejects: the targets where the product is
 * ejected; the other materials of the infeed mix where the product is passed. Everything else is passed, {@code no signal} and
 * {@code unfamiliar} included. A record stands for belt area; within a material mass goes with area, so a share of records is a share of
 * mass, and between materials the infeed mix by mass says the rest: g/cm² cancels.
 */
final class Sendings {
    /** One showing: records sent to the product stream, of all records with or without signal. */
    record Showing(String showing, String sorter, long sent, long records) {}

    /** One material of the infeed mix: its share by mass with the deviation of that, and its showings, by id. */
    record Part(String material, double massShare, double massDeviation, boolean target, List<Showing> showings) {
        Part with(List<Showing> others) {
            return new Part(material, massShare, massDeviation, target, others);
        }

        long records() {
            return showings.stream().mapToLong(Showing::records).sum();
        }

        /** Share of the material's records, pooled over showings, sent to the product stream. */
        double sentShare() {
            return (double) showings.stream().mapToLong(Showing::sent).sum() / records();
        }
    }

    private final List<Part> parts;

    private Sendings(List<Part> parts) {
        this.parts = parts;
    }

    /** By the decision for the nearest material. */
    static Sendings of(Duty duty, TrialTally tally, Map<String, TrialShowing> showings) {
        Map<String, long[]> byShowing = new TreeMap<>();
        tally.cells().forEach((cell, count) -> {
            long[] sentAndAll = byShowing.computeIfAbsent(cell.showing(), id -> new long[2]);
            sentAndAll[0] += isProduct(duty, cell) ? count : 0;
            sentAndAll[1] += count;
        });
        return of(duty, byShowing, showings);
    }

    /** By a cut of {@link ScoreBins}. */
    static Sendings of(Duty duty, ScoreHistogram histogram, int cut, Map<String, TrialShowing> showings) {
        Map<String, long[]> byShowing = new TreeMap<>();
        histogram.rows().forEach((key, row) -> {
            long ejected = 0;
            for (int bin = cut; bin < ScoreBins.COUNT; bin++) {
                ejected += row[bin];
            }
            long all = ScoreHistogram.sum(row);
            long[] sentAndAll = byShowing.computeIfAbsent(key.showing(), id -> new long[2]);
            sentAndAll[0] += duty.productStream() == Duty.Stream.EJECTED ? ejected : all - ejected;
            sentAndAll[1] += all;
        });
        return of(duty, byShowing, showings);
    }

    private static Sendings of(Duty duty, Map<String, long[]> byShowing, Map<String, TrialShowing> showings) {
        Map<String, List<Showing>> byMaterial = new LinkedHashMap<>();
        byShowing.forEach((id, sentAndAll) -> {
            TrialShowing showing = showings.get(id);
            if (showing == null) {
                throw new IllegalArgumentException("the tally holds a showing that the trial does not know: " + id);
            }
            if (duty.sorters().contains(showing.sorter())) {
                byMaterial
                        .computeIfAbsent(showing.material(), name -> new ArrayList<>())
                        .add(new Showing(id, showing.sorter(), sentAndAll[0], sentAndAll[1]));
            }
        });
        List<Part> parts = new ArrayList<>();
        // The mix comes without an order: by name, so that sums have one.
        new TreeMap<>(duty.infeedMix()).forEach((material, share) -> {
            if (share > 0) {
                List<Showing> shown = byMaterial.getOrDefault(material, List.of());
                double deviation = duty.terms().mixDeviation().getOrDefault(material, 0.0);
                parts.add(new Part(material, share, deviation, duty.targets().contains(material), List.copyOf(shown)));
            }
        });
        return new Sendings(List.copyOf(parts));
    }

    /** The same with every part changed. */
    Sendings map(UnaryOperator<Part> change) {
        return new Sendings(parts.stream().map(change).toList());
    }

    /** The same of these showings alone, by id. */
    Sendings onlyShowings(Set<String> ids) {
        return map(part -> part.with(part.showings().stream()
                .filter(showing -> ids.contains(showing.showing()))
                .toList()));
    }

    /** The same of one sorter alone. */
    Sendings onlySorter(String sorter) {
        return map(part -> part.with(part.showings().stream()
                .filter(showing -> showing.sorter().equals(sorter))
                .toList()));
    }

    /** Every sorter that showed anything of the infeed, by name. */
    SortedSet<String> sorters() {
        SortedSet<String> sorters = new TreeSet<>();
        parts.forEach(part -> part.showings().forEach(showing -> sorters.add(showing.sorter())));
        return sorters;
    }

    private static boolean isProduct(Duty duty, TallyCell cell) {
        boolean ejected = cell.recognition() == Recognition.FAMILIAR && ejects(duty, cell.decided());
        return ejected == (duty.productStream() == Duty.Stream.EJECTED);
    }

    /** Whether the duty ejects what is decided to be this material. */
    static boolean ejects(Duty duty, String material) {
        boolean target = duty.targets().contains(material);
        return duty.productStream() == Duty.Stream.EJECTED
                ? target
                : !target && duty.infeedMix().getOrDefault(material, 0.0) > 0;
    }

    List<Part> parts() {
        return parts;
    }

    /** The first material of the mix without a single record, if there is one. */
    Optional<String> notShown() {
        return parts.stream()
                .filter(part -> part.records() == 0)
                .map(Part::material)
                .findFirst();
    }

    int showings() {
        return parts.stream().mapToInt(part -> part.showings().size()).sum();
    }

    /** Whether both were counted over the same showings with the same number of records in each. */
    boolean sameRecords(Sendings other) {
        return parts.stream()
                .map(Sendings::withoutSent)
                .toList()
                .equals(other.parts.stream().map(Sendings::withoutSent).toList());
    }

    /** Whether both sent the same number of records of every showing. */
    boolean equalTo(Sendings other) {
        return parts.equals(other.parts);
    }

    private static Part withoutSent(Part part) {
        return part.with(part.showings().stream()
                .map(showing -> new Showing(showing.showing(), showing.sorter(), 0, showing.records()))
                .toList());
    }
}
