package turnstone.cli;

import com.fasterxml.jackson.databind.node.ArrayNode;
import java.time.LocalDate;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.Set;
import java.util.TreeSet;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.ledger.DayEntry;
import turnstone.ledger.Ledger;
import turnstone.night.Places;
import turnstone.night.RefitStep;
import turnstone.night.Words;
import turnstone.plant.Plant;
import turnstone.plant.RefitRecipe.Balance;
import turnstone.plant.RefitRecipe.Weighting;
import turnstone.refit.HeldOut;
import turnstone.refit.Recipe;
import turnstone.refit.Recipes;
import turnstone.refit.Window;
import turnstone.shelf.Shelf;

/** {@code refit}: makes candidates from the ledger. */
@Command(
        name = "refit",
        description =
                "Makes candidates from the ledger and puts them on the shelf; one for each rung of a ladder of ridges.",
        footer = {
            "",
            "Examples: turnstone refit --plant plant.yaml --until 2026-03-14",
            "          turnstone refit --plant plant.yaml --from 2026-03-02 --until 2026-03-06 --ridge 1e-4,1e-3",
            "          turnstone refit --again 3f9c21ab --plant plant.yaml"
        })
final class RefitCommand implements Callable<Integer> {
    private static final String ANALYTIC = "analytic";
    private static final String NONE = "none";
    private static final Set<String> BALANCE_WORDS = Set.of("instruments", "materials", NONE);

    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    @Option(
            names = "--until",
            paramLabel = "DAY",
            converter = DayOption.class,
            description = "last day of the window (default: the newest posted day)")
    LocalDate until;

    @Option(
            names = "--from",
            paramLabel = "DAY",
            converter = DayOption.class,
            description = "first day of the window (default: as many days as the plant file says)")
    LocalDate from;

    @Option(
            names = "--ridge",
            paramLabel = "R",
            split = ",",
            description = "a number, several with commas between, or analytic (default: the plant file's)")
    List<String> ridges = List.of();

    @Option(names = "--axes", paramLabel = "N", description = "axes kept; 0 keeps all (default: the plant file's)")
    Integer axes;

    @Option(
            names = "--tail",
            paramLabel = "STEPS",
            description =
                    "linear steps on the sums, such as savitzky-golay:9/2/1,bins:2, or none (default: the plant file's)")
    String tail;

    @Option(
            names = "--balance",
            paramLabel = "KIND",
            split = ",",
            description =
                    "what weighs equally whatever its records: instruments, materials, or none (default: the plant file's)")
    Set<String> balance;

    @Option(
            names = "--leave-out-group",
            paramLabel = "N",
            split = ",",
            description = "tray groups to leave out, counted from 1")
    Set<Integer> groups = new TreeSet<>();

    @Option(
            names = "--leave-out-instrument",
            paramLabel = "NAME",
            split = ",",
            description = "instruments to leave out, such as avocet@2026-03-01")
    Set<String> instruments = new TreeSet<>();

    @Option(
            names = "--again",
            paramLabel = "MODEL",
            description =
                    "make this model anew from the ledger days that it states, and say whether the numbers are the same")
    String again;

    RefitCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Plant file = plant.read();
        Ledger ledger = Places.ledger(file);
        Shelf shelf = Places.shelf(file);
        if (again != null) {
            requireAlone();
            RefitAgain.run(console, common, file, Models.find(again, plant.file));
            return 0;
        }
        List<Recipe> recipes = recipes(file);
        List<DayEntry> window = window(ledger, recipes.get(0));
        TreeSet<Integer> fromZero = new TreeSet<>();
        groups.forEach(group -> fromZero.add(inRange(group, file) - 1));
        console.talk().phase("refit");
        List<Model> models = RefitStep.make(
                file, ledger, window, recipes, new HeldOut(fromZero, instruments), inService(file, shelf));
        models.forEach(model -> shelf.put(model.json()));
        console.talk().done("refit from " + window.size() + " days of " + ledger.describe());
        print(models);
        return 0;
    }

    private static Optional<Model> inService(Plant file, Shelf shelf) {
        return RefitStep.inService(file, shelf);
    }

    private void requireAlone() {
        if (until != null
                || from != null
                || axes != null
                || !ridges.isEmpty()
                || !groups.isEmpty()
                || !instruments.isEmpty()) {
            throw Fault.usage("a model that is made again has its own window and recipe")
                    .at("--again")
                    .remedy("leave the other options out");
        }
    }

    private static int inRange(int group, Plant file) {
        if (group < 1 || group > file.trayGroups()) {
            throw Fault.usage("there is no such tray group")
                    .at("--leave-out-group")
                    .found(group)
                    .expected("1 to " + file.trayGroups());
        }
        return group;
    }

    private List<DayEntry> window(Ledger ledger, Recipe recipe) {
        List<DayEntry> posted = ledger.days();
        if (posted.isEmpty()) {
            throw Fault.input("the ledger is empty").at(ledger.describe()).remedy("post a day first");
        }
        LocalDate last = until != null ? until : posted.get(posted.size() - 1).day();
        return from != null ? Window.between(ledger, from, last) : Window.upTo(ledger, last, recipe.window_days());
    }

    private List<Recipe> recipes(Plant file) {
        List<Recipe> planned = Recipes.of(file);
        List<Recipe> wanted = ridges.isEmpty()
                ? planned
                : ridges.stream()
                        .map(ridge -> planned.get(0).withRidge(ridge(ridge)))
                        .toList();
        return wanted.stream().map(this::changed).toList();
    }

    private Recipe changed(Recipe recipe) {
        Recipe changed = axes == null ? recipe : recipe.withRank(axes);
        if (tail != null) {
            changed = changed.withTail(TailText.read(tail));
        }
        return balance == null ? changed : changed.withBalance(balance());
    }

    private Balance balance() {
        for (String kind : balance) {
            if (!BALANCE_WORDS.contains(kind) || (kind.equals(NONE) && balance.size() > 1)) {
                throw Fault.usage("not a balance")
                        .at("--balance")
                        .found(String.join(",", balance))
                        .expected("instruments, materials, both with a comma between, or none");
            }
        }
        return new Balance(
                balance.contains("instruments") ? Weighting.EQUAL : Weighting.AS_COUNTED,
                balance.contains("materials") ? Weighting.EQUAL : Weighting.AS_COUNTED);
    }

    static OptionalDouble ridge(String text) {
        if (text.equals(ANALYTIC)) {
            return OptionalDouble.empty();
        }
        try {
            double value = Double.parseDouble(text);
            if (value >= 0 && Double.isFinite(value)) {
                return OptionalDouble.of(value);
            }
        } catch (NumberFormatException e) {
            throw badRidge(text).because(e);
        }
        throw badRidge(text);
    }

    private static Fault badRidge(String text) {
        return Fault.usage("not a ridge").at("--ridge").found(text).expected("a number of 0 or more, or " + ANALYTIC);
    }

    private void print(List<Model> models) {
        if (common.json) {
            ArrayNode list = Json.array();
            models.forEach(model -> list.addObject()
                    .put("fingerprint", model.fingerprint())
                    .put("ridge", model.ridge())
                    .put("axes", model.rank())
                    .put("records", model.madeFrom().records())
                    .put("showings", model.madeFrom().showings()));
            console.json(list);
            return;
        }
        for (Model model : models) {
            console.say(
                    "candidate " + Words.shortened(model.fingerprint()) + "  ridge " + Figures.shortest(model.ridge())
                            + ", " + model.rank() + " axes, "
                            + Words.number(model.madeFrom().records()) + " records, "
                            + Words.number(model.madeFrom().showings()) + " showings");
            model.remarks().forEach(remark -> console.say("  " + remark));
        }
    }
}
