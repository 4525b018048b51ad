package turnstone.plant;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.catchThrowableOfType;

import com.fasterxml.jackson.databind.JsonNode;
import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.Set;
import java.util.TreeSet;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.measure.Instrument;
import turnstone.measure.TailSpec;

class PlantFileTest {
    @TempDir
    Path folder;

    private static Path example() {
        return Path.of(System.getProperty("turnstone.basedir", "."), "conf", "plant.yaml");
    }

    private static String text() throws IOException {
        return Files.readString(example());
    }

    private Plant changed(String from, String to) throws IOException {
        String text = text();
        assertThat(text).as("the example has what the test changes").contains(from);
        Path file = folder.resolve("plant.yaml");
        Files.writeString(file, text.replace(from, to));
        return Plant.read(file);
    }

    /** The number of the first line of the changed example that holds this. */
    private int line(String part) throws IOException {
        String[] lines = Files.readString(folder.resolve("plant.yaml")).split("\n", -1);
        for (int i = 0; i < lines.length; i++) {
            if (lines[i].contains(part)) {
                return i + 1;
            }
        }
        throw new AssertionError("no line with " + part);
    }

    @Test
    void theExampleIsValidAndComesOutAsItSays() {
        Plant plant = Plant.read(example());
        assertThat(plant.materialNames()).hasSize(11).startsWith("PET bottle").endsWith("belt");
        assertThat(plant.materials().get(0).grams_per_cm2()).hasValue(0.045);
        assertThat(plant.channels()).isEqualTo(128);
        assertThat(plant.axis_nm()).hasSize(128).startsWith(910.0).endsWith(1690.0);
        assertThat(plant.head().saturatedAt()).hasValue(16383);
        assertThat(plant.head().maxWhiteAge_ms()).hasValue(12 * 3_600_000L);
        assertThat(plant.head().takesLogarithm()).isTrue();
        assertThat(plant.head().appliesSnv()).isTrue();
        assertThat(plant.tail()).isEqualTo(TailSpec.of(new TailSpec.SavitzkyGolay(9, 2, 1)));
        assertThat(plant.countScale().step(127)).isEqualTo(1e-5);
        assertThat(plant.records().layout()).isEqualTo(new ChannelLayout.OneArray("counts"));
        assertThat(plant.records().pathOf(LocalDate.of(2026, 3, 1))).endsWith("conf/records/2026-03-01");
        assertThat(plant.recordColumns().beltColumn()).hasValue("belt_column");
        assertThat(plant.refit().ridge()).isEqualTo(new RefitRecipe.Ridge.Ladder(java.util.List.of(1e-4)));
        assertThat(plant.duties()).hasSize(2);
        assertThat(plant.duties().get(0).sorters()).containsExactly("avocet", "curlew");
        assertThat(plant.duties().get(1).targets()).containsExactly("PE-HD", "PE-LD", "PP");
        assertThat(plant.duties().get(1).sorters()).isEqualTo(plant.sorters());
        assertThat(plant.duties().get(0).requirements().get(1).name())
                .isEqualTo("decision recovery, tray not seen, lower bound");
        assertThat(plant.cautions()).hasSize(1);
    }

    @Test
    void everyKeyOfTheFormIsInTheExample() throws IOException {
        Set<String> keys = new TreeSet<>();
        try (InputStream stream = Plant.class.getResourceAsStream("plant.schema.json")) {
            collect(Json.read(stream.readAllBytes(), "plant.schema.json"), keys);
        }
        assertThat(keys).contains("window_days", "deadAtOrBelow", "firstColumn").hasSizeGreaterThan(90);
        String text = text();
        assertThat(keys).allSatisfy(key -> assertThat(text).containsPattern("\\b" + key + ":|\\b" + key + "[, }]"));
    }

    private static void collect(JsonNode schema, Set<String> keys) {
        schema.path("properties").fieldNames().forEachRemaining(keys::add);
        schema.forEach(part -> collect(part, keys));
    }

    @Test
    void aKeyThatIsNotKnownIsRefusedWithTheNearestOne() {
        assertThat(fault("  window_days:", "  windoww_days:", "windoww_days"))
                .contains("refit.windoww_days")
                .contains("unknown key `windoww_days`, did you mean `window_days`?");
        assertThat(fault("ledger: ledger", "zzzzzzzzzzzzz: 3\nledger: ledger", "zzzzzzzzzzzzz"))
                .contains("unknown key `zzzzzzzzzzzzz`")
                .contains("expected one of plantFile, name");
    }

    /** The message of the refusal, after checking that it names the file and the line of the wrong part. */
    private String fault(String from, String to, String wrong) {
        Fault fault = catchThrowableOfType(Fault.class, () -> changed(from, to));
        assertThat(fault).as("%s is refused", to).isNotNull();
        assertThat(fault.kind()).isEqualTo(Fault.Kind.USAGE);
        try {
            assertThat(fault.getMessage()).contains("plant.yaml line " + line(wrong) + ",");
        } catch (IOException e) {
            throw new AssertionError(e);
        }
        return fault.getMessage();
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            quoteCharacter = '~',
            value = {
                "window_days: 28|window_days: 0|window_days: 0|refit.window_days: too small; found 0, expected at least 1",
                "window_days: 28|window_days: many|window_days: m|wrong kind of value; found `many`, expected a whole number",
                "format: parquet               #|format: hdf #|format: hdf|not a known word; found `hdf`, expected one of parquet, csv",
                "ridge: 0.0001|ridge: analytical|ridge: a|a number, a list of numbers, or the word analytic",
                "ridge: 0.0001|ridge: [0.01, 0.001]|ridge: [|must ascend; found 0.001 after 0.01",
                "since: 2026-03-09|since: 2026-02-30|since: 2026-02-30|there is no such day; found 2026-02-30",
                "sorters: [avocet, curlew, dunlin]|sorters: [avocet, curlew, dunlin, knot]|instruments:|found sorter knot",
                "sorters: [avocet, curlew]|sorters: [avocet, curlwe]|curlwe|unknown sorter `curlwe`, did you mean `curlew`?",
                "targets: [polyolefin]|targets: [polyolefine]|polyolefine|did you mean `polyolefin`?",
                "PE-LD: 0.20, PP: 0.30|PE-LD: 0.20, PP: 0.40|PP: 0.40|shares must sum to 1; found 1.1",
                "window: 9|window: 8|window: 8|a smoothing window must be odd",
                "window: 9|window: 129|window: 129|a smoothing window longer than the channels",
                "noSignalBelow: 0.06|noSignalBelow: 0.0001|  head:|no record could be no signal",
                "input: counts|input: absorbance|  head:|the logarithm of what is a logarithm already",
                "    beltColumn: belt_column     #|    # |records:|no columns.beltColumn",
                "step: 0.00001|step: 0|step: 0|countScale.step: too small; found 0, expected more than 0",
                "grey crates: 3|grey crates: 8|grey crates|too large; found 8, expected at most 7",
                "first_nm: 902.4|first_nm: 911.4|avocet, since|the axis leaves the range of the instrument",
                "name: PE-LD, grams_per_cm2: 0.012|name: PE-HD, grams_per_cm2: 0.012|0.012|material `PE-HD` is given twice",
                "name: PP, grams_per_cm2: 0.060|name: PP|{PET bottle: 0.45|found none for PP",
                "name: PVC|name: 12|name: 12|put a text that looks like a number in quotes",
                "  path: references |  path: references/{day} |references/{day}|references have one path for all days",
                "perTask_bytes: 268435456|perTask_bytes: 1024|perTask_bytes|at least 1048576",
            })
    void aWrongValueIsRefusedWithFileLineKeyFoundAndExpected(String from, String to, String wrong, String says) {
        assertThat(fault(from, to, wrong)).contains(says);
    }

    @Test
    void aMissingKeyIsNamed() {
        Fault fault = catchThrowableOfType(Fault.class, () -> changed("ledger: ledger\n", ""));
        assertThat(fault).hasMessageContaining("key `ledger` is missing");
    }

    @Test
    void aKeyGivenTwiceIsRefusedWithBothLines() {
        String message = fault("shelf: shelf\n", "shelf: shelf\nledger: other\n", "ledger: other");
        assertThat(message).contains("key `ledger` is given twice").containsPattern("found lines \\d+ and \\d+");
    }

    @Test
    void brokenYamlAnAliasAndASecondDocumentAreRefused() {
        assertThat(catchThrowableOfType(Fault.class, () -> changed("sorters: [avocet,", "sorters: [avocet: ,{")))
                .hasMessageContaining("not valid YAML")
                .hasMessageContaining("plant.yaml line ");
        assertThat(fault("name: Shore (invented)", "name: &n Shore\nshelf: *n", "shelf: *n"))
                .contains("an alias is not allowed");
        assertThat(catchThrowableOfType(Fault.class, () -> changed("release: by hand", "---\nrelease: by hand")))
                .hasMessageContaining("a plant file is one document");
    }

    @Test
    void aFileThatIsNotThereIsAFaultOfUsage() {
        assertThat(catchThrowableOfType(Fault.class, () -> Plant.read(folder.resolve("none.yaml"))))
                .hasMessageContaining("there is no such plant file")
                .extracting(Fault::kind)
                .isEqualTo(Fault.Kind.USAGE);
    }

    @Test
    void theNewestInstrumentThatIsNotLaterServes() {
        Plant plant = Plant.read(example());
        assertThat(plant.instrument("dunlin", LocalDate.of(2026, 2, 28))).isEmpty();
        assertThat(plant.instrument("dunlin", LocalDate.of(2026, 3, 8)).map(Instrument::name))
                .hasValue("dunlin@2026-03-01");
        assertThat(plant.instrument("dunlin", LocalDate.of(2026, 3, 9)).map(Instrument::name))
                .hasValue("dunlin@2026-03-09");
        assertThat(plant.instrument("heron", LocalDate.of(2026, 3, 9))).isEmpty();
        assertThat(plant.instrument("curlew", LocalDate.of(2026, 3, 1))
                        .orElseThrow()
                        .deadChannels())
                .containsExactly(76);
    }

    @Test
    void whatIsLeftOutHasTheStatedDefault() throws IOException {
        String text = text();
        String shorter = text.substring(0, text.indexOf("trayGroups:"))
                + "ledger: s3a://bucket/ledger\nshelf: /data/shelf\nruns: runs\n"
                + text.substring(text.indexOf("duties:"), text.indexOf("release:"));
        Path file = folder.resolve("short.yaml");
        Files.writeString(file, shorter, StandardCharsets.UTF_8);
        Plant plant = Plant.read(file);
        Plant full = Plant.read(example());
        assertThat(plant.trayGroups()).isEqualTo(8);
        assertThat(plant.quarantineLimit()).isEqualTo(full.quarantineLimit());
        assertThat(plant.refit()).isEqualTo(full.refit());
        assertThat(plant.perTask_bytes()).isEqualTo(full.perTask_bytes());
        assertThat(plant.project()).isEqualTo(full.project());
        assertThat(plant.release()).isEqualTo(full.release());
        assertThat(plant.cautions()).isEmpty();
        assertThat(plant.ledger()).isEqualTo("s3a://bucket/ledger");
        assertThat(plant.shelf()).isEqualTo("/data/shelf");
        assertThat(plant.runs()).isEqualTo(folder.toAbsolutePath().normalize() + "/runs");
    }

    @Test
    void theFingerprintIsOfWhatChangesNumbersOnly() throws IOException {
        String full = Plant.read(example()).fingerprint();
        assertThat(changed("ledger: ledger", "ledger: elsewhere").fingerprint()).isEqualTo(full);
        assertThat(changed("release: by hand", "release: automatic").fingerprint())
                .isEqualTo(full);
        assertThat(changed("piece: piece", "piece: item").fingerprint()).isEqualTo(full);
        assertThat(changed("ridge: 0.0001", "ridge: 0.001").fingerprint()).isNotEqualTo(full);
        assertThat(changed("window: 9", "window: 11").fingerprint()).isNotEqualTo(full);
        assertThat(changed("grey crates: 3", "grey crates: 2").fingerprint()).isNotEqualTo(full);
        assertThat(changed("first_nm: 902.6", "first_nm: 902.7").fingerprint()).isNotEqualTo(full);
        assertThat(changed("least: 0.88", "least: 0.87").fingerprint()).isNotEqualTo(full);
    }

    @Test
    void aDutySaysWhatItFixesGuardsAndLimits() throws IOException {
        Plant plant = Plant.read(example());
        DutyTerms terms = plant.duties().get(0).terms();
        assertThat(terms.required()).hasValue(new Required(Requirement.Figure.DECISION_PURITY, 0.95));
        assertThat(terms.cut()).isEqualTo(DutyTerms.CutRule.LOWER);
        assertThat(terms.gain()).isEqualTo(new GainRule(0, 0.95, 5, 2, 4));
        assertThat(terms.mixDeviation()).containsEntry("PET bottle", 0.03).hasSize(2);
        assertThat(terms.costs()).hasValue(new DutyTerms.Costs(180, 420));
        assertThat(terms.guards())
                .extracting(Guard::name)
                .containsExactly(
                        "guard: sorter loss, point",
                        "guard: purity loss, upper bound",
                        "guard: quarantined share",
                        "guard: showings");
        assertThat(terms.limits()).containsExactly(new PpmLimit("PVC", 50, PpmLimit.Use.REPORT, 0.95));
        assertThat(plant.duties().get(1).terms()).isEqualTo(DutyTerms.standard());
        assertThat(changed("days: 5", "days: 6").fingerprint()).isNotEqualTo(plant.fingerprint());
        assertThat(changed("least: 8}", "least: 9}").fingerprint()).isNotEqualTo(plant.fingerprint());
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            quoteCharacter = '~',
            value = {
                "name: sorter loss|name: sorter los|sorter los,|unknown guard `sorter los`, did you mean `sorter loss`?",
                "most: 0.03, bound|least: 0.03, bound|least: 0.03, bound|takes a limit from the other side; found key `least`",
                "showings, least: 8|showings, least: 8, bound: point|8, bound: point|guard `showings` has no interval",
                "purity, share: 0.95|purty, share: 0.95|purty|not a known word, did you mean",
                "material: PVC, most|material: PET bottle, most|material: PET bottle, most|that is not a target",
                "material: PVC, most|material: PVV, most|PVV|unknown material `PVV`, did you mean `PVC`?",
                "above: 0 |abov: 0 |abov: 0|unknown key `abov`, did you mean `above`?",
                "PET tray: 0.02}|PA: 0.02}|PA: 0.02}|unknown material of the infeed `PA`",
                "quarantined share, most: 0.02|purity loss, most: 0.02|purity loss, most: 0.02|guard `purity loss` is given twice",
                "    required: {|    requierd: {|requierd|unknown key `requierd`, did you mean `required`?",
            })
    void whatADutyDemandsIsKnownByName(String from, String to, String wrong, String message) {
        assertThat(fault(from, to, wrong)).contains(message);
    }

    @Test
    void wavelengthsComeFromAListOrAFileToo() throws IOException {
        StringBuilder lines = new StringBuilder("wavelength_nm\n");
        StringBuilder list = new StringBuilder();
        for (int c = 0; c < 128; c++) {
            lines.append(900 + 6.5 * c).append('\n');
            list.append(c == 0 ? "" : ", ").append(900 + 6.5 * c);
        }
        Files.writeString(folder.resolve("table.csv"), lines);
        String even = "wavelengths: {first_nm: 902.4, last_nm: 1702.8, channels: 128}";
        LocalDate day = LocalDate.of(2026, 3, 1);
        Instrument fromFile = changed(even, "wavelengths: {file: table.csv}")
                .instrument("avocet", day)
                .orElseThrow();
        Instrument fromList = changed(even, "wavelengths: {at_nm: [" + list + "]}")
                .instrument("avocet", day)
                .orElseThrow();
        assertThat(fromFile.wavelength_nm()).isEqualTo(fromList.wavelength_nm()).startsWith(900.0, 906.5);
        Files.writeString(folder.resolve("table.csv"), lines.toString().replace("906.5", "9o6.5"));
        assertThat(fault(even, "wavelengths: {file: table.csv}", "table.csv"))
                .contains("table.csv line 3")
                .contains("found 9o6.5");
    }
}
