package turnstone.trial;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Collection;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalInt;
import java.util.TreeMap;
import java.util.TreeSet;

/**
 * What a trial counted: tallies by form and side, and what a reader must know to judge them. Immutable once built; the tallies are not
 * copied.
 */
public final class TrialResult {
    private record Seat(TrialForm form, Side side) {}

    private record Bench(String duty, TrialForm form, Side side) {}

    private final String candidate;
    private final Optional<String> inService;
    private final List<LocalDate> days;
    private final List<TrialShowing> showings;
    private final Map<String, String> notTried;
    private final Map<String, String> oneMachineOnly;
    private final Map<Seat, TrialTally> tallies;
    private final Map<Bench, ScoreHistogram> scores;
    private final Map<Bench, Integer> cuts;
    private final NightFacts facts;
    private final List<TrialShowing> earlierShowings;
    private final Optional<TrialTally> earlier;

    private TrialResult(Builder builder) {
        candidate = builder.candidate;
        inService = builder.inService;
        showings = List.copyOf(builder.showings);
        TreeSet<LocalDate> ascending = new TreeSet<>();
        showings.forEach(showing -> ascending.add(showing.day()));
        days = List.copyOf(ascending);
        notTried = new TreeMap<>(builder.notTried);
        oneMachineOnly = new TreeMap<>(builder.oneMachineOnly);
        tallies = Map.copyOf(builder.tallies);
        scores = Map.copyOf(builder.scores);
        cuts = Map.copyOf(builder.cuts);
        facts = builder.facts;
        earlierShowings = List.copyOf(builder.earlierShowings);
        earlier = Optional.ofNullable(builder.earlier);
    }

    /** Begins the result of a trial of this candidate against what is in service, by their fingerprints. */
    public static Builder of(String candidate, Optional<String> inService) {
        return new Builder(candidate, inService);
    }

    /** The fingerprint of the candidate. */
    public String candidate() {
        return candidate;
    }

    /** The fingerprint of what is in service. */
    public Optional<String> inService() {
        return inService;
    }

    /** The days judged, ascending. */
    public List<LocalDate> days() {
        return days;
    }

    /** The showings of the trial. */
    public List<TrialShowing> showings() {
        return showings;
    }

    /** Materials that could not be tried, with the reason. */
    public Map<String, String> notTried() {
        return Map.copyOf(notTried);
    }

    /** Materials that could not be tried in a form, with the reason: {@link #notTried()} and those that this form alone can't try. */
    public Map<String, String> notTried(TrialForm form) {
        Map<String, String> reasons = new TreeMap<>(notTried);
        if (form == TrialForm.MACHINE_NOT_SEEN) {
            oneMachineOnly.forEach(reasons::putIfAbsent);
        }
        return reasons;
    }

    /** The tally of one form and side; empty where the trial did not make it. */
    public Optional<TrialTally> tally(TrialForm form, Side side) {
        return Optional.ofNullable(tallies.get(new Seat(form, side)));
    }

    /** Scores of one form and side for a duty; empty where the trial did not bin them. */
    public Optional<ScoreHistogram> scores(String duty, TrialForm form, Side side) {
        return Optional.ofNullable(scores.get(new Bench(duty, form, side)));
    }

    /** The cut of one form and side for a duty, set on earlier days; empty where none was set. */
    public OptionalInt cut(String duty, TrialForm form, Side side) {
        Integer cut = cuts.get(new Bench(duty, form, side));
        return cut == null ? OptionalInt.empty() : OptionalInt.of(cut);
    }

    /** What the night found out beside tallies. */
    public NightFacts facts() {
        return facts;
    }

    /** Showings of earlier trials, for bounds that pool many nights. */
    public List<TrialShowing> earlierShowings() {
        return earlierShowings;
    }

    /** What the candidate side of earlier trials of this fleet counted on them. */
    public Optional<TrialTally> earlier() {
        return earlier;
    }

    /** Collects a result. */
    public static final class Builder {
        private final String candidate;
        private final Optional<String> inService;
        private final List<TrialShowing> showings = new ArrayList<>();
        private final Map<String, String> notTried = new TreeMap<>();
        private final Map<String, String> oneMachineOnly = new TreeMap<>();
        private final Map<Seat, TrialTally> tallies = new HashMap<>();
        private final Map<Bench, ScoreHistogram> scores = new HashMap<>();
        private final Map<Bench, Integer> cuts = new HashMap<>();
        private final List<TrialShowing> earlierShowings = new ArrayList<>();
        private NightFacts facts = NightFacts.none();
        private TrialTally earlier;

        private Builder(String candidate, Optional<String> inService) {
            this.candidate = candidate;
            this.inService = inService;
        }

        /** Adds showings that were judged. */
        public Builder showings(Collection<TrialShowing> more) {
            showings.addAll(more);
            return this;
        }

        /** Says that a material could not be tried, and why. */
        public Builder notTried(String material, String why) {
            notTried.put(material, why);
            return this;
        }

        /** Says that all trays of a material lie in one group, so that no model can be made without its trays. */
        public Builder oneGroupOnly(String material) {
            return notTried(
                    material,
                    material
                            + " was not tried: all its trays lie in one group; show a tray of another group, or deal its"
                            + " trays into two groups or more");
        }

        /** Says that without one of the machines a material has no trays left of another group, so that it can't be tried on it as not seen. */
        public Builder oneMachineOnly(String material) {
            oneMachineOnly.put(
                    material,
                    material
                            + " was not tried on a machine not seen: without one machine no other tray of it is left;"
                            + " show trays of it on another machine");
            return this;
        }

        /** Gives the tally of one form and side. */
        public Builder tally(TrialForm form, Side side, TrialTally tally) {
            tallies.put(new Seat(form, side), tally);
            return this;
        }

        /** Gives the scores of one form and side for a duty, by its name, on the days judged. */
        public Builder scores(String duty, TrialForm form, Side side, ScoreHistogram histogram) {
            scores.put(new Bench(duty, form, side), histogram);
            return this;
        }

        /** Gives the cut that was set on earlier days; figures of this form and side are then taken at it. */
        public Builder cut(String duty, TrialForm form, Side side, int cut) {
            cuts.put(new Bench(duty, form, side), cut);
            return this;
        }

        /** Says what the night found out beside tallies. */
        public Builder facts(NightFacts found) {
            facts = found;
            return this;
        }

        /** Gives what the candidate side of earlier trials of this fleet counted, none of it on the days judged. */
        public Builder earlier(Collection<TrialShowing> of, TrialTally tally) {
            earlierShowings.addAll(of);
            earlier = tally;
            return this;
        }

        /** The result. */
        public TrialResult build() {
            return new TrialResult(this);
        }
    }
}
