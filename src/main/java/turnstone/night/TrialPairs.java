package turnstone.night;

import java.util.Collection;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.SortedSet;
import java.util.TreeMap;
import java.util.TreeSet;
import java.util.stream.Collectors;
import turnstone.decide.Model;
import turnstone.ledger.ShowingSums;
import turnstone.refit.HeldOut;
import turnstone.refit.ModelMaker;
import turnstone.refit.Recipe;
import turnstone.refit.WindowSums;
import turnstone.trial.TrialModels;

/**
 * Re-makes both sides of a trial for every tray group and instrument that the day's showings have: the same is left out of both.
 *
 * <p>Fits run beside each other; each is a function of its own sums, so the outcome does not depend on how.
 */
final class TrialPairs {
    /** One side of a trial: how it is made, and from what. */
    record Maker(Recipe recipe, WindowSums sums) {
        Maker sharing() {
            return new Maker(recipe, sums.sharing());
        }
    }

    private record Seat(int trayGroup, String instrument) implements Comparable<Seat> {
        HeldOut heldOut() {
            return instrument.isEmpty() ? HeldOut.group(trayGroup) : HeldOut.groupAndInstrument(trayGroup, instrument);
        }

        @Override
        public int compareTo(Seat other) {
            int byGroup = Integer.compare(trayGroup, other.trayGroup);
            return byGroup != 0 ? byGroup : instrument.compareTo(other.instrument);
        }
    }

    private record Made(Model candidate, Optional<Model> inService, SortedSet<String> seenWhole) {}

    private final TrialModels models;
    private final SortedSet<String> seenWhole;
    private final SortedSet<String> oneMachineOnly;

    private TrialPairs(TrialModels models, SortedSet<String> seenWhole, SortedSet<String> oneMachineOnly) {
        this.models = models;
        this.seenWhole = seenWhole;
        this.oneMachineOnly = oneMachineOnly;
    }

    /** The pairs that judge these showings. */
    static TrialPairs make(
            ModelMaker maker, Maker candidate, Optional<Maker> inService, Collection<ShowingSums> showings) {
        SortedSet<Seat> seats = new TreeSet<>();
        for (ShowingSums showing : showings) {
            seats.add(new Seat(showing.trayGroup(), ""));
            seats.add(new Seat(showing.trayGroup(), showing.instrument()));
        }
        Map<Seat, Made> made = new TreeMap<>();
        for (int group : seats.stream().map(Seat::trayGroup).distinct().toList()) {
            // Group by group: the fits of one group share what is formed of the sums without it, and no more is held
            // than that.
            List<Seat> ofGroup =
                    seats.stream().filter(seat -> seat.trayGroup() == group).toList();
            Maker ours = candidate.sharing();
            Optional<Maker> theirs = inService.map(Maker::sharing);
            made.putAll(ofGroup.parallelStream()
                    .collect(Collectors.toMap(seat -> seat, seat -> pair(maker, ours, theirs, seat.heldOut()))));
        }
        TrialModels.Builder builder = TrialModels.builder();
        SortedSet<String> seenWhole = new TreeSet<>();
        SortedSet<String> oneMachineOnly = new TreeSet<>();
        made.forEach((seat, pair) -> {
            if (seat.instrument().isEmpty()) {
                seenWhole.addAll(pair.seenWhole());
                builder.thisFleet(seat.trayGroup(), pair.candidate(), pair.inService(), pair.seenWhole());
            } else {
                oneMachineOnly.addAll(pair.seenWhole());
                builder.machineNotSeen(
                        seat.trayGroup(), seat.instrument(), pair.candidate(), pair.inService(), pair.seenWhole());
            }
        });
        oneMachineOnly.removeAll(seenWhole);
        return new TrialPairs(builder.build(), seenWhole, oneMachineOnly);
    }

    private static Made pair(ModelMaker maker, Maker candidate, Optional<Maker> inService, HeldOut heldOut) {
        ModelMaker.Made ours = maker.make(candidate.recipe(), candidate.sums(), heldOut);
        Optional<ModelMaker.Made> theirs = inService.map(side -> maker.make(side.recipe(), side.sums(), heldOut));
        SortedSet<String> seenWhole = new TreeSet<>(ours.keptWhole());
        theirs.ifPresent(side -> seenWhole.addAll(side.keptWhole()));
        return new Made(ours.model(), theirs.map(ModelMaker.Made::model), seenWhole);
    }

    /** The look-up for the pass over the records. */
    TrialModels models() {
        return models;
    }

    /** Materials whose trays all lie in one group of those held out: they can't be tried. */
    SortedSet<String> seenWhole() {
        return seenWhole;
    }

    /** Materials of which nothing is left without one of the machines and a group: they can't be tried on a machine not seen. */
    SortedSet<String> oneMachineOnly() {
        return oneMachineOnly;
    }
}
