package turnstone.refit;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.SortedMap;
import java.util.SortedSet;
import java.util.TreeMap;
import java.util.TreeSet;
import turnstone.decide.MadeFrom;
import turnstone.decide.Model;
import turnstone.decide.ModelContext;
import turnstone.fault.Fault;
import turnstone.fisher.Cell;
import turnstone.fisher.Fit;
import turnstone.fisher.FitRequest;
import turnstone.fisher.Orientation;
import turnstone.fisher.Ridge;
import turnstone.fisher.RoundedSource;
import turnstone.json.Json;
import turnstone.ledger.LedgerKey;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.Tail;
import turnstone.plant.RefitRecipe.Prior;
import turnstone.plant.RefitRecipe.Weighting;

/**
 * Makes models from sums by a recipe: the plant's coefficients, and the same without a tray group or an instrument.
 *
 * <p>A model is a function of the recipe, the sums, the head, the count scale and the order of the materials, and of nothing else.
 */
public final class ModelMaker {
    private static final String SCOPE = "fleet";

    private final List<String> materials;
    private final HeadSpec head;
    private final CountScale scale;
    private final List<String> channels;

    /**
     * A maker for one plant.
     *
     * @param materials all the plant's materials; their order breaks ties
     * @param head what the records went through before they were counted
     * @param scale what they were counted with
     */
    public ModelMaker(List<String> materials, HeadSpec head, CountScale scale) {
        this.materials = List.copyOf(materials);
        this.head = head;
        this.scale = scale;
        this.channels = channelNames(head);
    }

    /**
     * A model and what could not be left out of it.
     *
     * @param model the coefficients
     * @param keptWhole materials that have no records but those to be left out: they were kept, so the model has seen what it should not,
     *     and must not judge them
     */
    public record Made(Model model, SortedSet<String> keptWhole) {}

    /**
     * Fits.
     *
     * @throws Fault of kind input where the sums can't be fitted: singular, rounding noise, fewer than two materials
     */
    public Made make(Recipe recipe, WindowSums sums, HeldOut heldOut) {
        return make(recipe, sums, heldOut, Optional.empty());
    }

    /** As {@link #make(Recipe, WindowSums, HeldOut)}, with the signs of the axes turned to agree with another model. */
    public Made make(Recipe recipe, WindowSums sums, HeldOut heldOut, Optional<Model> orientedTo) {
        List<String> there = materials.stream().filter(sums::has).toList();
        if (there.size() < 2) {
            throw Fault.input("a projection needs records of at least two materials")
                    .found(there.isEmpty() ? "none" : there.get(0) + " only")
                    .remedy("show trays of other materials, or widen the window");
        }
        SortedSet<String> keptWhole = new TreeSet<>();
        List<List<Cell>> cells = new ArrayList<>();
        for (String material : there) {
            boolean leaves = sums.leaves(material, heldOut);
            if (!leaves) {
                keptWhole.add(material);
            }
            cells.add(sums.fitCells(
                    material,
                    leaves ? heldOut : HeldOut.NOTHING,
                    recipe.balance().instruments()));
        }
        FitRequest request = FitRequest.of(there, cells, scale)
                .withTail(Tail.of(recipe.tail(), scale.channels()))
                .withRidge(ridge(recipe, sums, heldOut))
                .withRank(recipe.rank())
                .withBetweenShares(betweenShares(recipe, there.size()))
                .withRoundedSource(head.computes() ? RoundedSource.ROUNDED : RoundedSource.LOSSLESS)
                .withChannelNames(channels);
        Fit fit = Fit.of(request, sums.scatters());
        Optional<Model> guide = orientedTo.filter(other -> other.channels().equals(channels));
        Fit oriented = guide.map(other -> Orientation.of(fit, other.axes(), Orientation.Manner.SIGNS)
                        .turned())
                .orElse(fit);
        return new Made(Model.of(oriented, context(recipe, sums, heldOut, keptWhole, oriented, guide)), keptWhole);
    }

    private ModelContext context(
            Recipe recipe, WindowSums sums, HeldOut heldOut, Set<String> keptWhole, Fit fit, Optional<Model> guide) {
        ObjectNode pretreatment = Json.object();
        pretreatment.set("head", head.json());
        pretreatment.set("tail", recipe.tail().json());
        ModelContext context = ModelContext.of(SCOPE, channels, scale, madeFrom(sums, heldOut, keptWhole))
                .withPretreatment(pretreatment)
                .withBalance(recipe.json().path("balance"))
                .withRecipe(recipeWith(recipe, heldOut))
                .withDecisionPriors(priors(recipe, fit.materials(), fit))
                .withUnfamiliarShare(recipe.unfamiliarShare());
        return guide.map(other -> context.withOrientedTo(other.fingerprint())).orElse(context);
    }

    private static ObjectNode recipeWith(Recipe recipe, HeldOut heldOut) {
        ObjectNode node = recipe.json();
        if (!heldOut.isEmpty()) {
            ObjectNode without = node.putObject("without");
            heldOut.trayGroups().forEach(without.putArray("trayGroups")::add);
            heldOut.instruments().forEach(without.putArray("instruments")::add);
        }
        return node;
    }

    private static Ridge ridge(Recipe recipe, WindowSums sums, HeldOut heldOut) {
        return recipe.ridge().isPresent()
                ? Ridge.amount(recipe.ridge().getAsDouble())
                : Ridge.analytic(Math.max(1, sums.showingsWithout(heldOut)));
    }

    private static double[] betweenShares(Recipe recipe, int materials) {
        if (recipe.balance().materials() == Weighting.AS_COUNTED) {
            return null;
        }
        double[] equal = new double[materials];
        Arrays.fill(equal, 1.0 / materials);
        return equal;
    }

    private static double[] priors(Recipe recipe, List<String> there, Fit fit) {
        double[] priors = new double[there.size()];
        if (recipe.prior() instanceof Prior.AsCounted) {
            long[] records = fit.recordsPerMaterial();
            long total = Arrays.stream(records).sum();
            Arrays.setAll(priors, k -> (double) records[k] / total);
        } else if (recipe.prior() instanceof Prior.Listed listed) {
            double[] stated = listed.inOrder(there);
            double total = 0;
            for (double share : stated) {
                total += share;
            }
            double sum = total;
            Arrays.setAll(priors, k -> stated[k] / sum);
        } else {
            Arrays.fill(priors, 1.0 / there.size());
        }
        return priors;
    }

    private static MadeFrom madeFrom(WindowSums sums, HeldOut heldOut, Set<String> keptWhole) {
        List<MadeFrom.Day> days = sums.days().stream()
                .map(entry -> new MadeFrom.Day(entry.day().toString(), entry.revision(), entry.fingerprint()))
                .toList();
        SortedMap<LedgerKey, Long> records = sums.records();
        SortedMap<LedgerKey, Long> showings = sums.showings();
        SortedMap<LedgerKey, long[]> parts = new TreeMap<>();
        for (Map.Entry<LedgerKey, Long> cell : records.entrySet()) {
            LedgerKey key = cell.getKey();
            if (!heldOut.holds(key) || keptWhole.contains(key.material())) {
                long[] part =
                        parts.computeIfAbsent(new LedgerKey(key.instrument(), key.material(), 0), k -> new long[2]);
                part[0] = Math.addExact(part[0], cell.getValue());
                part[1] = Math.addExact(part[1], showings.getOrDefault(key, 0L));
            }
        }
        List<MadeFrom.Part> list = new ArrayList<>();
        parts.forEach((key, part) -> list.add(new MadeFrom.Part(key.instrument(), key.material(), part[0], part[1])));
        return new MadeFrom(days, list, Optional.empty(), List.of());
    }

    private static List<String> channelNames(HeadSpec head) {
        double[] axis_nm = head.axis_nm();
        List<String> names = new ArrayList<>();
        for (int channel : head.kept()) {
            names.add(
                    axis_nm.length > 0
                            ? turnstone.measure.DecimalText.shortest(axis_nm[channel]) + " nm"
                            : "channel " + (channel + 1));
        }
        return names;
    }
}
