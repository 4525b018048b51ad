package turnstone.night;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.List;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.plant.Plant;

/** What a model must share with a plant to run in it: count scale, wavelength axis, pretreatment head. */
public final class PlantTerms {
    private static final String REMEDY = "use the plant file that it was made with, or another shelf";

    private PlantTerms() {}

    /**
     * Makes sure that a model fits the plant.
     *
     * @param role what the model is, for the message, such as {@code "the model in service"}
     * @throws Fault of kind input, naming the first difference, where it does not
     */
    public static void require(Plant plant, Model model, String role) {
        String place = "model " + Words.shortened(model.fingerprint());
        List<String> differences = plant.countScale().differences(model.countScale());
        if (!differences.isEmpty()) {
            throw Fault.input(role + " is on another count scale than the plant file")
                    .at(place)
                    .found(differences.get(0)
                            + (differences.size() > 1 ? " and " + (differences.size() - 1) + " more" : ""))
                    .remedy(REMEDY);
        }
        JsonNode theirs = model.pretreatment().path("head");
        JsonNode ours = plant.head().json();
        if (!same(theirs.path("axis_nm"), ours.path("axis_nm"))) {
            throw Fault.input(role + " is on another wavelength axis than the plant file")
                    .at(place)
                    .found(axis(theirs.path("axis_nm")))
                    .expected(axis(ours.path("axis_nm")))
                    .remedy(REMEDY);
        }
        if (!same(theirs, ours)) {
            throw Fault.input(role + " was made with another pretreatment head than the plant file's")
                    .at(place)
                    .found(theirs)
                    .expected(ours)
                    .remedy(REMEDY);
        }
    }

    /** By canonical form: a number read from a file is the same number as one that never was in a file. */
    private static boolean same(JsonNode left, JsonNode right) {
        return Json.fingerprint(content(left)).equals(Json.fingerprint(content(right)));
    }

    private static ObjectNode content(JsonNode node) {
        ObjectNode content = Json.object();
        if (!node.isMissingNode()) {
            content.set("content", node);
        }
        return content;
    }

    private static String axis(JsonNode axis_nm) {
        return axis_nm.isEmpty()
                ? "none"
                : axis_nm.size() + " channels from " + axis_nm.get(0) + " to " + axis_nm.get(axis_nm.size() - 1)
                        + " nm";
    }
}
