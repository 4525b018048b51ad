package turnstone.cli;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.ByteArrayOutputStream;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;

/** What a command left behind: its exit code, its standard output and its standard error. */
record Ran(int exitCode, String out, String talk) {
    /** Runs a command in this process, with standard error that is no terminal. */
    static Ran command(String... arguments) {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        ByteArrayOutputStream talk = new ByteArrayOutputStream();
        int code = Main.run(
                arguments,
                new PrintStream(out, true, StandardCharsets.UTF_8),
                new PrintStream(talk, true, StandardCharsets.UTF_8));
        Ran ran = new Ran(code, out.toString(StandardCharsets.UTF_8), talk.toString(StandardCharsets.UTF_8));
        assertThat(ran.talk + ran.out)
                .as("plain lines, no traces")
                .doesNotContain("\r", "\tat ", "Exception in thread");
        return ran;
    }

    Ran succeeds() {
        assertThat(exitCode).as(talk).isZero();
        assertThat(talk).doesNotContain("turnstone: ");
        return this;
    }

    /** Refused with this code: one line on standard error that has all the words, and nothing on standard output. */
    Ran refused(int code, String... words) {
        assertThat(exitCode).as(out + talk).isEqualTo(code);
        assertThat(out).isEmpty();
        assertThat(talk.lines().filter(line -> line.startsWith("turnstone: ")))
                .singleElement()
                .satisfies(line -> assertThat(line).contains(words));
        return this;
    }
}
