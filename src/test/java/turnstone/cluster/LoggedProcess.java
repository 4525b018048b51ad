package turnstone.cluster;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Duration;
import java.util.List;
import java.util.Map;
import java.util.concurrent.TimeUnit;
import java.util.stream.Stream;

/** One process started by a test, with what it says in files; ending it ends its own children and no other process. */
final class LoggedProcess implements AutoCloseable {
    private static final Duration GRACE = Duration.ofSeconds(10);

    private final String name;
    private final Process process;
    private final Path out;
    private final Path talk;
    private final Thread lastResort;

    private LoggedProcess(String name, Process process, Path out, Path talk) {
        this.name = name;
        this.process = process;
        this.out = out;
        this.talk = talk;
        this.lastResort = new Thread(() -> end(process.toHandle()));
    }

    /** Starts {@code command}; standard output goes to {@code NAME.out}, standard error to {@code NAME.err} in {@code folder}. */
    static LoggedProcess start(String name, Path folder, List<String> command, Map<String, String> environment) {
        Path out = folder.resolve(name + ".out");
        Path talk = folder.resolve(name + ".err");
        ProcessBuilder builder = new ProcessBuilder(command)
                .directory(folder.toFile())
                .redirectOutput(out.toFile())
                .redirectError(talk.toFile());
        // What the caller's shell says about an engine must not reach this one.
        builder.environment().keySet().removeIf(key -> key.startsWith("SPARK_") || key.startsWith("TURNSTONE_"));
        builder.environment().putAll(environment);
        try {
            LoggedProcess started = new LoggedProcess(name, builder.start(), out, talk);
            Runtime.getRuntime().addShutdownHook(started.lastResort);
            return started;
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    boolean isAlive() {
        return process.isAlive();
    }

    /** What it has said on standard error until now. */
    String talk() {
        return text(talk);
    }

    /** Sends it a signal by its name, such as {@code INT}. */
    void signal(String name) {
        run("kill", "-" + name, Long.toString(process.pid()));
    }

    /** From now on it can write so many bytes into a file and no more. */
    void limitFiles(long most_bytes) {
        run("prlimit", "--pid", Long.toString(process.pid()), "--fsize=" + most_bytes);
    }

    private static void run(String... command) {
        try {
            int code = new ProcessBuilder(command).inheritIO().start().waitFor();
            if (code != 0) {
                throw new IllegalStateException(String.join(" ", command) + " ended with code " + code);
            }
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        } catch (InterruptedException interrupted) {
            Thread.currentThread().interrupt();
            throw new IllegalStateException(interrupted);
        }
    }

    /** Waits for its end; past {@code limit} it is ended and the test fails with what it had said. */
    Ended await(Duration limit) {
        try {
            if (!process.waitFor(limit.toMillis(), TimeUnit.MILLISECONDS)) {
                close();
                throw new AssertionError(name + " had not ended after " + limit + ":\n" + text(out) + talk());
            }
        } catch (InterruptedException interrupted) {
            close();
            Thread.currentThread().interrupt();
            throw new IllegalStateException("interrupted while waiting for " + name, interrupted);
        }
        close();
        return new Ended(process.exitValue(), text(out), talk());
    }

    @Override
    public void close() {
        end(process.toHandle());
        try {
            Runtime.getRuntime().removeShutdownHook(lastResort);
        } catch (IllegalStateException goingDown) {
            // The hook runs already, and does the same.
            return;
        }
    }

    private static void end(ProcessHandle top) {
        List<ProcessHandle> all =
                Stream.concat(Stream.of(top), top.descendants()).toList();
        all.forEach(ProcessHandle::destroy);
        long deadline_ns = System.nanoTime() + GRACE.toNanos();
        for (ProcessHandle handle : all) {
            while (handle.isAlive() && System.nanoTime() < deadline_ns) {
                pause();
            }
            handle.destroyForcibly();
        }
    }

    private static void pause() {
        try {
            Thread.sleep(20);
        } catch (InterruptedException interrupted) {
            Thread.currentThread().interrupt();
        }
    }

    private static String text(Path file) {
        try {
            return Files.readString(file, StandardCharsets.UTF_8);
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }
}
