package turnstone.night;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Clock;
import java.time.LocalDate;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.concurrent.atomic.AtomicInteger;
import java.util.function.UnaryOperator;
import java.util.stream.Stream;
import turnstone.decide.Model;
import turnstone.ledger.Ledger;
import turnstone.ledger.Replace;
import turnstone.plant.Plant;
import turnstone.refit.HeldOut;
import turnstone.refit.Recipes;
import turnstone.refit.Window;
import turnstone.sample.SamplePlant;
import turnstone.sample.SampleSize;
import turnstone.shelf.Shelf;
import turnstone.spark.SampleJob;
import turnstone.spark.Session;

/**
 * A small invented plant on disk: six sorters, five or six nights, the traps of docs/sample-plant.md but the new camera.
 *
 * <p>Records are written once. The nights before the last are posted once, and a first model from nights 1 to 3 put in service; each
 * {@link #evening} is a copy of that state, so that tests don't meet.
 */
final class SmallPlant implements AutoCloseable {
    /** Fine enough for the traps to show. */
    static final SampleSize FINE = new SampleSize(6, 6, 4, 24, 128);

    /** Quick, for rules that don't depend on how good the figures are. */
    static final SampleSize COARSE = new SampleSize(6, 5, 4, 8, 32);

    static final int FIRST_MODEL_NIGHTS = 3;

    private static final int MOST_NIGHTS = 28;
    private static final String EVENING = "evening";

    private final Session session;
    private final Path home;
    private final SamplePlant sample;
    private final AtomicInteger places = new AtomicInteger();

    private SmallPlant(Session session, Path home, SamplePlant sample) {
        this.session = session;
        this.home = home;
        this.sample = sample;
    }

    /** Writes the plant and brings it to the evening before its last night. */
    static SmallPlant write(Session session, SampleSize size, long seed) {
        try {
            Path home = Files.createTempDirectory("turnstone-small-plant-");
            SmallPlant small = new SmallPlant(session, home, SamplePlant.of(size, seed));
            SampleJob.write(session, small.sample, home);
            Plant plant = small.variant(EVENING, UnaryOperator.identity());
            small.postEarlierNights(plant);
            small.putFirstModelInService(plant);
            return small;
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    Session session() {
        return session;
    }

    Path home() {
        return home;
    }

    SamplePlant sample() {
        return sample;
    }

    LocalDate night(int number) {
        return sample.nights().get(number);
    }

    LocalDate lastNight() {
        return night(sample.nights().size() - 1);
    }

    Night nightOf(Plant plant) {
        return new Night(plant, session, Progress.SILENT, Clock.systemUTC());
    }

    /** The plant as it is on the evening before its last night, in places of its own. */
    Plant evening() {
        return evening(UnaryOperator.identity());
    }

    /** The same by another plant file, which must be on the same count scale and head. */
    Plant evening(UnaryOperator<String> change) {
        String place = "place-" + places.incrementAndGet();
        link(home.resolve(EVENING), home.resolve(place));
        return variant(place, change);
    }

    /** The plant with its last night posted as well. */
    Plant morning() {
        Plant plant = evening();
        post(plant, lastNight(), Set.of());
        return plant;
    }

    /** Another plant file over the same records, with nothing posted. */
    Plant empty(UnaryOperator<String> change) {
        return variant("place-" + places.incrementAndGet(), change);
    }

    private Plant variant(String place, UnaryOperator<String> change) {
        try {
            String standard = Files.readString(home.resolve("plant.yaml"));
            String quick = replaced(standard, "project: {write: on,", "project: {write: off,");
            // Of six sorters one without two of its whites is more than of twelve.
            String own = change.apply(replaced(quick, "limitShare: 0.02", "limitShare: 0.05"))
                    .replace("ledger: ledger\n", "ledger: " + place + "/ledger\n")
                    .replace("shelf: shelf\n", "shelf: " + place + "/shelf\n")
                    .replace("runs: runs\n", "runs: " + place + "/runs\n");
            Path file = home.resolve(place + ".yaml");
            Files.writeString(file, own);
            return Plant.read(file);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** Replaces what must be there. */
    static String replaced(String text, String old, String fresh) {
        if (!text.contains(old)) {
            throw new IllegalArgumentException("the plant file has no " + old);
        }
        return text.replace(old, fresh);
    }

    PostStep.Posted post(Plant plant, LocalDate date, Set<String> without) {
        Night night = nightOf(plant);
        PostStep.Folded folded = night.fold(night.open(date, without), without, Optional.empty());
        return PostStep.post(Places.ledger(plant), folded.draft(), without.isEmpty() ? Replace.NO : Replace.YES);
    }

    void postEarlierNights(Plant plant) {
        for (LocalDate date : sample.nights().subList(0, sample.nights().size() - 1)) {
            post(plant, date, Set.of());
        }
    }

    private void putFirstModelInService(Plant plant) {
        Ledger ledger = Places.ledger(plant);
        Model first = model(plant, ledger, night(FIRST_MODEL_NIGHTS - 1), HeldOut.NOTHING);
        Shelf shelf = Places.shelf(plant);
        shelf.put(first.json());
        shelf.release(first.fingerprint(), Optional.empty(), "first coefficients", "test");
    }

    /** The plant's recipe on all days up to one. */
    static Model model(Plant plant, Ledger ledger, LocalDate until, HeldOut heldOut) {
        return RefitStep.make(
                        plant,
                        ledger,
                        Window.upTo(ledger, until, MOST_NIGHTS),
                        Recipes.of(plant).subList(0, 1),
                        heldOut,
                        Optional.empty())
                .get(0);
    }

    /** What is published is never written to again, so links serve as copies. */
    private static void link(Path from, Path to) {
        try (Stream<Path> below = Files.walk(from)) {
            for (Path path : below.toList()) {
                Path target = to.resolve(from.relativize(path).toString());
                if (Files.isDirectory(path)) {
                    Files.createDirectories(target);
                } else {
                    Files.createLink(target, path);
                }
            }
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    @Override
    public void close() {
        try (Stream<Path> below = Files.walk(home)) {
            List<Path> deepestFirst = below.sorted(Comparator.reverseOrder()).toList();
            for (Path path : deepestFirst) {
                Files.deleteIfExists(path);
            }
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
