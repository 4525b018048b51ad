package turnstone.cli;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.Arrays;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import turnstone.ledger.Ledger;
import turnstone.ledger.LedgerFixture;
import turnstone.ledger.Replace;
import turnstone.night.Places;
import turnstone.plant.Plant;

/** The commands of the shelf, as typed, with real models made from a small ledger. */
class ShelfCommandsTest {
    private static final LocalDate MONDAY = LocalDate.of(2026, 3, 2);

    private static final String PLANT = """
            plantFile: 1
            name: Small (invented)
            materials: [{name: PET bottle}, {name: PP}]
            sorters: [avocet, curlew, dunlin]
            instruments:
              - {sorter: avocet, since: 2026-01-01}
              - {sorter: curlew, since: 2026-01-01}
              - {sorter: dunlin, since: 2026-01-01}
            channels: 3
            records: {path: records, format: csv, layout: {prefix: c}}
            pretreatment: {input: absorbance}
            countScale: {offset: 0, step: 1, precision: coarse}
            trayGroups: {count: 2}
            ledger: ledger
            shelf: shelf
            runs: runs
            duties:
              - name: bottles
                targets: [PET bottle]
                productStream: ejected
                infeedMix: {PET bottle: 0.6, PP: 0.4}
                requirements: [{figure: decision purity, least: 0.9}]
            """;

    @TempDir
    Path folder;

    private String out;
    private String err;

    @BeforeEach
    void postTwoDays() throws IOException {
        Files.writeString(plantFile(), PLANT);
        Ledger ledger = Places.ledger(Plant.read(plantFile()));
        ledger.post(LedgerFixture.draft(MONDAY, "mon", 1), Replace.NO);
        ledger.post(LedgerFixture.draft(MONDAY.plusDays(1), "tue", 2), Replace.NO);
    }

    private Path plantFile() {
        return folder.resolve("plant.yaml");
    }

    private int run(String... arguments) {
        String[] all = Arrays.copyOf(arguments, arguments.length + 2);
        all[arguments.length] = "--plant";
        all[arguments.length + 1] = plantFile().toString();
        return runAsIs(all);
    }

    private void makeKey(String file) {
        assertThat(runAsIs("key", "--out", file)).as(() -> err).isZero();
    }

    private int runAsIs(String... arguments) {
        ByteArrayOutputStream output = new ByteArrayOutputStream();
        ByteArrayOutputStream errors = new ByteArrayOutputStream();
        int code = Main.run(
                arguments,
                new PrintStream(output, true, StandardCharsets.UTF_8),
                new PrintStream(errors, true, StandardCharsets.UTF_8));
        out = output.toString(StandardCharsets.UTF_8);
        err = errors.toString(StandardCharsets.UTF_8);
        return code;
    }

    /** A model made by the program, its first digits. */
    private String refit(String ridge) {
        assertThat(run("refit", "--ridge", ridge)).as(err).isZero();
        return out.lines()
                .filter(line -> line.startsWith("candidate "))
                .findFirst()
                .orElseThrow()
                .substring(10, 22);
    }

    private void release(String... more) {
        String[] all = new String[more.length + 3];
        all[0] = "release";
        System.arraycopy(more, 0, all, 1, more.length);
        all[more.length + 1] = "--reason";
        all[more.length + 2] = "because";
        assertThat(run(all)).as(() -> err).isZero();
    }

    @Test
    void aSplitIsReleasedToldAndEnded() {
        String a = refit("1e-3");
        String b = refit("1e-2");
        release(a);
        release(b, "--sorters", "avocet,curlew");
        assertThat(out).contains("now in service on avocet, curlew, instead of " + a);
        assertThat(run("history")).isZero();
        assertThat(out).contains("now: the fleet runs " + a + "; avocet, curlew run " + b);
        assertThat(run("history", "--as-of", "2999-12-31")).isZero();
        assertThat(out).containsPattern("avocet  " + b).containsPattern("dunlin  " + a);
        assertThat(run("history", "--as-of", "2020-01-01")).isZero();
        assertThat(out).contains("dunlin  nothing");
        assertThat(run("history", "--as-of", "yesterday")).isEqualTo(2);
        assertThat(run("release", b, "--sorters", "avocett", "--reason", "r")).isEqualTo(2);
        assertThat(err).contains("did you mean `avocet`");
        release(b);
        assertThat(run("history")).isZero();
        assertThat(out).endsWith("now: the fleet runs " + b + System.lineSeparator());
    }

    @Test
    void aWithdrawnModelComesBackOnlyWhenSaidSo() {
        String a = refit("1e-3");
        String b = refit("1e-2");
        assertThat(run("withdraw", b, "--reason", "r")).isEqualTo(3);
        release(a);
        release(b);
        assertThat(run("withdraw", b, "--reason", "mislabelled tray")).isZero();
        assertThat(out).contains("withdrawn  " + b).contains("put back  " + a);
        assertThat(run("release", b, "--reason", "r")).isEqualTo(3);
        assertThat(err).contains("mislabelled tray").contains("--although-withdrawn");
        release(b, "--although-withdrawn");
        assertThat(run("verify")).as(err).isZero();
    }

    @Test
    void onlyTheKeysOwnModelsAreVerified() throws IOException {
        String a = refit("1e-3");
        String b = refit("1e-2");
        String ours = folder.resolve("ours").toString();
        String theirs = folder.resolve("theirs").toString();
        makeKey(ours);
        makeKey(theirs);
        release(a, "--key", ours);
        assertThat(run("verify", "--key", ours + ".public")).as(err).isZero();
        assertThat(out).contains("model " + a + " is signed by key ");
        assertThat(run("verify", "--key", theirs + ".public")).isEqualTo(3);
        assertThat(err).contains("not signed with this key");
        assertThat(run("verify", b, "--key", ours + ".public")).isEqualTo(3);
        release(b, "--sorters", "avocet", "--key", theirs);
        assertThat(run("verify", "--key", ours + ".public")).isEqualTo(3);
        assertThat(run("verify", a, "--key", ours + ".public")).isZero();
        Path copy = folder.resolve("board.json");
        Files.writeString(copy, run("show", a, "--json") == 0 ? out : "");
        assertThat(run("verify", copy.toString(), "--key", ours + ".public"))
                .as(err)
                .isZero();
        Files.writeString(copy, out(copy).replaceFirst("\"ridge\" ?: ?0.001", "\"ridge\" : 0.002"));
        assertThat(run("verify", copy.toString(), "--key", ours + ".public")).isEqualTo(4);
        assertThat(err).contains("altered");
    }

    private static String out(Path file) throws IOException {
        return Files.readString(file);
    }

    @Test
    void aPlantThatRefusesUnsignedModelsSaysHowToSign() throws IOException {
        String a = refit("1e-3");
        Path key = folder.resolve("shore");
        makeKey(key.toString());
        Files.writeString(plantFile(), PLANT + "signing: {unsigned: refused, publicKey: shore.public}\n");
        assertThat(run("release", a, "--reason", "r")).isEqualTo(3);
        assertThat(err).contains("--key");
        Files.writeString(plantFile(), PLANT + "signing: {unsigned: refused}\n");
        assertThat(run("history")).isEqualTo(2);
        assertThat(err).contains("publicKey");
        Files.writeString(
                plantFile(), PLANT + "release: automatic\nsigning: {unsigned: refused, publicKey: shore.public}\n");
        assertThat(run("history")).isEqualTo(2);
        assertThat(err).contains("a night that releases has to sign").contains("privateKey");
        Files.writeString(plantFile(), PLANT + "signing: {unsigned: never}\n");
        assertThat(run("history")).isEqualTo(2);
        assertThat(err).contains("unsigned");
        Files.writeString(
                plantFile(), PLANT + "signing: {unsigned: refused, publicKey: shore.public, privateKey: shore}\n");
        release(a);
        assertThat(out).contains("signed by key");
        assertThat(run("verify")).as(err).isZero();
        assertThat(out).contains("is signed by");
    }

    @Test
    void aModelIsMadeAgainAndItsLineageIsAPage() {
        String a = refit("1e-3");
        release(a);
        String b = refit("1e-2");
        assertThat(run("refit", "--again", b)).as(err).isZero();
        assertThat(out).startsWith("same numbers: " + b);
        assertThat(run("refit", "--again", b, "--ridge", "1e-3")).isEqualTo(2);
        assertThat(run("show", b, "--lineage")).isZero();
        assertThat(out)
                .contains("of 2 ledger days")
                .containsPattern("2026-03-02 +1  [0-9a-f]{16}  the same")
                .contains("oriented to   " + a)
                .containsPattern("avocet@2026-01-01 +\\d+ \\(4\\) +\\d+ \\(4\\)")
                .contains("Never in service");
        assertThat(out.lines()).allSatisfy(line -> assertThat(line.length()).isLessThanOrEqualTo(80));
        Places.ledger(Plant.read(plantFile())).post(LedgerFixture.draft(MONDAY, "mon", 7), Replace.YES);
        assertThat(run("show", b, "--lineage")).isZero();
        assertThat(out).contains("revision 2 since");
        assertThat(run("refit", "--again", b)).as(err).isZero();
    }

    @Test
    void aModelThatDoesNotFitThePlantIsNotReleased() throws IOException {
        String a = refit("1e-3");
        release(a);
        String b = refit("1e-2");
        Files.writeString(plantFile(), PLANT.replace("step: 1,", "step: 0.5,"));
        assertThat(run("release", b, "--reason", "r")).isEqualTo(3);
        assertThat(err).contains("another count scale").contains("step");
        Files.writeString(
                plantFile(), PLANT.replace("channels: 3\n", "axis: {first_nm: 1000, last_nm: 1200, channels: 3}\n"));
        assertThat(run("release", b, "--reason", "r")).isEqualTo(3);
        assertThat(err).contains("another wavelength axis").contains("3 channels from 1000");
        Files.writeString(plantFile(), PLANT.replace("input: absorbance}", "input: absorbance, head: {snv: on}}"));
        assertThat(run("release", b, "--reason", "r")).isEqualTo(3);
        assertThat(err).contains("another pretreatment head");
        Files.writeString(plantFile(), PLANT);
        assertThat(run("history")).isZero();
        assertThat(out.lines()).hasSize(3);
        release(b);
    }

    @Test
    void wholeNumbersOfTheHeadAreTheSameInTheFile() throws IOException {
        String plant = PLANT.replace("ledger: ledger", "ledger: ledger-2")
                .replace("channels: 3\n", "axis: {first_nm: 1000, last_nm: 1200, channels: 3}\n")
                .replace("input: absorbance}", "input: counts, head: {saturatedAt: 16383, deadAtOrBelow: 0}}");
        Files.writeString(plantFile(), plant);
        Ledger ledger = Places.ledger(Plant.read(plantFile()));
        ledger.post(LedgerFixture.draft(MONDAY, "mon", 1), Replace.NO);
        release(refit("1e-3"));
        // The next one looks at what is in service.
        release(refit("1e-2"));
    }

    @Test
    void anAuditIsEnteredAndListed() {
        String[] add = {"audit", "add", "--date", "2026-03-14", "--duty", "bottles", "--mass", "PET bottle=97.5,PP=2.5"
        };
        assertThat(run(add)).as(err).isZero();
        assertThat(out).contains("97.50 % target");
        assertThat(run(add)).isEqualTo(3);
        assertThat(run("audit", "list")).isZero();
        assertThat(out).contains("2026-03-14  bale, product of bottles");
        assertThat(run("audit", "add", "--date", "2026-03-14", "--duty", "botles", "--mass", "PP=1"))
                .isEqualTo(2);
        assertThat(err).contains("did you mean `bottles`");
        assertThat(run("audit", "add", "--date", "2026-03-14", "--duty", "bottles", "--mass", "PVC=1"))
                .isEqualTo(2);
        assertThat(run("audit", "add", "--date", "2026-03-14", "--duty", "bottles", "--mass", "PP=-1"))
                .isEqualTo(2);
        assertThat(run("audit", "add", "--date", "2026-03-14", "--duty", "bottles", "--valves", "decided=1"))
                .isEqualTo(2);
        assertThat(run("verify")).as(err).isZero();
    }
}
