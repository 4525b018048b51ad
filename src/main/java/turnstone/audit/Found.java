package turnstone.audit;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.time.LocalDate;
import java.util.Collection;
import java.util.Collections;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalLong;
import java.util.SortedMap;
import java.util.SortedSet;
import java.util.TreeMap;
import java.util.TreeSet;
import turnstone.fault.Fault;
import turnstone.json.Json;

/**
 * The result of one audit.
 *
 * @param date of the run that was sampled
 * @param duty the duty's name
 * @param method bale or hand sort
 * @param stream which stream the masses are of
 * @param mass_kg mass found, by material; empty where only the valves were checked
 * @param valves what was found of the valves, if they were checked
 * @param models fingerprints of the models that the duty's sorters ran on that date
 * @param insteadOf number of the entry that this one corrects
 * @param note what else there is to say; may be empty
 */
public record Found(
        LocalDate date,
        String duty,
        Method method,
        Stream stream,
        SortedMap<String, Double> mass_kg,
        Optional<Valves> valves,
        SortedSet<String> models,
        OptionalLong insteadOf,
        String note) {
    /** How it was found. */
    public enum Method {
        /** A sampled bale. */
        BALE("bale"),
        /** A hand sort. */
        HAND_SORT("hand sort");

        private final String label;

        Method(String label) {
            this.label = label;
        }

        /** The word in files and messages. */
        public String label() {
            return label;
        }
    }

    /** What was sampled. */
    public enum Stream {
        /** The duty's product. */
        PRODUCT("product"),
        /** All else. */
        REST("rest");

        private final String label;

        Stream(String label) {
            this.label = label;
        }

        /** The word in files and messages. */
        public String label() {
            return label;
        }
    }

    /** Keeps copies, and refuses masses that can't be. */
    public Found {
        mass_kg = Collections.unmodifiableSortedMap(new TreeMap<>(mass_kg));
        models = Collections.unmodifiableSortedSet(new TreeSet<>(models));
        mass_kg.forEach((material, mass) -> {
            if (!(mass >= 0) || mass.isInfinite()) {
                throw Fault.usage("not a mass")
                        .at(material)
                        .found(String.valueOf(mass))
                        .expected("0 or more kilograms");
            }
        });
        if (mass_kg.isEmpty() && valves.isEmpty()) {
            throw Fault.usage("an audit needs masses by material, or a check of the valves");
        }
        if (!mass_kg.isEmpty() && !(sum(mass_kg, mass_kg.keySet()) > 0)) {
            throw Fault.usage("an audit of nothing").found("0 kg in all");
        }
    }

    /** All that was weighed, in kg. */
    public double total_kg() {
        return sum(mass_kg, mass_kg.keySet());
    }

    /** What was weighed of these materials, in kg. */
    public double of_kg(Collection<String> materials) {
        return sum(mass_kg, materials);
    }

    private static double sum(Map<String, Double> mass_kg, Collection<String> materials) {
        double sum = 0;
        for (String material : new TreeSet<>(materials)) {
            sum += mass_kg.getOrDefault(material, 0.0);
        }
        return sum;
    }

    /** As the journal holds it. */
    public ObjectNode json() {
        ObjectNode node = Json.object()
                .put("date", date.toString())
                .put("duty", duty)
                .put("method", method.label())
                .put("stream", stream.label());
        mass_kg.forEach(node.putObject("mass_kg")::put);
        valves.ifPresent(found -> node.set("valves", found.json()));
        node.putArray("models")
                .addAll(models.stream().map(Json.object()::textNode).toList());
        insteadOf.ifPresent(number -> node.put("insteadOf", number));
        return node.put("note", note);
    }

    static Found fromJson(JsonNode node) {
        SortedMap<String, Double> mass_kg = new TreeMap<>();
        node.required("mass_kg")
                .properties()
                .forEach(mass -> mass_kg.put(mass.getKey(), mass.getValue().doubleValue()));
        SortedSet<String> models = new TreeSet<>();
        node.required("models").forEach(model -> models.add(model.asText()));
        return new Found(
                LocalDate.parse(node.required("date").asText()),
                node.required("duty").asText(),
                method(node.required("method").asText()),
                stream(node.required("stream").asText()),
                mass_kg,
                node.has("valves") ? Optional.of(Valves.fromJson(node.get("valves"))) : Optional.empty(),
                models,
                node.has("insteadOf") ? OptionalLong.of(node.get("insteadOf").longValue()) : OptionalLong.empty(),
                node.required("note").asText());
    }

    private static Method method(String label) {
        for (Method method : Method.values()) {
            if (method.label.equals(label)) {
                return method;
            }
        }
        throw new IllegalArgumentException("no method is called " + label);
    }

    private static Stream stream(String label) {
        for (Stream stream : Stream.values()) {
            if (stream.label.equals(label)) {
                return stream;
            }
        }
        throw new IllegalArgumentException("no stream is called " + label);
    }
}
