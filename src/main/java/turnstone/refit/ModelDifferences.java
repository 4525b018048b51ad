package turnstone.refit;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.List;
import java.util.Set;
import java.util.TreeSet;
import turnstone.decide.Model;

/** What two models say differently, by field of the model file: the canonical content only, so none means the same fingerprint. */
public final class ModelDifferences {
    /**
     * A field with other content.
     *
     * @param name of the field, at the top of the model file
     * @param values that it has in either model
     * @param differing of them, those that differ or are in one model only
     * @param first where the first of those is, as a JSON pointer (RFC 6901)
     * @param stated what the first model has there
     * @param again what the second has there
     */
    public record Field(String name, int values, int differing, String first, String stated, String again) {}

    private static final String NOTHING = "nothing";

    private final List<String> pointers = new ArrayList<>();
    private final List<String> stated = new ArrayList<>();
    private final List<String> again = new ArrayList<>();
    private int values;

    private ModelDifferences() {}

    /** The fields that differ, in order of their names. */
    public static List<Field> of(Model stated, Model again) {
        ObjectNode left = canonical(stated);
        ObjectNode right = canonical(again);
        List<Field> fields = new ArrayList<>();
        for (String name : names(left, right)) {
            ModelDifferences differences = new ModelDifferences();
            differences.compare("/" + name, left.path(name), right.path(name));
            if (!differences.pointers.isEmpty()) {
                fields.add(new Field(
                        name,
                        differences.values,
                        differences.pointers.size(),
                        differences.pointers.get(0),
                        differences.stated.get(0),
                        differences.again.get(0)));
            }
        }
        return fields;
    }

    private static ObjectNode canonical(Model model) {
        ObjectNode content = model.json();
        content.remove("fingerprint");
        if (content.path("madeFrom") instanceof ObjectNode lineage) {
            lineage.remove("inputs");
        }
        content.path("countScale").path("channels").forEach(channel -> {
            if (channel instanceof ObjectNode object) {
                object.remove("precision");
            }
        });
        return content;
    }

    private static Set<String> names(JsonNode left, JsonNode right) {
        Set<String> names = new TreeSet<>();
        left.fieldNames().forEachRemaining(names::add);
        right.fieldNames().forEachRemaining(names::add);
        return names;
    }

    private void compare(String pointer, JsonNode left, JsonNode right) {
        if (left.isObject() && right.isObject()) {
            for (String name : names(left, right)) {
                compare(pointer + "/" + name.replace("~", "~0").replace("/", "~1"), left.path(name), right.path(name));
            }
        } else if (left.isArray() && right.isArray()) {
            for (int i = 0; i < Math.max(left.size(), right.size()); i++) {
                compare(pointer + "/" + i, left.path(i), right.path(i));
            }
        } else {
            values++;
            String one = text(left);
            String other = text(right);
            if (!one.equals(other)) {
                pointers.add(pointer);
                stated.add(one);
                again.add(other);
            }
        }
    }

    private static String text(JsonNode node) {
        return node.isMissingNode() ? NOTHING : node.toString();
    }
}
