package turnstone.cluster;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.List;
import java.util.concurrent.TimeUnit;
import java.util.stream.Stream;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.Timeout;
import turnstone.spark.Session;

/**
 * Nights of a small plant on a master and two workers, one of whose executors is ended in the middle of the first fold, beside the same nights on
 * one processor of this process: the canonical content is the same to the last bit.
 */
class ClusterNightTest {
    private static final Path FOLDER = Path.of(System.getProperty("turnstone.basedir"), "target", "cluster", "night");
    private static final LocalDate FIRST = LocalDate.of(2026, 3, 2);
    private static final LocalDate LAST = LocalDate.of(2026, 3, 3);

    private static Session session;
    private static SmallPlant here;
    private static SmallPlant there;
    private static Ended posted;
    private static Ended night;

    @BeforeAll
    @Timeout(value = 10, unit = TimeUnit.MINUTES)
    static void runTheNightsHereAndThere() throws IOException {
        session = Session.open(Session.Settings.local("here", 1));
        here = SmallPlant.write(session, FOLDER.resolve("here"), 2);
        there = here.copy(FOLDER.resolve("there"));
        here.post(session, FIRST);
        here.release();
        here.nightly(session, LAST);
        try (StandaloneCluster cluster = StandaloneCluster.start(FOLDER.resolve("cluster"), 2)) {
            posted = postAndLoseAnExecutor(cluster);
            there.release();
            night = cluster.turnstone("nightly", "--plant", there.file());
        }
    }

    private static Ended postAndLoseAnExecutor(StandaloneCluster cluster) {
        try (StopPoint point = StopPoint.listen()) {
            LoggedProcess run = cluster.startTurnstone(
                    List.of("--conf", "spark.executor.extraJavaOptions=" + point.javaOption()),
                    "post",
                    "--plant",
                    there.file(),
                    "--day",
                    FIRST.toString());
            StopPoint.Held one = point.accept();
            point.accept().release();
            one.runTo("turnstone.spark.FoldTask", "foldOn");
            one.end();
            return run.await(StandaloneCluster.RUN_LIMIT);
        }
    }

    @AfterAll
    static void close() {
        if (session != null) {
            session.close();
        }
    }

    @Test
    void everyRunOnTheClusterEndsWell() {
        assertThat(posted.exitCode()).as(posted.talk()).isZero();
        assertThat(night.exitCode()).as(night.talk()).isZero();
        assertThat(night.out().lines().reduce("", (before, line) -> line)).isEqualTo("verdict: hold");
        assertThat(night.talk()).contains("spark://127.0.0.1:").doesNotContain("\r", "WARN");
    }

    @Test
    void theExecutorWasLostWhileItFolded() throws IOException {
        try (Stream<Path> logs = Files.list(FOLDER.resolve("cluster/log"))) {
            assertThat(logs.map(ClusterNightTest::text)).anyMatch(log -> log.contains("ExecutorLostFailure"));
        }
    }

    @Test
    void theNumbersAreThoseOfOneProcessor() {
        SmallPlant.Canonical ofCluster = there.canonical(session, LAST, "0001");
        SmallPlant.Canonical ofOneProcessor = here.canonical(session, LAST, "0001");
        assertThat(ofCluster.sums()).hasSize(2).isEqualTo(ofOneProcessor.sums());
        assertThat(ofCluster.model()).isEqualTo(ofOneProcessor.model());
        assertThat(ofCluster.trial()).isEqualTo(ofOneProcessor.trial());
        assertThat(ofCluster.verdict()).isEqualTo(ofOneProcessor.verdict());
        assertThat(ofCluster.decisions()).hasSizeGreaterThan(1500).isEqualTo(ofOneProcessor.decisions());
        assertThat(there.ledger().verify()).isEmpty();
    }

    private static String text(Path file) {
        try {
            return Files.readString(file);
        } catch (IOException failure) {
            throw new java.io.UncheckedIOException(failure);
        }
    }
}
