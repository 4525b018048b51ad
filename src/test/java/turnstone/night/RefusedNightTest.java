package turnstone.night;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.catchThrowableOfType;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Map;
import java.util.TreeMap;
import java.util.function.UnaryOperator;
import java.util.stream.Stream;
import org.apache.spark.sql.Dataset;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.functions;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import turnstone.fault.Fault;
import turnstone.plant.Plant;
import turnstone.sample.SampleShowing;
import turnstone.spark.SharedSession;

/** Nights with something wrong in their records: refused by name, nothing posted, no verdict left. */
@ExtendWith({SharedSession.class, SharedPlant.class})
class RefusedNightTest {
    /** A day's folder of its own, made by the test. */
    private static Path dayFolder(SmallPlant small, String source) {
        return small.home().resolve(source).resolve(small.lastNight().toString());
    }

    private static Plant plant(SmallPlant small, String source) {
        return small.evening(text -> SmallPlant.replaced(text, "records/{day}", source + "/{day}"));
    }

    private static Dataset<Row> lastNight(SmallPlant small) {
        Path folder = small.home().resolve("records").resolve(small.lastNight().toString());
        return small.session().spark().read().parquet(folder.toString());
    }

    private static Path write(SmallPlant small, String source, UnaryOperator<Dataset<Row>> change) {
        Path folder = dayFolder(small, source);
        change.apply(lastNight(small)).coalesce(1).write().parquet(folder.toString());
        return folder;
    }

    private static Path onlyFile(Path folder) {
        try (Stream<Path> files = Files.list(folder)) {
            return files.filter(file -> file.toString().endsWith(".parquet"))
                    .findFirst()
                    .orElseThrow();
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** Sizes of all files under a place by name. */
    private static Map<String, Long> files(Path place) throws IOException {
        Map<String, Long> sizes = new TreeMap<>();
        try (Stream<Path> below = Files.walk(place)) {
            for (Path path : below.filter(Files::isRegularFile).toList()) {
                sizes.put(place.relativize(path).toString(), Files.size(path));
            }
        }
        return sizes;
    }

    /** Runs the night, which must fail and leave ledger and shelf as they were. */
    private static Fault refused(SmallPlant small, Plant plant) throws IOException {
        Map<String, Long> ledger = files(Path.of(plant.ledger()));
        Map<String, Long> shelf = files(Path.of(plant.shelf()));
        Night night = small.nightOf(plant);
        Fault fault = catchThrowableOfType(Fault.class, () -> night.run(small.lastNight()));
        assertThat(fault).as("the night must be refused").isNotNull();
        assertThat(files(Path.of(plant.ledger()))).isEqualTo(ledger);
        assertThat(files(Path.of(plant.shelf()))).isEqualTo(shelf);
        assertThat(Places.ledger(plant).day(small.lastNight())).isEmpty();
        assertThat(files(Path.of(plant.runs())).keySet()).noneMatch(name -> name.contains("verdict"));
        return fault;
    }

    @Test
    void recordsOfAnotherDayInTheDaysFolderAreQuarantinedAndTheDayRefused(@Coarse SmallPlant small) throws IOException {
        write(
                small,
                "wrong-day",
                frame -> frame.withColumn(
                        "day",
                        functions
                                .when(functions.col("sorter").equalTo("avocet"), "2026-02-27")
                                .otherwise(functions.col("day"))));
        Fault fault = refused(small, plant(small, "wrong-day"));
        assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT);
        assertThat(fault).hasMessageContaining("wrong-day").hasMessageContaining("352 wrong day");
    }

    @Test
    void aSorterThatThePlantDoesNotKnowIsQuarantinedAndNotInvented(@Coarse SmallPlant small) throws IOException {
        write(
                small,
                "unknown",
                frame -> frame.withColumn(
                        "sorter",
                        functions
                                .when(functions.col("sorter").equalTo("dunlin"), "phalarope")
                                .otherwise(functions.col("sorter"))));
        Plant plant = plant(small, "unknown");
        Fault fault = refused(small, plant);
        assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT);
        assertThat(fault).hasMessageContaining("353 unknown sorter");
        Path quarantine = Path.of(plant.runs())
                .resolve(small.lastNight().toString())
                .resolve("0001")
                .resolve("quarantine.csv");
        assertThat(Files.readString(quarantine)).contains("phalarope").contains("unknown sorter");
    }

    @Test
    void aFileThatIsCutShortFailsByName(@Coarse SmallPlant small) throws IOException {
        Path file = onlyFile(write(small, "cut", frame -> frame));
        byte[] whole = Files.readAllBytes(file);
        Files.write(file, java.util.Arrays.copyOf(whole, whole.length / 2));
        Fault fault = refused(small, plant(small, "cut"));
        assertThat(fault.kind()).isEqualTo(Fault.Kind.STORAGE);
        assertThat(fault).hasMessageContaining(file.getFileName().toString());
    }

    @Test
    void aFileThatIsDamagedInTheMiddleFailsByName(@Coarse SmallPlant small) throws IOException {
        Path file = onlyFile(write(small, "damaged", frame -> frame));
        byte[] content = Files.readAllBytes(file);
        java.util.Arrays.fill(content, content.length / 3, content.length / 3 + 4096, (byte) 0xFF);
        Files.write(file, content);
        Files.deleteIfExists(file.resolveSibling("." + file.getFileName() + ".crc"));
        Fault fault = refused(small, plant(small, "damaged"));
        assertThat(fault.kind()).isEqualTo(Fault.Kind.STORAGE);
        assertThat(fault).hasMessageContaining(file.getFileName().toString());
    }

    @Test
    void anEmptyFolderIsRefusedByName(@Coarse SmallPlant small) throws IOException {
        Path folder = Files.createDirectories(dayFolder(small, "nothing"));
        Fault fault = refused(small, plant(small, "nothing"));
        assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT);
        assertThat(fault).hasMessageContaining(folder.toString()).hasMessageContaining("no files");
    }

    @Test
    void aShowingThatIsPostedOnAnotherDayIsRefusedByName(@Coarse SmallPlant small) throws IOException {
        SampleShowing earlier = small.sample().showings(small.night(2)).get(9);
        SampleShowing later = small.sample().showings(small.lastNight()).get(4);
        write(
                small,
                "twice-shown",
                frame -> frame.withColumn(
                        "showing",
                        functions
                                .when(functions.col("showing").equalTo(later.id()), earlier.id())
                                .otherwise(functions.col("showing"))));
        Fault fault = refused(small, plant(small, "twice-shown"));
        assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT);
        assertThat(fault)
                .hasMessageContaining("showing " + earlier.id() + " is posted on another day")
                .hasMessageContaining(small.night(2).toString())
                .hasMessageContaining(small.lastNight().toString());
    }

    @Test
    void aShowingOfTwoMaterialsIsRefusedByName(@Coarse SmallPlant small) throws IOException {
        SampleShowing showing = small.sample().showings(small.lastNight()).get(2);
        write(
                small,
                "two-materials",
                frame -> frame.withColumn(
                        "material",
                        functions
                                .when(
                                        functions
                                                .col("showing")
                                                .equalTo(showing.id())
                                                .and(functions
                                                        .col("belt_column")
                                                        .lt(8)),
                                        "PVC")
                                .otherwise(functions.col("material"))));
        Fault fault = refused(small, plant(small, "two-materials"));
        assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT);
        assertThat(fault)
                .hasMessageContaining(showing.id())
                .hasMessageContaining("PVC")
                .hasMessageContaining(showing.material());
    }

    @Test
    void theSameFileUnderTwoNamesIsRefusedByName(@Coarse SmallPlant small) throws IOException {
        Path folder = write(small, "copied", frame -> frame);
        Path file = onlyFile(folder);
        Path copy = Files.copy(file, folder.resolve("another-name.parquet"));
        Fault fault = refused(small, plant(small, "copied"));
        assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT);
        assertThat(fault)
                .hasMessageContaining("the same file is given twice")
                .hasMessageContaining(file.getFileName().toString())
                .hasMessageContaining(copy.getFileName().toString());
    }
}
