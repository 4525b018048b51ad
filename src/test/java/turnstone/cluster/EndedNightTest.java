package turnstone.cluster;

import static org.assertj.core.api.Assertions.assertThat;

import java.nio.file.Path;
import java.time.Duration;
import java.time.LocalDate;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.Stream;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import turnstone.ledger.DayEntry;
import turnstone.spark.Session;

/** Nights ended in the middle through the launcher: nothing half done is left, and the next run gives what an undisturbed one gives. */
class EndedNightTest {
    private static final Path BASE = Path.of(System.getProperty("turnstone.basedir"));
    private static final Path FOLDER = BASE.resolve("target/cluster/ended");
    private static final Duration LIMIT = Duration.ofMinutes(3);
    private static final LocalDate FIRST = LocalDate.of(2026, 3, 2);
    private static final LocalDate LAST = LocalDate.of(2026, 3, 3);
    private static final int KILLED = 137;
    private static final int TERMINATED = 143;
    private static final int INTERRUPTED = 130;
    private static final int BUSY = 5;
    private static final int STORAGE = 4;

    private static Session session;
    private static SmallPlant before;
    private static SmallPlant.Canonical undisturbed;

    @BeforeAll
    static void runOneNightUndisturbed() {
        session = Session.open(Session.Settings.local("undisturbed", 2));
        before = SmallPlant.write(session, FOLDER.resolve("before"), 2);
        before.post(session, FIRST);
        before.release();
        SmallPlant plant = before.copy(FOLDER.resolve("undisturbed"));
        plant.nightly(session, LAST);
        undisturbed = plant.canonical(session, LAST, "0001");
    }

    @AfterAll
    static void close() {
        if (session != null) {
            session.close();
        }
    }

    private static LoggedProcess launch(String name, StopPoint point, List<String> command) {
        Map<String, String> environment = new HashMap<>(Map.of(
                "TURNSTONE_BUILD",
                "never",
                "TURNSTONE_LOG_DIR",
                FOLDER.resolve("log").toString(),
                "TURNSTONE_HEAP",
                "1g",
                "JAVA_HOME",
                System.getProperty("java.home")));
        if (point != null) {
            environment.put("JAVA_TOOL_OPTIONS", point.javaOption());
        }
        return LoggedProcess.start(name, FOLDER, command, environment);
    }

    private static List<String> turnstone(String command, SmallPlant plant) {
        return List.of(
                BASE.resolve("scripts/turnstone").toString(),
                command,
                "--master",
                "local[2]",
                "--plant",
                plant.file(),
                "--day",
                LAST.toString());
    }

    /** A shell that runs beside others ignores Ctrl-C, and so does all that it starts: this takes that back. */
    private static List<String> heedingSignals(List<String> command) {
        return Stream.concat(Stream.of("env", "--default-signal=INT,TERM"), command.stream())
                .toList();
    }

    @ParameterizedTest
    @CsvSource({
        "KILL, turnstone.spark.FoldTask, foldOn, 137",
        "INT, turnstone.spark.FoldTask, foldOn, 130",
        "TERM, turnstone.ledger.Posting, commit, 143",
        "KILL, turnstone.ledger.Posting, commit, 137",
        "KILL, turnstone.night.TrialFiles, write, 137"
    })
    void aNightThatIsEndedLeavesNothingHalfDone(String signal, String type, String method, int code) {
        String name = "ended-" + signal + "-" + method;
        SmallPlant plant = before.copy(FOLDER.resolve(name));
        Ended ended;
        try (StopPoint point = StopPoint.listen();
                LoggedProcess run = launch(name, point, heedingSignals(turnstone("nightly", plant)))) {
            StopPoint.Held held = point.accept();
            held.runTo(type, method);
            run.signal(signal);
            ended = run.await(LIMIT);
        }
        assertThat(ended.exitCode()).as(ended.talk()).isEqualTo(code);
        assertThat(ended.out()).isEmpty();
        List<String> complaints = ended.talk()
                .lines()
                .filter(line -> line.startsWith("turnstone: "))
                .toList();
        if (code == KILLED) {
            assertThat(complaints).isEmpty();
        } else {
            assertThat(code).isIn(TERMINATED, INTERRUPTED);
            assertThat(complaints)
                    .singleElement()
                    .satisfies(line -> assertThat(line).contains("interrupted", "run it again"));
            assertThat(ended.talk().lines().reduce("", (all, line) -> line)).isEqualTo(complaints.get(0));
        }
        assertThat(plant.hasVerdict(LAST)).isFalse();
        assertThat(plant.ledger().verify()).isEmpty();
        // What is told to end between parts and entry may still get the entry out: all of it or nothing.
        if (code == KILLED || method.equals("foldOn")) {
            boolean posted = type.startsWith("turnstone.night");
            assertThat(plant.ledger().day(LAST).isPresent()).isEqualTo(posted);
        }

        plant.nightly(session, LAST);
        assertThat(plant.canonical(session, LAST, "0002")).isEqualTo(undisturbed);
        assertThat(plant.ledger().verify()).isEmpty();
    }

    @Test
    void ofTwoWhoPostADayAtOnceOneWinsAndTheOtherIsBusy() {
        SmallPlant plant = before.copy(FOLDER.resolve("two"));
        Ended second;
        try (StopPoint point = StopPoint.listen();
                LoggedProcess run = launch("two", point, turnstone("post", plant))) {
            StopPoint.Held held = point.accept();
            held.runTo("turnstone.ledger.Posting", "commit");
            plant.post(session, LAST);
            held.release();
            second = run.await(LIMIT);
        }
        assertThat(second.exitCode()).as(second.talk()).isEqualTo(BUSY);
        assertThat(second.out()).isEmpty();
        assertThat(second.talk().lines().filter(line -> line.startsWith("turnstone: ")))
                .singleElement()
                .satisfies(line -> assertThat(line).contains("somebody else posted this day", LAST.toString()));
        assertThat(plant.ledger().days()).extracting(DayEntry::revision).containsExactly(1, 1);
        assertThat(plant.ledger().verify()).isEmpty();
        assertThat(plant.partFolders(LAST))
                .as("the loser's parts are taken away")
                .hasSize(1);
    }

    @Test
    void aFileThatFindsNoRoomIsOneLineAndLeavesNoEntry() {
        SmallPlant plant = before.copy(FOLDER.resolve("room"));
        Ended ended;
        try (StopPoint point = StopPoint.listen();
                LoggedProcess run = launch("room", point, turnstone("post", plant))) {
            StopPoint.Held held = point.accept();
            held.runTo("turnstone.ledger.Posting", "writeParts");
            // The day's sums are larger.
            run.limitFiles(100_000);
            held.release();
            ended = run.await(LIMIT);
        }
        assertThat(ended.exitCode()).as(ended.talk()).isEqualTo(STORAGE);
        assertThat(ended.out()).isEmpty();
        assertThat(ended.talk().lines().filter(line -> line.startsWith("turnstone: ")))
                .singleElement()
                .satisfies(line -> assertThat(line).contains("ledger/days/" + LAST, "moments", "can't be written"));
        assertThat(plant.ledger().day(LAST)).isEmpty();
        assertThat(plant.ledger().verify()).isEmpty();
        assertThat(plant.partFolders(LAST)).as("what was begun is taken away").isEmpty();
        plant.nightly(session, LAST);
        assertThat(plant.canonical(session, LAST, "0002")).isEqualTo(undisturbed);
    }
}
