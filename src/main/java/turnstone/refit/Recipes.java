package turnstone.refit;

import java.util.List;
import java.util.OptionalDouble;
import turnstone.plant.Plant;
import turnstone.plant.RefitRecipe;
import turnstone.plant.RefitRecipe.Ridge;

/** The recipes that a plant file asks for: one for each rung of its ladder of ridges. */
public final class Recipes {
    private Recipes() {}

    /** At least one; in the order of the ladder. */
    public static List<Recipe> of(Plant plant) {
        RefitRecipe wanted = plant.refit();
        if (wanted.ridge() instanceof Ridge.Ladder ladder) {
            return ladder.rungs().stream()
                    .map(rung -> recipe(plant, OptionalDouble.of(rung)))
                    .toList();
        }
        return List.of(recipe(plant, OptionalDouble.empty()));
    }

    private static Recipe recipe(Plant plant, OptionalDouble ridge) {
        RefitRecipe wanted = plant.refit();
        return new Recipe(
                wanted.window_days(),
                wanted.balance(),
                ridge,
                plant.tail(),
                wanted.rank(),
                wanted.decisionPrior(),
                wanted.unfamiliarShare());
    }
}
