package turnstone.plant;

import com.fasterxml.jackson.databind.JsonNode;
import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.function.Supplier;
import turnstone.fault.Fault;

/** One value of the plant file with its place, so that a refusal can name the file, the line and the key. */
final class Entry {
    private final PlantText text;
    private final String pointer;
    private final JsonNode node;

    Entry(PlantText text, String pointer, JsonNode node) {
        this.text = text;
        this.pointer = pointer;
        this.node = node;
    }

    JsonNode node() {
        return node;
    }

    boolean has(String key) {
        return node.has(key);
    }

    /** The value of a key, empty where the key is left out. */
    Optional<Entry> optional(String key) {
        return node.has(key)
                ? Optional.of(new Entry(text, pointer + "/" + PlantText.escaped(key), node.get(key)))
                : Optional.empty();
    }

    /** The value of a key that must be there. */
    Entry at(String key) {
        return optional(key).orElseThrow(() -> fault("key `" + key + "` is missing"));
    }

    /** The one of these keys that is there. */
    String oneOf(String... keys) {
        List<String> there = new ArrayList<>();
        for (String key : keys) {
            if (node.has(key)) {
                there.add(key);
            }
        }
        if (there.size() != 1) {
            throw fault("needs one of the keys " + String.join(", ", keys))
                    .found(there.isEmpty() ? "none of them" : String.join(" and ", there))
                    .expected("one");
        }
        return there.get(0);
    }

    /** The values of a list, in order. */
    List<Entry> items() {
        List<Entry> items = new ArrayList<>();
        for (int i = 0; i < node.size(); i++) {
            items.add(new Entry(text, pointer + "/" + i, node.get(i)));
        }
        return items;
    }

    /** The values of a list of texts. */
    List<String> texts() {
        return items().stream().map(Entry::text).toList();
    }

    /** The keys of an object, in order. */
    List<String> keys() {
        List<String> keys = new ArrayList<>();
        node.fieldNames().forEachRemaining(keys::add);
        return keys;
    }

    String text() {
        return node.textValue();
    }

    Optional<String> text(String key) {
        return optional(key).map(Entry::text);
    }

    String text(String key, String otherwise) {
        return text(key).orElse(otherwise);
    }

    /** Whether a switch is on; empty where it is left out. YAML reads on, yes and true alike. */
    Optional<Boolean> on(String key) {
        return optional(key).map(entry -> entry.node.booleanValue());
    }

    double number() {
        double value = node.doubleValue();
        if (!Double.isFinite(value)) {
            throw fault("is not a finite number").found(node.asText());
        }
        return value;
    }

    double number(String key, double otherwise) {
        return optional(key).map(Entry::number).orElse(otherwise);
    }

    BigDecimal decimal() {
        return node.decimalValue();
    }

    int whole() {
        if (!node.canConvertToExactIntegral() || !node.canConvertToInt()) {
            throw fault("is not a whole number in range").found(node.asText());
        }
        return node.intValue();
    }

    int whole(String key, int otherwise) {
        return optional(key).map(Entry::whole).orElse(otherwise);
    }

    /** A refusal at this place. */
    Fault fault(String what) {
        return Fault.usage(what).at(text.place(pointer));
    }

    /** What comes of a value whose own checks don't know the plant file: their refusals are put at this place. */
    <T> T checked(Supplier<T> value) {
        try {
            return value.get();
        } catch (Fault refusal) {
            throw refusal.at(text.place(pointer));
        }
    }
}
