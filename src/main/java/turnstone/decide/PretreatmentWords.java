package turnstone.decide;

import com.fasterxml.jackson.databind.JsonNode;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Set;

/** Pretreatment in words, from its JSON form, in the order of the steps; a key that has no words here is named as it stands. */
final class PretreatmentWords {
    private static final double MILLISECONDS_PER_HOUR = 3_600_000;
    private static final Set<String> WORDED = Set.of(
            "input",
            "channels",
            "axis_nm",
            "resampled",
            "saturatedAt",
            "deadAtOrBelow",
            "maxWhiteAge_ms",
            "maxDarkAge_ms",
            "floor",
            "noSignalBelow",
            "logarithm",
            "mask",
            "snvSpreadFloor",
            "steps");

    private final List<String> words = new ArrayList<>();

    private PretreatmentWords() {}

    static String of(JsonNode node) {
        PretreatmentWords said = new PretreatmentWords();
        said.head(node);
        node.path("steps").forEach(said::step);
        node.properties().forEach(member -> {
            if (!WORDED.contains(member.getKey())) {
                JsonNode value = member.getValue();
                said.words.add(member.getKey() + " " + (value.isValueNode() ? value.asText() : value.toString()));
            }
        });
        return said.words.isEmpty() ? "values as they come" : String.join("; ", said.words);
    }

    private void head(JsonNode node) {
        say(node, "input", "", "");
        say(node, "channels", "", " channels");
        JsonNode axis = node.path("axis_nm");
        if (axis.size() > 0) {
            words.add((node.path("resampled").asBoolean() ? "resampled to " : "on ") + axis.size() + " wavelengths, "
                    + axis.get(0).asText() + " to " + axis.get(axis.size() - 1).asText() + " nm");
        }
        say(node, "saturatedAt", "saturated at ", "");
        say(node, "deadAtOrBelow", "dead at or below ", "");
        age(node, "maxWhiteAge_ms", "white");
        age(node, "maxDarkAge_ms", "dark");
        say(node, "floor", "floor ", "");
        say(node, "noSignalBelow", "no signal below ", "");
        say(node, "logarithm", "", "");
        node.path("mask").forEach(this::drop);
        say(node, "snvSpreadFloor", "SNV with spread at least ", "");
    }

    private void step(JsonNode step) {
        String kind = step.path("step").asText();
        if (kind.equals("savitzky-golay")) {
            words.add("Savitzky–Golay over " + step.path("window").asText() + " channels, order "
                    + step.path("order").asText() + ", derivative "
                    + step.path("derivative").asText());
        } else if (kind.equals("bins")) {
            words.add("bins of " + step.path("width").asText());
        } else {
            drop(step);
        }
    }

    private void drop(JsonNode range) {
        words.add(
                range.has("from_nm")
                        ? "without " + range.path("from_nm").asText() + " to "
                                + range.path("to_nm").asText() + " nm"
                        : "without channels " + range.path("fromChannel").asText() + " to "
                                + range.path("toChannel").asText());
    }

    private void say(JsonNode node, String key, String before, String after) {
        if (node.hasNonNull(key)) {
            words.add(before + node.path(key).asText() + after);
        }
    }

    private void age(JsonNode node, String key, String reference) {
        if (node.hasNonNull(key)) {
            words.add(String.format(
                    Locale.ROOT,
                    "%s at most %.1f h old",
                    reference,
                    node.path(key).doubleValue() / MILLISECONDS_PER_HOUR));
        }
    }
}
