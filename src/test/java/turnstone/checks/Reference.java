package turnstone.checks;

import static org.assertj.core.api.Assertions.assertThat;

import com.fasterxml.jackson.databind.JsonNode;
import java.io.IOException;
import java.io.InputStream;
import java.math.BigDecimal;
import java.math.MathContext;
import java.util.ArrayList;
import java.util.List;
import turnstone.decide.Model;
import turnstone.json.Json;

/**
 * What a set must give, computed apart from this program in 640-bit arithmetic; source and method stand in each file of {@code checks}.
 *
 * @param name of the file
 * @param json its content
 */
record Reference(String name, JsonNode json) {
    private static final double BOUND = 1e-12;

    static Reference of(String name) throws IOException {
        return new Reference(name, file(name));
    }

    static JsonNode file(String name) throws IOException {
        try (InputStream in = Reference.class.getResourceAsStream("/checks/" + name + ".json")) {
            return Json.read(in.readAllBytes(), name);
        }
    }

    /** The largest relative error of a Fisher ratio; the reference has 40 digits. */
    double ratioError(double[] found) {
        JsonNode expected = json.path("eigenvalues_40_digits");
        double largest = 0;
        for (int a = 0; a < found.length; a++) {
            BigDecimal exact = new BigDecimal(expected.get(a).textValue());
            BigDecimal error = new BigDecimal(found[a]).subtract(exact).divide(exact, MathContext.DECIMAL64);
            largest = Math.max(largest, Math.abs(error.doubleValue()));
        }
        return largest;
    }

    /** Ratios, shares and Wilks' lambda, the last read from the file. */
    void requireFigures(Model model) {
        assertThat(model.fisherRatios()).hasSameSizeAs(Json.doubles(json.path("eigenvalues")));
        assertThat(ratioError(model.fisherRatios()))
                .as("relative error of the Fisher ratios of %s", name)
                .isLessThan(BOUND);
        Close.relative("shares of " + name, model.fisherShares(), Json.doubles(json.path("shares")), BOUND);
        double[] wilks = {model.json().path("wilks").doubleValue()};
        Close.relative(
                "Wilks' lambda of " + name,
                wilks,
                new double[] {json.path("wilks").doubleValue()},
                BOUND);
        long[] records = model.materials().stream()
                .mapToLong(material -> material.records())
                .toArray();
        assertThat(records)
                .containsExactly(json.path("counts")
                        .valueStream()
                        .mapToLong(JsonNode::asLong)
                        .toArray());
        assertThat(model.materials().stream().map(material -> material.name()).toList())
                .isEqualTo(classes());
    }

    List<String> classes() {
        return json.path("classes").valueStream().map(JsonNode::textValue).toList();
    }

    /** The text of {@code tally.csv} for a table of counts by truth and decision. */
    static String tally(List<String> classes, JsonNode counts) {
        StringBuilder text = new StringBuilder("truth,decided,count\n");
        for (int t = 0; t < classes.size(); t++) {
            for (int k = 0; k < classes.size(); k++) {
                long records = counts.path(t).path(k).asLong();
                if (records > 0) {
                    text.append(classes.get(t))
                            .append(',')
                            .append(classes.get(k))
                            .append(',')
                            .append(records)
                            .append('\n');
                }
            }
        }
        return text.toString();
    }

    /** The tally of a part: {@code resubstitution} or {@code test}. */
    String tally(String part) {
        JsonNode counts = json.path(part).path("confusion_truth_by_decided");
        assertThat(counts.size()).isEqualTo(classes().size());
        return tally(classes(), counts);
    }

    /** Errors of a part by the number of axes kept, from 1 on. */
    List<Integer> errorsByAxes(String part) {
        List<Integer> errors = new ArrayList<>();
        json.path(part).path("errors_by_rank_1_to_r").forEach(node -> errors.add(node.intValue()));
        return errors;
    }
}
