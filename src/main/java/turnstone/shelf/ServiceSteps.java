package turnstone.shelf;

import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.fault.Fault;

/**
 * What the entries of a journal come to: the steps that led to what is in service, reverts taken back, withdrawn models passed over.
 *
 * <p>A release goes one step on, a revert one step back. A withdrawal puts, at every step and in every place where the withdrawn model
 * ran, what ran there a step earlier; steps that then say the same are one, and a step that nothing comes before falls away.
 */
final class ServiceSteps {
    private final List<Service> steps = new ArrayList<>();
    private final SortedMap<String, ShelfEntry> withdrawn = new TreeMap<>();

    private ServiceSteps() {}

    /** Follows the entries, in order. */
    static ServiceSteps of(List<ShelfEntry> entries) {
        ServiceSteps steps = new ServiceSteps();
        for (ShelfEntry entry : entries) {
            steps.follow(entry);
            if (!steps.now().equals(Optional.of(entry.after()))) {
                throw Fault.storage("entry " + entry.number()
                                + " of the shelf's journal does not follow from those before it")
                        .found(entry.after().json())
                        .expected(steps.now().map(Service::json))
                        .remedy("restore the journal from a copy, then run verify");
            }
        }
        return steps;
    }

    private void follow(ShelfEntry entry) {
        switch (entry.action()) {
            case RELEASE -> {
                withdrawn.remove(entry.to());
                steps.add(entry.after());
            }
            case REVERT -> {
                if (!steps.isEmpty()) {
                    steps.remove(steps.size() - 1);
                }
            }
            case WITHDRAW -> {
                String model = entry.withdrawn().orElseThrow();
                List<Service> left = without(model);
                steps.clear();
                steps.addAll(left);
                withdrawn.put(model, entry);
            }
        }
    }

    /** What runs where, or empty where nothing was ever in service. */
    Optional<Service> now() {
        return steps.isEmpty() ? Optional.empty() : Optional.of(steps.get(steps.size() - 1));
    }

    /** What a revert leads to, or empty where there is nothing to go back to. */
    Optional<Service> before() {
        return steps.size() < 2 ? Optional.empty() : Optional.of(steps.get(steps.size() - 2));
    }

    /** What a withdrawal of this model leads to, or empty where it runs on the fleet and nothing can be put back. */
    Optional<Service> afterWithdrawing(String model) {
        List<Service> left = without(model);
        boolean fleetLeft = now().map(now -> !now.fleet().equals(model)).orElse(true) || !left.isEmpty();
        return fleetLeft && !left.isEmpty() ? Optional.of(left.get(left.size() - 1)) : Optional.empty();
    }

    /** The withdrawn models, each with the entry that withdrew it. */
    Map<String, ShelfEntry> withdrawn() {
        return Collections.unmodifiableMap(withdrawn);
    }

    private List<Service> without(String model) {
        List<Service> left = new ArrayList<>();
        for (Service step : steps) {
            Optional<Service> before = left.isEmpty() ? Optional.empty() : Optional.of(left.get(left.size() - 1));
            replaced(step, model, before)
                    .filter(service -> !before.equals(Optional.of(service)))
                    .ifPresent(left::add);
        }
        return left;
    }

    private static Optional<Service> replaced(Service step, String model, Optional<Service> before) {
        if (!step.runsAny(Set.of(model))) {
            return Optional.of(step);
        }
        if (step.fleet().equals(model) && before.isEmpty()) {
            return Optional.empty();
        }
        String fleet = step.fleet().equals(model) ? before.get().fleet() : step.fleet();
        SortedMap<String, String> sorters = new TreeMap<>(step.sorters());
        sorters.replaceAll((sorter, runs) ->
                runs.equals(model) ? before.map(service -> service.on(sorter)).orElse(fleet) : runs);
        if (step.fleet().equals(model)) {
            // What ran on single sorters below a withdrawn model of the fleet comes back with it.
            before.get().sorters().forEach((sorter, runs) -> sorters.putIfAbsent(sorter, runs));
        }
        return Optional.of(new Service(fleet, sorters));
    }
}
