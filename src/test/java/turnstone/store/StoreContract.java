package turnstone.store;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import java.util.List;
import java.util.Random;
import java.util.concurrent.Callable;
import java.util.concurrent.CyclicBarrier;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import turnstone.fault.Fault;
import turnstone.json.Json;

/** What every store has to keep, whatever it is made of. */
abstract class StoreContract {
    private static final int ROUNDS = 50;

    /** The store under test: each call another object on the same files. */
    abstract Store store();

    @Test
    void whatIsPublishedIsReadBack() throws IOException {
        assertThat(store().publish("a/b/c.json", bytes("one"))).isEqualTo(Outcome.PUBLISHED);
        assertThat(store().read("a/b/c.json").orElseThrow()).isEqualTo(bytes("one"));
        assertThat(store().size("a/b/c.json")).hasValue(3);
        try (InputStream in = store().open("a/b/c.json")) {
            assertThat(in.readAllBytes()).isEqualTo(bytes("one"));
        }
    }

    @Test
    void whatIsNotThereIsEmpty() {
        assertThat(store().read("a/none")).isEmpty();
        assertThat(store().size("a/none")).isEmpty();
        assertThatThrownBy(() -> store().open("a/none").close())
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.STORAGE))
                .hasMessageContaining("a/none")
                .hasMessageContaining("no such file");
    }

    @Test
    void nothingIsEverReplaced() {
        store().publish("x", bytes("first"));
        assertThat(store().publish("x", bytes("second"))).isEqualTo(Outcome.LOST);
        assertThat(store().publish("x", bytes("first"))).as("equal content too").isEqualTo(Outcome.LOST);
        assertThatThrownBy(() -> store().write("x", out -> out.write(1)))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("there is a file already");
        assertThat(store().read("x").orElseThrow()).isEqualTo(bytes("first"));
    }

    @Test
    void aLongFileIsWrittenWithItsDigest() {
        byte[] content = new byte[3_000_001];
        new Random(7).nextBytes(content);
        Written written = store().write("parts/long", out -> {
            out.write(content[0]);
            out.write(content, 1, 1_000_000);
            out.write(content, 1_000_001, content.length - 1_000_001);
        });
        assertThat(written).isEqualTo(new Written("parts/long", content.length, Json.sha256(content)));
        assertThat(Content.check(store(), written)).isEmpty();
        assertThat(Content.<byte[]>read(store(), written, InputStream::readAllBytes))
                .isEqualTo(content);
    }

    @Test
    void aReaderThatStopsEarlyStillGetsTheWholeFileChecked() {
        Written written = store().write("p", out -> out.write(bytes("abcdef")));
        assertThat(Content.<Integer>read(store(), written, InputStream::read)).isEqualTo('a');
        Written other = new Written("p", 6, Json.sha256(bytes("abcdeg")));
        assertThatThrownBy(() -> Content.<Integer>read(store(), other, InputStream::read))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("/p")
                .hasMessageContaining("not what was written: altered")
                .hasMessageContaining(other.sha256());
    }

    @Test
    void aFileThatIsMissingShorterOrOtherIsTold() {
        Written written = store().write("p", out -> out.write(bytes("abcdef")));
        assertThat(trouble(new Written("q", 6, written.sha256()))).isEqualTo(Problem.Trouble.MISSING);
        assertThat(trouble(new Written("p", 7, written.sha256()))).isEqualTo(Problem.Trouble.TRUNCATED);
        assertThat(trouble(new Written("p", 5, written.sha256()))).isEqualTo(Problem.Trouble.ALTERED);
        Problem problem = Content.check(store(), new Written("p", 6, Json.sha256(bytes("other!"))))
                .orElseThrow();
        assertThat(problem.trouble()).isEqualTo(Problem.Trouble.ALTERED);
        assertThat(problem.expected()).contains(Json.sha256(bytes("other!")));
        assertThat(problem.found()).contains(written.sha256());
    }

    @Test
    void discardingMakesRoomAndMayComeTwice() {
        store().publish("x", bytes("first"));
        store().discard("x");
        store().discard("x");
        assertThat(store().publish("x", bytes("second"))).isEqualTo(Outcome.PUBLISHED);
    }

    @ParameterizedTest
    @ValueSource(
            strings = {"", "/a", "a/", "a//b", ".", "..", "a/../b", ".hidden", "a/.b", "a b", "a\\b", "a\nb", "ä", "-a"
            })
    void aNameThatCouldClimbHideOrBeSpelledTwiceIsRefused(String name) {
        assertThatThrownBy(() -> store().read(name)).isInstanceOf(IllegalArgumentException.class);
        assertThatThrownBy(() -> store().publish(name, new byte[1])).isInstanceOf(IllegalArgumentException.class);
        assertThatThrownBy(() -> store().write(name, out -> out.write(1))).isInstanceOf(IllegalArgumentException.class);
        assertThatThrownBy(() -> store().discard(name)).isInstanceOf(IllegalArgumentException.class);
    }

    @Test
    void ofTwoRacersExactlyOneWins() throws Exception {
        Store first = store();
        Store second = store();
        CyclicBarrier start = new CyclicBarrier(2);
        ExecutorService racers = Executors.newFixedThreadPool(2);
        try {
            for (int round = 0; round < ROUNDS; round++) {
                String name = "race/" + round;
                List<Future<Outcome>> outcomes = racers.invokeAll(
                        List.of(racer(first, start, name, "first"), racer(second, start, name, "second")));
                boolean firstWon = outcomes.get(0).get() == Outcome.PUBLISHED;
                boolean secondWon = outcomes.get(1).get() == Outcome.PUBLISHED;
                assertThat(firstWon).as("round " + round).isNotEqualTo(secondWon);
                assertThat(store().read(name).orElseThrow()).isEqualTo(bytes(firstWon ? "first" : "second"));
            }
        } finally {
            racers.shutdownNow();
        }
    }

    private Problem.Trouble trouble(Written written) {
        return Content.check(store(), written).orElseThrow().trouble();
    }

    private static Callable<Outcome> racer(Store store, CyclicBarrier start, String name, String content) {
        return () -> {
            start.await();
            return store.publish(name, bytes(content));
        };
    }

    static byte[] bytes(String text) {
        return text.getBytes(StandardCharsets.UTF_8);
    }
}
