package turnstone.checks;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.ByteArrayOutputStream;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.util.List;
import turnstone.cli.Main;

/**
 * One command as a user gives it, on the engine that the tests share.
 *
 * @param code the exit code
 * @param out what it printed as its result
 * @param err what it said beside
 */
record CommandRun(int code, String out, String err) {
    static CommandRun of(Object... arguments) {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        ByteArrayOutputStream err = new ByteArrayOutputStream();
        String[] words = List.of(arguments).stream().map(Object::toString).toArray(String[]::new);
        int code = Main.run(
                words,
                new PrintStream(out, true, StandardCharsets.UTF_8),
                new PrintStream(err, true, StandardCharsets.UTF_8));
        return new CommandRun(code, out.toString(StandardCharsets.UTF_8), err.toString(StandardCharsets.UTF_8));
    }

    /** Fails with what was said where the command did. */
    CommandRun done() {
        assertThat(code).as(err).isZero();
        return this;
    }

    /** The one line that says why the command stopped; there must be exactly one. */
    String refusal(int expectedCode) {
        assertThat(code).as(err + out).isEqualTo(expectedCode);
        List<String> lines =
                err.lines().filter(line -> line.startsWith("turnstone: ")).toList();
        assertThat(lines).as(err).hasSize(1);
        assertThat(err).doesNotContain("Exception", "\tat ");
        assertThat(out).isEmpty();
        return lines.get(0);
    }
}
