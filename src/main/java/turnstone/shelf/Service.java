package turnstone.shelf;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.Collection;
import java.util.Collections;
import java.util.Set;
import java.util.SortedMap;
import java.util.SortedSet;
import java.util.TreeMap;
import java.util.TreeSet;
import turnstone.json.Json;

/**
 * Which model runs where.
 *
 * @param fleet fingerprint of the model that every sorter runs which is not named
 * @param sorters fingerprints of the models that single sorters run instead, by sorter; none of them is the fleet's
 */
public record Service(String fleet, SortedMap<String, String> sorters) {
    /** Keeps a copy, without the sorters that run the fleet's model. */
    public Service {
        if (!Fingerprints.isWhole(fleet) || !sorters.values().stream().allMatch(Fingerprints::isWhole)) {
            throw new IllegalArgumentException("not fingerprints of models: " + fleet + ", " + sorters);
        }
        SortedMap<String, String> others = new TreeMap<>(sorters);
        others.values().removeIf(fleet::equals);
        sorters = Collections.unmodifiableSortedMap(others);
    }

    /** All sorters run the same. */
    static Service whole(String fleet) {
        return new Service(fleet, Collections.emptySortedMap());
    }

    /** Whether all sorters run the same model. */
    public boolean isWhole() {
        return sorters.isEmpty();
    }

    /** The fingerprint of the model that a sorter runs. */
    public String on(String sorter) {
        return sorters.getOrDefault(sorter, fleet);
    }

    /** The fingerprints of all models that run somewhere. */
    public SortedSet<String> models() {
        SortedSet<String> models = new TreeSet<>(sorters.values());
        models.add(fleet);
        return models;
    }

    /** The same with another model on these sorters. */
    Service with(Collection<String> named, String model) {
        SortedMap<String, String> others = new TreeMap<>(sorters);
        named.forEach(sorter -> others.put(sorter, model));
        return new Service(fleet, others);
    }

    /** The sorters named here or there that run another model there. */
    SortedSet<String> differences(Service other) {
        SortedSet<String> differing = new TreeSet<>(sorters.keySet());
        differing.addAll(other.sorters.keySet());
        differing.removeIf(sorter -> on(sorter).equals(other.on(sorter)));
        return differing;
    }

    /** {@code {"fleet", "sorters": {sorter: fingerprint}}}. */
    public ObjectNode json() {
        ObjectNode node = Json.object().put("fleet", fleet);
        sorters.forEach(node.putObject("sorters")::put);
        return node;
    }

    static Service fromJson(JsonNode node) {
        SortedMap<String, String> sorters = new TreeMap<>();
        node.path("sorters")
                .properties()
                .forEach(
                        sorter -> sorters.put(sorter.getKey(), sorter.getValue().asText()));
        return new Service(node.path("fleet").asText(), sorters);
    }

    /** Whether a model runs anywhere among these. */
    boolean runsAny(Set<String> models) {
        return !Collections.disjoint(models(), models);
    }
}
