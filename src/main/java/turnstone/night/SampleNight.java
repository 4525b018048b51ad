package turnstone.night;

import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Clock;
import java.time.LocalDate;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import turnstone.decide.Model;
import turnstone.ledger.DayEntry;
import turnstone.ledger.Ledger;
import turnstone.ledger.Replace;
import turnstone.plant.Plant;
import turnstone.refit.HeldOut;
import turnstone.refit.Recipes;
import turnstone.refit.Window;
import turnstone.sample.SamplePlant;
import turnstone.shelf.Shelf;
import turnstone.spark.SampleJob;
import turnstone.spark.Session;

/**
 * Gets the invented plant to the evening before its last night: records written, earlier nights posted, a first model in service.
 *
 * <p>Each part is done only where it is not there yet, so that an interrupted run goes on where it stopped.
 */
public final class SampleNight {
    private static final int FIRST_MODEL_NIGHTS = 5;
    private static final String PLANT_FILE = "plant.yaml";

    private final Plant plant;
    private final LocalDate lastNight;

    private SampleNight(Plant plant, LocalDate lastNight) {
        this.plant = plant;
        this.lastNight = lastNight;
    }

    /** The plant. */
    public Plant plant() {
        return plant;
    }

    /** The night that is left to run. */
    public LocalDate lastNight() {
        return lastNight;
    }

    /** Writes, posts and releases what is not there yet. */
    public static SampleNight prepare(Session session, Path folder, Progress progress, Clock clock) {
        SamplePlant sample = SamplePlant.standard();
        write(session, sample, folder, progress);
        Plant plant = Plant.read(folder.resolve(PLANT_FILE));
        List<LocalDate> nights = sample.nights();
        LocalDate last = nights.get(nights.size() - 1);
        Ledger ledger = Places.ledger(plant);
        Night night = new Night(plant, session, progress, clock);
        Set<LocalDate> posted =
                Set.copyOf(ledger.days().stream().map(DayEntry::day).toList());
        for (LocalDate date : nights.subList(0, nights.size() - 1)) {
            if (!posted.contains(date)) {
                Day day = Day.open(session, plant, date, Set.of());
                PostStep.Folded folded = night.fold(day, Set.of(), Optional.empty());
                PostStep.post(ledger, folded.draft(), Replace.NO);
                progress.done("posted " + date + ": " + Night.counts(folded));
            }
        }
        putFirstModelInService(plant, ledger, nights.get(FIRST_MODEL_NIGHTS - 1), progress);
        return new SampleNight(plant, last);
    }

    /** Writes the plant's records, references and plant file. */
    public static void write(Session session, SamplePlant sample, Path folder, Progress progress) {
        if (Files.exists(folder.resolve(PLANT_FILE))) {
            return;
        }
        progress.phase("write the invented plant");
        long records = SampleJob.write(session, sample, folder);
        progress.done("wrote the invented plant: " + sample.nights().size() + " nights, " + Words.number(records)
                + " records; nothing in it is measured data");
    }

    private static void putFirstModelInService(Plant plant, Ledger ledger, LocalDate until, Progress progress) {
        Shelf shelf = Places.shelf(plant);
        if (shelf.inService().isPresent()) {
            return;
        }
        progress.phase("make the first model");
        List<DayEntry> window = Window.upTo(ledger, until, FIRST_MODEL_NIGHTS);
        Model first = RefitStep.make(
                        plant, ledger, window, Recipes.of(plant).subList(0, 1), HeldOut.NOTHING, Optional.empty())
                .get(0);
        shelf.put(first.json());
        shelf.release(first.fingerprint(), Optional.empty(), "first coefficients of the invented plant", "sample");
        progress.done("put in service a first model from nights 1 to " + FIRST_MODEL_NIGHTS + ": "
                + Words.shortened(first.fingerprint()));
    }
}
