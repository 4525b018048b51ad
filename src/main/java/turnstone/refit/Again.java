package turnstone.refit;

import com.fasterxml.jackson.databind.JsonNode;
import java.util.List;
import java.util.Optional;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.ledger.Ledger;

/** Makes a model anew from the ledger days, the recipe and the left-out parts that it states, to see whether the same numbers come out. */
public final class Again {
    private Again() {}

    /**
     * The model, made anew.
     *
     * @param materials all the plant's, in order; head and count scale are the ledger's
     * @param guide the model that the axes of {@code model} are oriented to, where it states one
     * @throws Fault of kind input where the model states no recipe, or the ledger does not hold its days as they were
     */
    public static Model make(List<String> materials, Ledger ledger, Model model, Optional<Model> guide) {
        String place = "model " + model.fingerprint();
        JsonNode stated = model.recipe()
                .orElseThrow(() -> Fault.input("this model was made from a table, not from a ledger")
                        .at(place)
                        .remedy("make it again with fit, from the table"));
        if (!model.orientedTo().equals(guide.map(Model::fingerprint))) {
            throw new IllegalArgumentException(
                    place + " is oriented to " + model.orientedTo() + ", not to " + guide.map(Model::fingerprint));
        }
        WindowSums sums = WindowSums.read(ledger, Window.of(ledger, model));
        return new ModelMaker(materials, ledger.head(), ledger.countScale())
                .make(Recipe.fromJson(stated, place), sums, HeldOut.fromRecipe(stated), guide)
                .model();
    }
}
