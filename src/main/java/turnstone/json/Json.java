package turnstone.json;

import com.fasterxml.jackson.core.JsonProcessingException;
import com.fasterxml.jackson.core.StreamReadFeature;
import com.fasterxml.jackson.core.StreamWriteFeature;
import com.fasterxml.jackson.databind.DeserializationFeature;
import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import com.fasterxml.jackson.databind.SerializationFeature;
import com.fasterxml.jackson.databind.json.JsonMapper;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.HexFormat;
import java.util.Map;
import java.util.TreeMap;
import turnstone.fault.Fault;

/**
 * Reading and writing of JSON, the same bytes on every JVM.
 *
 * <p>Doubles are written as their shortest round-trip decimals by Jackson's own formatter: {@code Double.toString} gives other digits
 * before Java 19 than from then on. Canonical form: keys in code-point order, no white space, UTF-8.
 */
public final class Json {
    private static final ObjectMapper MAPPER = JsonMapper.builder()
            .enable(StreamWriteFeature.USE_FAST_DOUBLE_WRITER)
            .enable(StreamReadFeature.STRICT_DUPLICATE_DETECTION)
            .enable(DeserializationFeature.FAIL_ON_TRAILING_TOKENS)
            .enable(SerializationFeature.INDENT_OUTPUT)
            .build();

    private Json() {}

    /** A new empty object. */
    public static ObjectNode object() {
        return JsonNodeFactory.instance.objectNode();
    }

    /** A new empty array. */
    public static ArrayNode array() {
        return JsonNodeFactory.instance.arrayNode();
    }

    /** An array of numbers, in order. */
    public static ArrayNode array(double[] values) {
        ArrayNode node = array();
        for (double value : values) {
            node.add(value);
        }
        return node;
    }

    /** The numbers of an array node, in order. */
    public static double[] doubles(JsonNode array) {
        double[] values = new double[array.size()];
        for (int i = 0; i < values.length; i++) {
            values[i] = array.get(i).doubleValue();
        }
        return values;
    }

    /**
     * Reads one JSON value.
     *
     * @param place what is being read, for the message
     * @throws Fault of kind storage where the bytes are not one JSON value
     */
    public static JsonNode read(byte[] utf8, String place) {
        try {
            return MAPPER.readTree(utf8);
        } catch (IOException e) {
            throw Fault.storage("not valid JSON")
                    .at(place)
                    .found(String.valueOf(e.getMessage()).lines().findFirst().orElse(""))
                    .because(e);
        }
    }

    /** For people and diff: indented, keys in the order given, a newline at the end. */
    public static byte[] pretty(JsonNode node) {
        try {
            return (MAPPER.writeValueAsString(node) + "\n").getBytes(StandardCharsets.UTF_8);
        } catch (JsonProcessingException e) {
            throw new IllegalStateException(e);
        }
    }

    /** For digests: keys in code-point order, no white space. */
    public static byte[] canonical(JsonNode node) {
        try {
            return MAPPER.writer().without(SerializationFeature.INDENT_OUTPUT).writeValueAsBytes(sorted(node));
        } catch (JsonProcessingException e) {
            throw new IllegalStateException(e);
        }
    }

    /** SHA-256 of the canonical form, 64 lower-case hexadecimal digits. */
    public static String fingerprint(JsonNode node) {
        return sha256(canonical(node));
    }

    /** SHA-256, 64 lower-case hexadecimal digits. */
    public static String sha256(byte[] content) {
        try {
            return HexFormat.of().formatHex(MessageDigest.getInstance("SHA-256").digest(content));
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException(e);
        }
    }

    private static JsonNode sorted(JsonNode node) {
        if (node.isObject()) {
            Map<String, JsonNode> members = new TreeMap<>();
            node.properties().forEach(member -> members.put(member.getKey(), sorted(member.getValue())));
            ObjectNode result = object();
            members.forEach(result::set);
            return result;
        }
        if (node.isArray()) {
            ArrayNode result = array();
            node.forEach(element -> result.add(sorted(element)));
            return result;
        }
        return node;
    }
}
