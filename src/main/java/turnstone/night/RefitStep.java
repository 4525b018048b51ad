package turnstone.night;

import java.util.List;
import java.util.Optional;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.ledger.DayEntry;
import turnstone.ledger.Ledger;
import turnstone.plant.Plant;
import turnstone.refit.HeldOut;
import turnstone.refit.ModelMaker;
import turnstone.refit.Recipe;
import turnstone.refit.WindowSums;
import turnstone.shelf.Shelf;
import turnstone.shelf.ShelfEntry;

/** Makes candidates from the ledger and puts them on the shelf. */
public final class RefitStep {
    private RefitStep() {}

    /** One model for each recipe, from the same sums, axes turned to agree in sign with what is in service. */
    public static List<Model> make(
            Plant plant,
            Ledger ledger,
            List<DayEntry> days,
            List<Recipe> recipes,
            HeldOut heldOut,
            Optional<Model> inService) {
        WindowSums sums = WindowSums.read(ledger, days);
        ModelMaker maker = new ModelMaker(plant.materialNames(), plant.head(), plant.countScale());
        return recipes.stream()
                .map(recipe -> maker.make(recipe, sums, heldOut, inService).model())
                .toList();
    }

    /**
     * What is in service, checked against this plant's terms.
     *
     * @throws Fault of kind input where it is on another count scale, wavelength axis or head
     */
    public static Optional<Model> inService(Plant plant, Shelf shelf) {
        Optional<ShelfEntry> entry = shelf.inService();
        if (entry.isEmpty()) {
            return Optional.empty();
        }
        String fingerprint = entry.get().to();
        Model model = shelf.model(fingerprint)
                .map(node -> Model.read(node, "model " + fingerprint + " on the shelf"))
                .orElseThrow(() -> Fault.storage("the model in service is not on the shelf")
                        .at(shelf.describe())
                        .found("no model " + fingerprint)
                        .remedy("restore the shelf from a copy"));
        PlantTerms.require(plant, model, "the model in service");
        return Optional.of(model);
    }
}
