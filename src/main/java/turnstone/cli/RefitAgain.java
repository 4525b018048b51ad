package turnstone.cli;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.List;
import java.util.Optional;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.ledger.Ledger;
import turnstone.night.Places;
import turnstone.night.Words;
import turnstone.plant.Plant;
import turnstone.refit.Again;
import turnstone.refit.ModelDifferences;

/** {@code refit --again}: the same numbers, or what differs. */
final class RefitAgain {
    private RefitAgain() {}

    /**
     * Makes the model anew and prints the outcome.
     *
     * @throws Fault of kind input where other numbers come out
     */
    static void run(Console console, CommonOptions common, Plant plant, Model model) {
        Ledger ledger = Places.ledger(plant);
        console.talk().phase("make " + Words.shortened(model.fingerprint()) + " again");
        Model again = Again.make(plant.materialNames(), ledger, model, guide(plant, model));
        console.talk().done("made again from " + model.madeFrom().days().size() + " days of " + ledger.describe());
        List<ModelDifferences.Field> fields = ModelDifferences.of(model, again);
        if (common.json) {
            console.json(json(model, again, fields));
        } else if (fields.isEmpty()) {
            console.say("same numbers: " + model.fingerprint());
        } else {
            console.say("other numbers: stated " + Words.shortened(model.fingerprint()) + ", made again "
                    + Words.shortened(again.fingerprint()));
            for (ModelDifferences.Field field : fields) {
                console.say(
                        "  " + field.name() + ": " + field.differing() + " of " + field.values() + " values differ");
                console.say("    first at " + field.first() + ": stated " + field.stated() + ", made again "
                        + field.again());
            }
        }
        if (!fields.isEmpty()) {
            throw Fault.input("made again, the model has other numbers")
                    .at("model " + Words.shortened(model.fingerprint()))
                    .found(fields.size() + (fields.size() == 1 ? " field that differs" : " fields that differ"))
                    .remedy(
                            "use the plant file and the version of the program that made it, or refit and try the new one");
        }
    }

    private static Optional<Model> guide(Plant plant, Model model) {
        return model.orientedTo()
                .map(fingerprint -> Places.shelf(plant)
                        .model(fingerprint)
                        .map(node -> Model.read(node, "model " + fingerprint))
                        .orElseThrow(() -> Fault.input("the model that its axes are oriented to is not on the shelf")
                                .at(plant.shelf())
                                .found("no model " + fingerprint)
                                .remedy("use the shelf that it was made beside")));
    }

    private static ObjectNode json(Model model, Model again, List<ModelDifferences.Field> fields) {
        ObjectNode node = Json.object()
                .put("same", fields.isEmpty())
                .put("stated", model.fingerprint())
                .put("again", again.fingerprint());
        ArrayNode list = node.putArray("fields");
        fields.forEach(field -> list.addObject()
                .put("name", field.name())
                .put("values", field.values())
                .put("differing", field.differing())
                .put("first", field.first())
                .put("stated", field.stated())
                .put("again", field.again()));
        return node;
    }
}
