package turnstone.plant;

import com.fasterxml.jackson.core.JsonPointer;
import com.fasterxml.jackson.databind.JsonNode;
import com.networknt.schema.Error;
import com.networknt.schema.Schema;
import com.networknt.schema.SchemaRegistry;
import com.networknt.schema.SpecificationVersion;
import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Set;
import java.util.stream.Collectors;
import turnstone.fault.Fault;
import turnstone.json.Json;

/** The form of a plant file: JSON Schema 2020-12 in {@code plant.schema.json}. */
final class PlantSchema {
    private static final String RESOURCE = "plant.schema.json";
    private static final String UNKNOWN = "additionalProperties";
    private static final String MISSING = "required";

    private final JsonNode form;
    private final Schema schema;

    private PlantSchema(JsonNode form) {
        this.form = form;
        this.schema = SchemaRegistry.withDefaultDialect(SpecificationVersion.DRAFT_2020_12)
                .getSchema(form);
    }

    static PlantSchema load() {
        try (InputStream stream = PlantSchema.class.getResourceAsStream(RESOURCE)) {
            if (stream == null) {
                throw new IllegalStateException(RESOURCE + " is not in the jar");
            }
            return new PlantSchema(Json.read(stream.readAllBytes(), RESOURCE));
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** Refuses a file that has not the form, at its first wrong line. */
    void check(PlantText text) {
        JsonNode root = text.root().node();
        List<Error> errors = new ArrayList<>(schema.validate(root));
        // A key that is missing where another is unknown is most likely the misspelt one.
        Set<String> misspelt = errors.stream()
                .filter(error -> error.getKeyword().equals(UNKNOWN))
                .map(PlantSchema::pointer)
                .collect(Collectors.toSet());
        errors.removeIf(error -> error.getKeyword().equals(MISSING) && misspelt.contains(pointer(error)));
        errors.sort(Comparator.comparingInt((Error error) -> text.line(place(error))));
        if (!errors.isEmpty()) {
            throw fault(errors.get(0), text);
        }
    }

    private static String pointer(Error error) {
        StringBuilder pointer = new StringBuilder();
        for (int i = 0; i < error.getInstanceLocation().getNameCount(); i++) {
            pointer.append('/')
                    .append(PlantText.escaped(
                            String.valueOf(error.getInstanceLocation().getElement(i))));
        }
        return pointer.toString();
    }

    /** Where the reader should look: the unknown key itself, else the value. */
    private static String place(Error error) {
        return error.getKeyword().equals(UNKNOWN)
                ? pointer(error) + "/" + PlantText.escaped(error.getProperty())
                : pointer(error);
    }

    private Fault fault(Error error, PlantText text) {
        JsonNode value = text.root().node().at(JsonPointer.compile(pointer(error)));
        String place = text.place(place(error));
        JsonNode holder = form.at(JsonPointer.compile(fragment(error)).head());
        return switch (error.getKeyword()) {
            case UNKNOWN -> unknownKey(error.getProperty(), holder).at(place);
            case MISSING ->
                Fault.usage("key `" + error.getProperty() + "` is missing").at(place);
            default -> wrongValue(error, holder, value).at(place).found(shown(value));
        };
    }

    private static String fragment(Error error) {
        return error.getSchemaLocation().getFragment().toString();
    }

    private static Fault unknownKey(String key, JsonNode holder) {
        List<String> known = new ArrayList<>();
        holder.path("properties").fieldNames().forEachRemaining(known::add);
        String nearest = Spelling.nearest(key, known);
        String what = "unknown key `" + key + "`";
        return Spelling.near(key, nearest)
                ? Fault.usage(what + ", did you mean `" + nearest + "`?")
                : Fault.usage(what).expected("one of " + String.join(", ", known));
    }

    private static Fault wrongValue(Error error, JsonNode holder, JsonNode value) {
        JsonNode limit = holder.path(error.getKeyword());
        return switch (error.getKeyword()) {
            case "type" -> {
                String expected =
                        holder.has("description") ? holder.get("description").asText() : types(limit);
                Fault fault = Fault.usage("wrong kind of value").expected(expected);
                boolean quotes = limit.asText().equals("string");
                yield quotes ? fault.remedy("put a text that looks like a number in quotes") : fault;
            }
            case "enum" -> unknownWord(value.asText(), limit);
            case "const" -> Fault.usage("not the value that stands here").expected(limit.asText());
            case "pattern" ->
                Fault.usage("not of the form that stands here")
                        .expected(holder.path("description").asText(limit.asText()));
            case "minimum" -> Fault.usage("too small").expected("at least " + limit.asText());
            case "exclusiveMinimum" -> Fault.usage("too small").expected("more than " + limit.asText());
            case "maximum" -> Fault.usage("too large").expected("at most " + limit.asText());
            case "exclusiveMaximum" -> Fault.usage("too large").expected("less than " + limit.asText());
            case "minItems" -> Fault.usage("too few values").expected("at least " + limit.asText());
            case "minLength" -> Fault.usage("empty text").expected("a text");
            case "minProperties" -> Fault.usage("too few keys").expected("at least " + limit.asText());
            case "maxProperties" -> Fault.usage("too many keys").expected("at most " + limit.asText());
            default -> Fault.usage(error.getMessage());
        };
    }

    private static Fault unknownWord(String word, JsonNode known) {
        List<String> words = new ArrayList<>();
        known.forEach(one -> words.add(one.asText()));
        String nearest = Spelling.nearest(word, words);
        String hint = Spelling.near(word, nearest) ? ", did you mean `" + nearest + "`?" : "";
        return Fault.usage("not a known word" + hint).expected("one of " + String.join(", ", words));
    }

    private static String types(JsonNode type) {
        return switch (type.asText()) {
            case "string" -> "a text";
            case "integer" -> "a whole number";
            case "number" -> "a number";
            case "array" -> "a list";
            case "object" -> "keys and values";
            default -> listed(type);
        };
    }

    private static String listed(JsonNode array) {
        List<String> words = new ArrayList<>();
        array.forEach(word -> words.add(word.asText()));
        return String.join(", ", words);
    }

    private static String shown(JsonNode value) {
        if (value.isObject()) {
            return value.size() + " keys";
        }
        if (value.isArray()) {
            return "a list of " + value.size();
        }
        return value.isTextual() ? "`" + value.textValue() + "`" : value.isNull() ? "nothing" : value.asText();
    }
}
