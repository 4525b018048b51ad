package turnstone.trial;

import java.io.Serializable;
import java.util.HashMap;
import java.util.HashSet;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.Set;
import turnstone.decide.Model;
import turnstone.decide.Projector;

/**
 * Which pair of models judges a record: a pure look-up, nothing is fitted here.
 *
 * <p>In the form {@code this fleet} a pair is known by the tray group that it was made without; in the form {@code machine not seen} by tray
 * group and instrument. The two sides of a pair are made without the same; either every pair has a side in service or none has. A record
 * whose pair is missing was not tried, and is never judged by another pair.
 */
public final class TrialModels implements Serializable {
    private static final long serialVersionUID = 1L;

    private record Key(TrialForm form, int trayGroup, String instrument) implements Serializable {
        private static final long serialVersionUID = 1L;

        static Key of(TrialForm form, int trayGroup, String instrument) {
            return new Key(form, trayGroup, form == TrialForm.THIS_FLEET ? "" : instrument);
        }
    }

    /** The two models that judge the same records. Its projectors have scratch: {@link #copy} for another thread. */
    public static final class Pair implements Serializable {
        private static final long serialVersionUID = 1L;

        private final Projector candidate;
        /** Null where nothing is in service: an {@code Optional} cannot be serialised. */
        private final Projector inService;

        private final HashSet<String> seenWhole;

        private Pair(Projector candidate, Projector inService, Set<String> seenWhole) {
            this.candidate = candidate;
            this.inService = inService;
            this.seenWhole = new HashSet<>(seenWhole);
        }

        /** Whether a record labelled with this material may be judged: false where the pair could not be made without its trays. */
        public boolean tries(String material) {
            return !seenWhole.contains(material);
        }

        /** The candidate recipe, re-made. */
        public Projector candidate() {
            return candidate;
        }

        /** The recipe in service, re-made without the same. */
        public Optional<Projector> inService() {
            return Optional.ofNullable(inService);
        }

        /** The same for another thread. */
        public Pair copy() {
            return new Pair(candidate.copy(), inService == null ? null : inService.copy(), seenWhole);
        }
    }

    private final HashMap<Key, Pair> pairs;

    private TrialModels(Map<Key, Pair> pairs) {
        this.pairs = new HashMap<>(pairs);
    }

    /** Begins a collection of pairs. */
    public static Builder builder() {
        return new Builder();
    }

    /** The pair for a record of this tray group on this instrument; empty where it was not tried. */
    public Optional<Pair> find(TrialForm form, int trayGroup, String instrument) {
        return Optional.ofNullable(pairs.get(Key.of(form, trayGroup, instrument)));
    }

    /** Whether the pairs have a side in service. */
    public boolean compares() {
        return pairs.values().stream().anyMatch(pair -> pair.inService != null);
    }

    /** Number of pairs in both forms. */
    public int size() {
        return pairs.size();
    }

    /** The same for another thread. */
    public TrialModels copy() {
        Map<Key, Pair> copies = new HashMap<>();
        pairs.forEach((key, pair) -> copies.put(key, pair.copy()));
        return new TrialModels(copies);
    }

    /** Collects pairs. */
    public static final class Builder {
        private final Map<Key, Pair> pairs = new HashMap<>();

        private Builder() {}

        /** The pair made without this tray group. */
        public Builder thisFleet(int withoutTrayGroup, Model candidate, Optional<Model> inService) {
            return thisFleet(withoutTrayGroup, candidate, inService, Set.of());
        }

        /** The same, but for materials that have no other trays: they were kept, and their records are not to be judged. */
        public Builder thisFleet(
                int withoutTrayGroup, Model candidate, Optional<Model> inService, Set<String> seenWhole) {
            return put(Key.of(TrialForm.THIS_FLEET, withoutTrayGroup, ""), candidate, inService, seenWhole);
        }

        /** The pair made without this tray group and without this instrument. */
        public Builder machineNotSeen(
                int withoutTrayGroup, String withoutInstrument, Model candidate, Optional<Model> inService) {
            return machineNotSeen(withoutTrayGroup, withoutInstrument, candidate, inService, Set.of());
        }

        /** The same, but for materials that have no other trays or no other machine. */
        public Builder machineNotSeen(
                int withoutTrayGroup,
                String withoutInstrument,
                Model candidate,
                Optional<Model> inService,
                Set<String> seenWhole) {
            Objects.requireNonNull(withoutInstrument);
            Key key = Key.of(TrialForm.MACHINE_NOT_SEEN, withoutTrayGroup, withoutInstrument);
            return put(key, candidate, inService, seenWhole);
        }

        private Builder put(Key key, Model candidate, Optional<Model> inService, Set<String> seenWhole) {
            Pair pair = new Pair(
                    Projector.of(candidate), inService.map(Projector::of).orElse(null), seenWhole);
            boolean alike = pairs.values().stream().allMatch(other -> (other.inService == null) == inService.isEmpty());
            if (!alike) {
                throw new IllegalArgumentException("one pair has a side in service and another has none");
            }
            inService.ifPresent(other -> {
                if (!other.countScale()
                        .fingerprint()
                        .equals(candidate.countScale().fingerprint())) {
                    throw new IllegalArgumentException("the two sides are defined on different count scales");
                }
            });
            if (pairs.put(key, pair) != null) {
                throw new IllegalArgumentException("pair given twice: " + key);
            }
            return this;
        }

        /** The look-up. */
        public TrialModels build() {
            return new TrialModels(pairs);
        }
    }
}
