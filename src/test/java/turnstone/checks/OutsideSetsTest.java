package turnstone.checks;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.fail;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.TestInstance;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import turnstone.decide.Model;
import turnstone.json.Json;
import turnstone.spark.Session;
import turnstone.spark.SharedSession;
import turnstone.table.TableFit;

/**
 * Public data sets through the whole path against figures computed apart from this program; each file of {@code checks} names the published
 * source of its data and the method of its figures.
 */
@ExtendWith(SharedSession.class)
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class OutsideSetsTest {
    private static final Pattern SPLIT =
            Pattern.compile("file order: records (\\d+)-(\\d+) .*train, (\\d+)-(\\d+) .*test");
    private static final String PART = "part";

    @TempDir
    Path folder;

    private final Map<String, Double> ratioErrors = new TreeMap<>();

    @AfterAll
    void sayTheLargestError() {
        String largest = ratioErrors.entrySet().stream()
                .max(Map.Entry.comparingByValue())
                .map(entry -> entry.getValue() + " (" + entry.getKey() + ")")
                .orElse("none");
        System.out.println("largest relative error of a Fisher ratio over " + ratioErrors.size() + " sets: " + largest
                + "; by set " + ratioErrors);
    }

    private static TextTable table(String set) throws IOException {
        return switch (set) {
            case "meat-nir-fat-tertiles" -> TextTable.resource("meat-nir");
            case "meat-nir-fat20" -> TextTable.meatByFat();
            case "iris-variant" -> TextTable.irisVariant();
            default -> TextTable.resource(set);
        };
    }

    private void require(Reference reference, TableFit.Result fitted) {
        assertThat(fitted.loss().isLossless()).isTrue();
        ratioErrors.merge(reference.name(), reference.ratioError(fitted.model().fisherRatios()), Math::max);
        reference.requireFigures(fitted.model());
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "iris",
                "iris-variant",
                "wine",
                "breast_cancer",
                "penguins",
                "penguins-measured",
                "meat-nir-fat-tertiles",
                "meat-nir-fat20"
            })
    void aSetGivesItsPublishedFiguresFromTextAndFromParquet(String set, Session session) throws IOException {
        Reference reference = Reference.of(set);
        TextTable table = table(set);
        WholePath path = new WholePath(session, folder);
        Path csv = table.toCsv(folder.resolve(set + ".csv"));
        TableFit.Result fitted = path.fitted(csv, 0, WholePath.ALL_AXES);
        require(reference, fitted);
        assertThat(path.tally(fitted.model(), csv)).isEqualTo(reference.tally("resubstitution"));

        Path parquet = table.toParquet(session, folder.resolve(set));
        TableFit.Result again = path.fitted(parquet, 0, WholePath.ALL_AXES);
        require(reference, again);
        assertThat(again.model().fingerprint()).isEqualTo(fitted.model().fingerprint());
        assertThat(path.tally(again.model(), parquet)).isEqualTo(reference.tally("resubstitution"));

        List<Integer> errors = reference.errorsByAxes("resubstitution");
        assertThat(errors).hasSize(fitted.model().rank());
        for (int axes = 1; axes < errors.size(); axes++) {
            Model fewer = path.fit(csv, 0, axes);
            assertThat(fewer.rank()).isEqualTo(axes);
            assertThat(wrong(path.tally(fewer, csv))).as("%d axes", axes).isEqualTo(errors.get(axes - 1));
        }
    }

    /** These come in packages under the GPL, so they are written at test time by src/test/r/export-check-sets.R. */
    @ParameterizedTest
    @ValueSource(strings = {"satellite", "dna", "vowel-mlbench", "crabs-sp-sex"})
    void aFetchedSetGivesItsPublishedErrors(String set, Session session) throws IOException {
        Path file = fetched(set);
        Reference reference = Reference.of(set);
        assertThat(Json.sha256(Files.readAllBytes(file)))
                .as("SHA-256 of %s", set)
                .isEqualTo(reference.json().path("csv_sha256").textValue());
        TextTable all = TextTable.of(Files.readString(file));
        Matcher split = SPLIT.matcher(reference.json().path("split").asText());
        boolean held = split.find();
        assertThat(held).isEqualTo(reference.json().has("test"));
        TextTable train = held ? part(all, split, 1) : all;
        WholePath path = new WholePath(session, folder);
        Path trainCsv = train.toCsv(folder.resolve(set + "-train.csv"));
        TableFit.Result fitted = path.fitted(trainCsv, 0, WholePath.ALL_AXES);
        require(reference, fitted);
        assertThat(path.tally(fitted.model(), trainCsv)).isEqualTo(reference.tally("resubstitution"));
        if (held) {
            Path testCsv = part(all, split, 3).toCsv(folder.resolve(set + "-test.csv"));
            assertThat(path.tally(fitted.model(), testCsv)).isEqualTo(reference.tally("test"));
        }

        Path marked = marked(all, train.rows().size()).toCsv(folder.resolve(set + "-marked.csv"));
        List<Integer> trainErrors = reference.errorsByAxes("resubstitution");
        List<Integer> testErrors = reference.errorsByAxes("test");
        assertThat(trainErrors).hasSize(fitted.model().rank());
        for (int axes = 1; axes <= trainErrors.size(); axes++) {
            Path projected = path.project(path.fit(trainCsv, 0, axes), marked);
            assertThat(wrong(projected, "train")).as("train, %d axes", axes).isEqualTo(trainErrors.get(axes - 1));
            if (held) {
                assertThat(wrong(projected, "test")).as("test, %d axes", axes).isEqualTo(testErrors.get(axes - 1));
            }
        }
    }

    private static Path fetched(String set) {
        String place = System.getProperty("turnstone.checkSets", "");
        boolean there = !place.isEmpty() && Files.isRegularFile(Path.of(place, set + ".csv"));
        if (!there && System.getenv("CI") != null) {
            fail(set + " is required with CI set: scripts/test writes it where R has the packages mlbench and MASS");
        }
        assumeTrue(there, set + " needs R with the packages mlbench and MASS, from which scripts/test writes it");
        return Path.of(place, set + ".csv");
    }

    private static TextTable part(TextTable all, Matcher split, int group) {
        return all.records(Integer.parseInt(split.group(group)), Integer.parseInt(split.group(group + 1)));
    }

    /** The same table with a column that says to which part a record belongs; it is carried through a projection. */
    private static TextTable marked(TextTable all, int trainRecords) {
        List<String> header = new ArrayList<>(all.header());
        header.add(PART);
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < all.rows().size(); i++) {
            List<String> row = new ArrayList<>(all.rows().get(i));
            row.add(i < trainRecords ? "train" : "test");
            rows.add(row);
        }
        return new TextTable(header, rows);
    }

    private static int wrong(Path projected, String part) throws IOException {
        return (int) WholePath.positions(projected).stream()
                .filter(row -> row.get(PART).equals(part))
                .filter(row -> !row.get(TextTable.LABEL).equals(row.get("decided")))
                .count();
    }

    private static int wrong(String tally) {
        return TextTable.of(tally).rows().stream()
                .filter(cells -> !cells.get(0).equals(cells.get(1)))
                .mapToInt(cells -> Integer.parseInt(cells.get(2)))
                .sum();
    }
}
