package turnstone.plant;

import java.util.List;
import java.util.Map;
import java.util.Optional;

/** Reads the recipe of a refit. */
final class RefitReader {
    private static final int USUAL_WINDOW_DAYS = 28;
    private static final double USUAL_RIDGE = 1e-4;
    private static final double USUAL_UNFAMILIAR_SHARE = 0.01;

    private RefitReader() {}

    static RefitRecipe recipe(Entry root, List<String> materials, DutyReader shares) {
        Optional<Entry> refit = root.optional("refit");
        return new RefitRecipe(
                refit.map(entry -> entry.whole("window_days", USUAL_WINDOW_DAYS))
                        .orElse(USUAL_WINDOW_DAYS),
                balance(refit.flatMap(entry -> entry.optional("balance"))),
                refit.flatMap(entry -> entry.optional("ridge"))
                        .map(RefitReader::ridge)
                        .orElse(new RefitRecipe.Ridge.Ladder(List.of(USUAL_RIDGE))),
                refit.map(entry -> entry.whole("rank", 0)).orElse(0),
                refit.flatMap(entry -> entry.optional("decisionPrior"))
                        .map(entry -> prior(entry, materials, shares))
                        .orElse(new RefitRecipe.Prior.Equal()),
                refit.map(entry -> entry.number("unfamiliarShare", USUAL_UNFAMILIAR_SHARE))
                        .orElse(USUAL_UNFAMILIAR_SHARE));
    }

    private static RefitRecipe.Balance balance(Optional<Entry> balance) {
        return new RefitRecipe.Balance(weighting(balance, "instruments"), weighting(balance, "materials"));
    }

    private static RefitRecipe.Weighting weighting(Optional<Entry> balance, String key) {
        return RefitRecipe.Weighting.of(
                balance.flatMap(entry -> entry.text(key)).orElse("equal"));
    }

    private static RefitRecipe.Ridge ridge(Entry entry) {
        if (entry.node().isTextual()) {
            return new RefitRecipe.Ridge.Analytic();
        }
        if (entry.node().isNumber()) {
            return new RefitRecipe.Ridge.Ladder(List.of(entry.number()));
        }
        List<Double> rungs = entry.items().stream().map(Entry::number).toList();
        for (int i = 1; i < rungs.size(); i++) {
            if (rungs.get(i) <= rungs.get(i - 1)) {
                throw entry.items()
                        .get(i)
                        .fault("the rungs of a ridge ladder must ascend")
                        .found(rungs.get(i) + " after " + rungs.get(i - 1));
            }
        }
        return new RefitRecipe.Ridge.Ladder(rungs);
    }

    private static RefitRecipe.Prior prior(Entry entry, List<String> materials, DutyReader shares) {
        if (entry.node().isTextual()) {
            return entry.text().equals("equal") ? new RefitRecipe.Prior.Equal() : new RefitRecipe.Prior.AsCounted();
        }
        Map<String, Double> listed = shares.shares(entry);
        for (String material : materials) {
            if (!listed.containsKey(material)) {
                throw entry.fault("a decision prior needs a share for every material")
                        .found("none for " + material);
            }
        }
        return new RefitRecipe.Prior.Listed(listed);
    }
}
