package turnstone.decide;

import com.fasterxml.jackson.databind.JsonNode;
import java.util.ArrayList;
import java.util.List;

/** Pretreatment in words, from its JSON form: every setting is named, so nothing that was done can stay unsaid. */
final class PretreatmentWords {
    private PretreatmentWords() {}

    static String of(JsonNode node) {
        List<String> words = new ArrayList<>();
        collect(words, "", node);
        return words.isEmpty() ? "values as they come" : String.join("; ", words);
    }

    private static void collect(List<String> words, String name, JsonNode node) {
        if (node.isObject()) {
            node.properties().forEach(member -> collect(words, joined(name, member.getKey()), member.getValue()));
        } else if (node.isArray() && node.size() > 0 && node.get(0).isContainerNode()) {
            node.forEach(element -> collect(words, name, element));
        } else if (node.isArray()) {
            if (node.size() > 0) {
                words.add(name + " " + node.size() + " values, " + node.get(0).asText() + " to "
                        + node.get(node.size() - 1).asText());
            }
        } else if (!node.isNull() && !node.isMissingNode()) {
            words.add(name.isEmpty() ? node.asText() : name + " " + node.asText());
        }
    }

    private static String joined(String name, String key) {
        return name.isEmpty() ? key : name + " " + key;
    }
}
