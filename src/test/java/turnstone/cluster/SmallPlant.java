package turnstone.cluster;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Clock;
import java.time.LocalDate;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.stream.Stream;
import turnstone.decide.Model;
import turnstone.ledger.DayEntry;
import turnstone.ledger.Ledger;
import turnstone.ledger.Replace;
import turnstone.night.Day;
import turnstone.night.Night;
import turnstone.night.Places;
import turnstone.night.PostStep;
import turnstone.night.Progress;
import turnstone.night.RefitStep;
import turnstone.plant.Plant;
import turnstone.refit.HeldOut;
import turnstone.refit.Recipes;
import turnstone.sample.SamplePlant;
import turnstone.sample.SampleSize;
import turnstone.shelf.Shelf;
import turnstone.spark.SampleJob;
import turnstone.spark.Session;

/** A small plant, invented, in a folder of its own; what is done to it here is done in this process. */
final class SmallPlant {
    private static final long SEED = 20_260_301;

    private final Path folder;

    private SmallPlant(Path folder) {
        this.folder = folder;
    }

    /** Writes a plant of three sorters, 24 channels and 1,584 records a night, anew. */
    static SmallPlant write(Session session, Path folder, int nights) {
        remove(folder);
        SampleJob.write(session, SamplePlant.of(new SampleSize(3, nights, 4, 12, 24), SEED), folder);
        return new SmallPlant(folder);
    }

    /** The same, with all that was posted and made until now, in another folder. */
    SmallPlant copy(Path target) {
        remove(target);
        try (Stream<Path> all = Files.walk(folder)) {
            for (Path from : all.toList()) {
                Path to = target.resolve(folder.relativize(from).toString());
                if (Files.isDirectory(from)) {
                    Files.createDirectories(to);
                } else {
                    Files.copy(from, to);
                }
            }
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
        return new SmallPlant(target);
    }

    private static void remove(Path folder) {
        if (!Files.exists(folder)) {
            return;
        }
        try (Stream<Path> all = Files.walk(folder)) {
            for (Path path : all.sorted((a, b) -> b.compareTo(a)).toList()) {
                Files.delete(path);
            }
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    String file() {
        return folder.resolve("plant.yaml").toString();
    }

    Path folder() {
        return folder;
    }

    Plant plant() {
        return Plant.read(folder.resolve("plant.yaml"));
    }

    Ledger ledger() {
        return Places.ledger(plant());
    }

    Shelf shelf() {
        return Places.shelf(plant());
    }

    void post(Session session, LocalDate day) {
        Night night = new Night(plant(), session, Progress.SILENT, Clock.systemUTC());
        Day found = night.open(day, Set.of());
        PostStep.post(ledger(), night.fold(found, Set.of(), Optional.empty()).draft(), Replace.NO);
    }

    /** Puts in service a model from what is posted now. */
    void release() {
        List<DayEntry> days = ledger().days();
        Model first = RefitStep.make(
                        plant(), ledger(), days, Recipes.of(plant()).subList(0, 1), HeldOut.NOTHING, Optional.empty())
                .get(0);
        shelf().put(first.json());
        shelf().release(first.fingerprint(), Optional.empty(), "first coefficients of the small plant", "test");
    }

    Night.Result nightly(Session session, LocalDate day) {
        return new Night(plant(), session, Progress.SILENT, Clock.systemUTC()).run(day);
    }

    /** Whether any run of the day has left a verdict. */
    boolean hasVerdict(LocalDate day) {
        Path runs = folder.resolve("runs").resolve(day.toString());
        if (!Files.exists(runs)) {
            return false;
        }
        try (Stream<Path> all = Files.walk(runs)) {
            return all.anyMatch(path -> path.endsWith("verdict.json"));
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    /** The folders of a day's parts that have any file, named by an entry or not. */
    List<Path> partFolders(LocalDate day) {
        Path days = folder.resolve("ledger/days").resolve(day.toString());
        if (!Files.exists(days)) {
            return List.of();
        }
        try (Stream<Path> all = Files.walk(days)) {
            return all.filter(Files::isRegularFile)
                    .map(Path::getParent)
                    .distinct()
                    .toList();
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    /** What a night came to, without what may differ between equal nights. */
    Canonical canonical(Session session, LocalDate day, String run) {
        Path folderOfRun = folder.resolve("runs").resolve(day.toString()).resolve(run);
        String verdict = text(folderOfRun.resolve("verdict.json"));
        List<String> decisions = session
                .spark()
                .read()
                .parquet(folderOfRun.resolve("projection/positions").toUri().toString())
                .collectAsList()
                .stream()
                .map(Object::toString)
                .sorted()
                .toList();
        List<String> sums = ledger().days().stream()
                .map(entry -> entry.day() + " " + entry.momentsFingerprint() + " " + entry.fingerprint())
                .toList();
        return new Canonical(sums, model(verdict), text(folderOfRun.resolve("trial.json")), verdict, decisions);
    }

    private String model(String verdict) {
        String key = "\"candidate\"";
        int from = verdict.indexOf('"', verdict.indexOf(key) + key.length()) + 1;
        String fingerprint = verdict.substring(from, verdict.indexOf('"', from));
        return shelf().model(fingerprint).orElseThrow().toString();
    }

    private static String text(Path file) {
        try {
            return Files.readString(file);
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    /**
     * What must be the same to the last bit.
     *
     * @param sums each posted day with the fingerprints of its sums and of all of it
     * @param model the candidate, whole
     * @param trial trial.json
     * @param verdict verdict.json
     * @param decisions the rows of the projection, sorted
     */
    record Canonical(List<String> sums, String model, String trial, String verdict, List<String> decisions) {}
}
