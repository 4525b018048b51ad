package turnstone.cluster;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.File;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.attribute.PosixFilePermissions;
import java.time.Duration;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

/** The launcher on what the build packed: what it refuses, in one line, and what it keeps off the terminal. */
class LauncherTest {
    private static final Path LAUNCHER = Path.of(System.getProperty("turnstone.basedir"), "scripts", "turnstone");
    private static final Duration LIMIT = Duration.ofMinutes(1);

    @TempDir
    private Path folder;

    private Ended launch(Path launcher, Map<String, String> environment, String... arguments) {
        List<String> command = new ArrayList<>(List.of(launcher.toString()));
        command.addAll(List.of(arguments));
        Map<String, String> all = new HashMap<>(Map.of(
                "TURNSTONE_BUILD", "never",
                "TURNSTONE_LOG_DIR", folder.resolve("log").toString(),
                "JAVA_HOME", System.getProperty("java.home")));
        all.putAll(environment);
        return LoggedProcess.start("launch", folder, command, all).await(LIMIT);
    }

    private static void refusedInOneLine(Ended ended, int code, String... words) {
        assertThat(ended.exitCode()).as(ended.talk()).isEqualTo(code);
        assertThat(ended.talk().lines()).hasSize(1);
        assertThat(ended.talk()).startsWith("turnstone: ").contains(words);
        assertThat(ended.out()).isEmpty();
    }

    @Test
    void answersThroughALinkInAFolderWithBlanks() throws IOException {
        Path far = Files.createDirectories(folder.resolve("a folder with blanks"));
        Path link = Files.createSymbolicLink(far.resolve("start it"), LAUNCHER);
        Path linkToLink = Files.createSymbolicLink(folder.resolve("again"), folder.relativize(link));
        Ended ended = launch(linkToLink, Map.of(), "--help");
        assertThat(ended.exitCode()).as(ended.talk()).isZero();
        assertThat(ended.out()).contains("turnstone", "release", "verify");
        assertThat(ended.talk()).isEmpty();
    }

    @ParameterizedTest
    @ValueSource(strings = {"1.8.0_392", "11.0.2", "16"})
    void refusesAnOlderJava(String version) throws IOException {
        Path java = Files.createDirectories(folder.resolve("old/bin")).resolve("java");
        Files.writeString(java, "#!/bin/sh\necho 'openjdk version \"" + version + "\" 2019-01-15' >&2\n");
        Files.setPosixFilePermissions(java, PosixFilePermissions.fromString("rwxr-xr-x"));
        Ended ended = launch(LAUNCHER, Map.of("JAVA_HOME", folder.resolve("old").toString()), "post");
        refusedInOneLine(ended, 2, version, "needs Java 17 or later");
    }

    @Test
    void refusesAMachineWithoutJava() throws IOException {
        Path tools = Files.createDirectories(folder.resolve("tools"));
        for (String tool : List.of("bash", "dirname", "readlink")) {
            Path found = Stream.of(System.getenv("PATH").split(File.pathSeparator))
                    .map(entry -> Path.of(entry, tool))
                    .filter(Files::isExecutable)
                    .findFirst()
                    .orElseThrow();
            Files.createSymbolicLink(tools.resolve(tool), found);
        }
        Ended ended = launch(LAUNCHER, Map.of("JAVA_HOME", "", "PATH", tools.toString()), "post");
        refusedInOneLine(ended, 2, "no java found", "JAVA_HOME");
    }

    @Test
    void refusesSettingsItCannotUse() {
        refusedInOneLine(launch(LAUNCHER, Map.of("TURNSTONE_HEAP", "4"), "post"), 2, "TURNSTONE_HEAP", "\"4\"");
        refusedInOneLine(launch(LAUNCHER, Map.of("TURNSTONE_BUILD", "yes"), "post"), 2, "TURNSTONE_BUILD", "\"yes\"");
        refusedInOneLine(launch(LAUNCHER, Map.of("SPARK_HOME", "/none"), "post", "--master", "yarn"), 2, "SPARK_HOME");
        refusedInOneLine(launch(LAUNCHER, Map.of(), "post", "--master"), 2, "--master");
        refusedInOneLine(launch(LAUNCHER, Map.of(), "post", "--master=spork://x"), 2, "spork://x", "yarn");
        refusedInOneLine(launch(LAUNCHER, Map.of(), "post", "--", "--queue", "night"), 2, "spark-submit", "--master");
    }

    @Test
    void refusesALogFolderThatCannotBeWritten() throws IOException {
        Path file = Files.writeString(folder.resolve("file"), "in the way");
        refusedInOneLine(
                launch(LAUNCHER, Map.of("TURNSTONE_LOG_DIR", file.toString()), "post"),
                4,
                file.toString(),
                "TURNSTONE_LOG_DIR");
    }

    @Test
    void keepsWhatTheMachinePrintsOffTheTerminalAndInTheLog() throws IOException {
        // The command is refused for its option, so no engine starts: what is left is what the Java machine says of
        // itself.
        Ended ended =
                launch(LAUNCHER, Map.of(), "post", "--plant", "none.yaml", "--day", "2026-03-01", "--no-such-option");
        assertThat(ended.exitCode()).as(ended.talk()).isEqualTo(2);
        assertThat(ended.talk()).contains("--no-such-option").doesNotContain("WARNING");
        try (Stream<Path> logs = Files.list(folder.resolve("log"))) {
            assertThat(logs.toList())
                    .singleElement()
                    .satisfies(log -> assertThat(log).content().contains("jdk.incubator.vector"));
        }
    }
}
