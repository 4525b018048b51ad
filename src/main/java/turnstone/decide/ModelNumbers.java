package turnstone.decide;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import turnstone.json.Json;

/** Numbers of a model file, checked for shape and finiteness on the way in. */
final class ModelNumbers {
    private ModelNumbers() {}

    static double number(JsonNode node, String key) {
        if (!node.isNumber() || !Double.isFinite(node.doubleValue())) {
            throw new IllegalArgumentException(key + " is not a finite number: " + node);
        }
        return node.doubleValue();
    }

    static double[] vector(JsonNode node, int length, String key) {
        if (!node.isArray() || node.size() != length) {
            throw new IllegalArgumentException(key + " is not a list of " + length + " numbers");
        }
        double[] values = new double[length];
        for (int i = 0; i < length; i++) {
            values[i] = number(node.get(i), key);
        }
        return values;
    }

    static double[][] matrix(JsonNode node, int rows, int columns, String key) {
        if (!node.isArray() || node.size() != rows) {
            throw new IllegalArgumentException(key + " is not a list of " + rows + " rows");
        }
        double[][] values = new double[rows][];
        for (int i = 0; i < rows; i++) {
            values[i] = vector(node.get(i), columns, key);
        }
        return values;
    }

    static ArrayNode json(double[][] rows) {
        ArrayNode node = Json.array();
        for (double[] row : rows) {
            node.add(Json.array(row));
        }
        return node;
    }

    static double[][] copy(double[][] rows) {
        double[][] copy = new double[rows.length][];
        for (int i = 0; i < rows.length; i++) {
            copy[i] = rows[i].clone();
        }
        return copy;
    }
}
