package turnstone.night;

import java.time.LocalDate;
import java.util.Collection;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.function.Predicate;
import turnstone.decide.Model;
import turnstone.ledger.Ledger;
import turnstone.ledger.ShowingSums;
import turnstone.plant.Plant;
import turnstone.refit.ModelMaker;
import turnstone.refit.Recipes;
import turnstone.refit.Window;
import turnstone.refit.WindowSums;
import turnstone.spark.TrialJob;
import turnstone.spark.TrialTallies;
import turnstone.trial.TallyCell;
import turnstone.trial.TrialModels;
import turnstone.trial.TrialTally;

/** Figures of a trial, by the tool's own estimator and by plain counting. */
final class Figures {
    private static final int MOST_NIGHTS = 28;

    private Figures() {}

    /** The pairs that the night would make for a posted day, the candidate's side alone. */
    static TrialPairs pairs(Plant plant, LocalDate date) {
        Ledger ledger = Places.ledger(plant);
        ModelMaker maker = new ModelMaker(plant.materialNames(), plant.head(), plant.countScale());
        WindowSums sums = WindowSums.read(ledger, Window.before(ledger, date, MOST_NIGHTS));
        TrialPairs.Maker candidate = new TrialPairs.Maker(Recipes.of(plant).get(0), sums);
        return TrialPairs.make(maker, candidate, Optional.empty(), showings(plant, date));
    }

    static Collection<ShowingSums> showings(Plant plant, LocalDate date) {
        Ledger ledger = Places.ledger(plant);
        return ledger.showings(ledger.day(date).orElseThrow()).values();
    }

    /** One model for every tray group, whatever it has seen: what a careless tool would do. */
    static TrialModels careless(Plant plant, Model model) {
        TrialModels.Builder builder = TrialModels.builder();
        for (int group = 0; group < plant.trayGroups(); group++) {
            builder.thisFleet(group, model, Optional.empty());
        }
        return builder.build();
    }

    /** Judges a day's records. */
    static TrialTallies tallies(
            SmallPlant small, Plant plant, LocalDate date, TrialModels models, Set<String> without) {
        Day day = Day.open(small.session(), plant, date, without);
        return TrialJob.run(day.source(), day.intake(), models, Map.of(), 0);
    }

    /** Of the records of each material the share decided as it, no signal in the denominator; the mean over materials. */
    static double macro(Plant plant, TrialTally tally) {
        return macro(plant, tally, cell -> true);
    }

    static double macro(Plant plant, TrialTally tally, Predicate<TallyCell> counted) {
        return plant.materialNames().stream()
                .mapToDouble(material -> share(tally, cell -> cell.truth().equals(material) && counted.test(cell)))
                .average()
                .orElseThrow();
    }

    /** Of these records the share decided as what they are. */
    static double share(TrialTally tally, Predicate<TallyCell> counted) {
        long right = 0;
        long all = 0;
        for (Map.Entry<TallyCell, Long> cell : tally.cells().entrySet()) {
            if (counted.test(cell.getKey())) {
                all += cell.getValue();
                right += cell.getKey().decided().equals(cell.getKey().truth()) ? cell.getValue() : 0;
            }
        }
        return (double) right / all;
    }
}
