package turnstone.trial;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.OptionalDouble;
import turnstone.json.Json;

/** Pieces of the verdict file that several records share. */
final class VerdictJson {
    private VerdictJson() {}

    /** A number, or null where there is none. */
    static void put(ObjectNode node, String key, OptionalDouble value) {
        if (value.isPresent()) {
            node.put(key, value.getAsDouble());
        } else {
            node.putNull(key);
        }
    }

    static ObjectNode figure(FigureLine line) {
        Estimate estimate = line.estimate();
        ObjectNode node = Json.object();
        node.put("form", line.form().label()).put("side", line.side().label()).put("figure", line.figureName());
        node.put("of", line.reach().label());
        put(node, "found", estimate.point());
        put(node, "lower", estimate.lower());
        put(node, "upper", estimate.upper());
        node.put("confidence", estimate.confidence());
        put(node, "degreesOfFreedom", estimate.degreesOfFreedom());
        node.put("showings", estimate.showings());
        if (!estimate.note().isEmpty()) {
            node.put("note", estimate.note());
        }
        return node;
    }
}
