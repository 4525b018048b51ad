package turnstone.plant;

import com.fasterxml.jackson.core.JsonParser;
import com.fasterxml.jackson.core.JsonToken;
import com.fasterxml.jackson.core.exc.StreamReadException;
import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import com.fasterxml.jackson.dataformat.yaml.YAMLFactory;
import com.fasterxml.jackson.dataformat.yaml.YAMLParser;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.charset.CharacterCodingException;
import java.nio.file.Files;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.util.HashMap;
import java.util.Map;
import turnstone.fault.Fault;

/**
 * A plant file as values with the line of each.
 *
 * <p>Numbers are kept as the decimals that were written. Refused: a key given twice, an alias, a second document.
 */
final class PlantText {
    private static final YAMLFactory YAML = new YAMLFactory();
    private static final int DEEPEST = 32;

    private final String file;
    private final Map<String, Integer> lines = new HashMap<>();
    private JsonNode root = JsonNodeFactory.instance.missingNode();

    private PlantText(String file) {
        this.file = file;
    }

    /** Reads a plant file. */
    static PlantText read(Path path) {
        String content;
        try {
            content = Files.readString(path);
        } catch (NoSuchFileException e) {
            throw Fault.usage("there is no such plant file").at(path.toString()).because(e);
        } catch (CharacterCodingException e) {
            throw Fault.usage("the plant file is not UTF-8").at(path.toString()).because(e);
        } catch (IOException e) {
            throw Fault.storage("the plant file can't be read")
                    .at(path.toString())
                    .found(e.getMessage())
                    .because(e);
        }
        return parse(content, path.toString());
    }

    static PlantText parse(String content, String file) {
        PlantText text = new PlantText(file);
        try (YAMLParser parser = YAML.createParser(content)) {
            parser.nextToken();
            if (parser.currentToken() != JsonToken.START_OBJECT) {
                throw Fault.usage("a plant file is a list of keys and values").at(file);
            }
            text.root = text.value(parser, "", 0);
            if (parser.nextToken() != null) {
                throw Fault.usage("a plant file is one document")
                        .at(file + " line " + parser.currentTokenLocation().getLineNr())
                        .found("another");
            }
        } catch (StreamReadException e) {
            int line = e.getLocation() == null ? 0 : e.getLocation().getLineNr();
            throw Fault.usage("not valid YAML")
                    .at(file + (line > 0 ? " line " + line : ""))
                    .found(String.valueOf(e.getOriginalMessage())
                            .lines()
                            .findFirst()
                            .orElse(""))
                    .because(e);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        return text;
    }

    /** The whole file. */
    Entry root() {
        return new Entry(this, "", root);
    }

    /** The file, the line and the key path of a value, for messages. */
    String place(String pointer) {
        String keys = keyPath(pointer);
        return file + " line " + line(pointer) + (keys.isEmpty() ? "" : ", " + keys);
    }

    int line(String pointer) {
        return lines.getOrDefault(pointer, 1);
    }

    /** A key as one part of a pointer. */
    static String escaped(String key) {
        return key.replace("~", "~0").replace("/", "~1");
    }

    private static String keyPath(String pointer) {
        StringBuilder path = new StringBuilder();
        for (String part : pointer.split("/", -1)) {
            String key = part.replace("~1", "/").replace("~0", "~");
            if (key.matches("[0-9]+") && path.length() > 0) {
                path.append('[').append(Integer.parseInt(key) + 1).append(']');
            } else if (!key.isEmpty()) {
                path.append(path.length() == 0 ? "" : ".").append(key);
            }
        }
        return path.toString();
    }

    private JsonNode value(YAMLParser parser, String pointer, int depth) throws IOException {
        lines.putIfAbsent(pointer, parser.currentTokenLocation().getLineNr());
        if (parser.isCurrentAlias()) {
            throw Fault.usage("an alias is not allowed in a plant file")
                    .at(place(pointer))
                    .found("*" + parser.getText())
                    .remedy("write the value out");
        }
        if (depth > DEEPEST) {
            throw Fault.usage("values lie too deep inside each other").at(place(pointer));
        }
        JsonNodeFactory nodes = JsonNodeFactory.instance;
        return switch (parser.currentToken()) {
            case START_OBJECT -> object(parser, pointer, depth);
            case START_ARRAY -> array(parser, pointer, depth);
            case VALUE_NUMBER_INT -> nodes.numberNode(parser.getBigIntegerValue());
            case VALUE_NUMBER_FLOAT -> decimal(parser, nodes);
            case VALUE_TRUE, VALUE_FALSE -> nodes.booleanNode(parser.currentToken() == JsonToken.VALUE_TRUE);
            case VALUE_NULL -> nodes.nullNode();
            default -> nodes.textNode(parser.getText());
        };
    }

    private static JsonNode decimal(JsonParser parser, JsonNodeFactory nodes) throws IOException {
        return parser.isNaN() ? nodes.textNode(parser.getText()) : nodes.numberNode(parser.getDecimalValue());
    }

    private JsonNode object(YAMLParser parser, String pointer, int depth) throws IOException {
        ObjectNode object = JsonNodeFactory.instance.objectNode();
        while (parser.nextToken() != JsonToken.END_OBJECT) {
            String key = parser.currentName();
            String inside = pointer + "/" + escaped(key);
            int line = parser.currentTokenLocation().getLineNr();
            if (object.has(key)) {
                throw Fault.usage("key `" + key + "` is given twice")
                        .at(file + " line " + line + ", " + keyPath(inside))
                        .found("lines " + line(inside) + " and " + line)
                        .expected("one of them");
            }
            lines.put(inside, line);
            parser.nextToken();
            object.set(key, value(parser, inside, depth + 1));
        }
        return object;
    }

    private JsonNode array(YAMLParser parser, String pointer, int depth) throws IOException {
        ArrayNode array = JsonNodeFactory.instance.arrayNode();
        while (parser.nextToken() != JsonToken.END_ARRAY) {
            array.add(value(parser, pointer + "/" + array.size(), depth + 1));
        }
        return array;
    }
}
