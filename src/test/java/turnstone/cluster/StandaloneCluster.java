package turnstone.cluster;

import static org.awaitility.Awaitility.await;

import java.io.IOException;
import java.net.URI;
import java.net.http.HttpClient;
import java.net.http.HttpRequest;
import java.net.http.HttpResponse;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Duration;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.List;
import java.util.Map;
import java.util.regex.Matcher;
import java.util.regex.Pattern;

/**
 * A standalone master and its workers on loopback, as processes of their own, from the jars under {@code target/engine}.
 *
 * <p>All ports are chosen free by the processes themselves. Logs lie in the folder given to {@link #start}. Closing ends exactly the
 * processes that were started here.
 */
final class StandaloneCluster implements AutoCloseable {
    private static final Path BASE = Path.of(System.getProperty("turnstone.basedir"));
    private static final Path ENGINE = BASE.resolve("target/engine");
    private static final Duration START_LIMIT = Duration.ofSeconds(60);
    static final Duration RUN_LIMIT = Duration.ofMinutes(4);
    private static final Pattern MASTER_URL =
            Pattern.compile("Starting Spark master at (spark://127\\.0\\.0\\.1:\\d+)");
    private static final Pattern MASTER_PAGE_PORT = Pattern.compile("MasterWebUI.* started at http://[^:]+:(\\d+)");
    private static final Pattern WORKER_ALIVE = Pattern.compile("\"aliveworkers\"\\s*:\\s*(\\d+)");

    private final Path folder;
    private final List<LoggedProcess> processes = new ArrayList<>();
    private String master;
    private int runs;

    private StandaloneCluster(Path folder) {
        this.folder = folder;
    }

    /** Starts a master and {@code workers} workers of one core and 1 GiB each, and waits until all are registered. */
    static StandaloneCluster start(Path folder, int workers) throws IOException {
        Files.createDirectories(folder);
        StandaloneCluster cluster = new StandaloneCluster(folder);
        try {
            cluster.startAll(workers);
            return cluster;
        } catch (RuntimeException | Error failure) {
            cluster.close();
            throw failure;
        }
    }

    private void startAll(int workers) {
        LoggedProcess first = daemon(
                "master",
                List.of("-Dspark.master.rest.enabled=false"),
                "org.apache.spark.deploy.master.Master",
                List.of("--host", "127.0.0.1", "--port", "0", "--webui-port", "0"));
        master = await().atMost(START_LIMIT).until(() -> firstGroup(MASTER_URL, first), url -> !url.isEmpty());
        String pagePort =
                await().atMost(START_LIMIT).until(() -> firstGroup(MASTER_PAGE_PORT, first), port -> !port.isEmpty());
        for (int worker = 1; worker <= workers; worker++) {
            String name = "worker-" + worker;
            daemon(
                    name,
                    List.of(),
                    "org.apache.spark.deploy.worker.Worker",
                    List.of(
                            "--host",
                            "127.0.0.1",
                            "--port",
                            "0",
                            "--webui-port",
                            "0",
                            "--cores",
                            "1",
                            "--memory",
                            "1g",
                            "--work-dir",
                            folder.resolve(name).toString(),
                            master));
        }
        await().atMost(START_LIMIT).until(() -> aliveWorkers("http://127.0.0.1:" + pagePort) == workers);
    }

    private LoggedProcess daemon(String name, List<String> options, String mainClass, List<String> arguments) {
        List<String> command = java("-Xmx512m");
        command.addAll(options);
        command.add(mainClass);
        command.addAll(arguments);
        LoggedProcess started = LoggedProcess.start(name, folder, command, environment());
        processes.add(started);
        return started;
    }

    private static String firstGroup(Pattern pattern, LoggedProcess process) {
        String talk = process.talk();
        if (!process.isAlive()) {
            throw new IllegalStateException("the master ended:\n" + talk);
        }
        Matcher matcher = pattern.matcher(talk);
        return matcher.find() ? matcher.group(1) : "";
    }

    private static int aliveWorkers(String page) throws IOException, InterruptedException {
        HttpResponse<String> answer = HttpClient.newHttpClient()
                .send(
                        HttpRequest.newBuilder(URI.create(page + "/json/")).build(),
                        HttpResponse.BodyHandlers.ofString());
        Matcher matcher = WORKER_ALIVE.matcher(answer.body());
        return matcher.find() ? Integer.parseInt(matcher.group(1)) : 0;
    }

    /** The address that programs connect to, {@code spark://127.0.0.1:PORT}. */
    String master() {
        return master;
    }

    /** Settings that keep a program's own side on loopback and have it wait for all of its executors. */
    static List<String> loopback() {
        return List.of(
                "--conf", "spark.driver.host=127.0.0.1",
                "--conf", "spark.driver.bindAddress=127.0.0.1",
                "--conf", "spark.scheduler.minRegisteredResourcesRatio=1.0",
                "--conf", "spark.scheduler.maxRegisteredResourcesWaitingTime=60s");
    }

    /** Runs a main class of a jar through spark-submit in client mode. */
    Ended submit(Class<?> mainClass, Path jar, String... arguments) {
        List<String> command = java("-Xmx1g");
        command.addAll(List.of("org.apache.spark.deploy.SparkSubmit", "--master", master, "--deploy-mode", "client"));
        command.addAll(loopback());
        command.addAll(List.of("--class", mainClass.getName(), jar.toString()));
        command.addAll(Arrays.asList(arguments));
        return run(command, environment());
    }

    /** Runs the launcher on this cluster: {@code scripts/turnstone ARGUMENTS… --master URL -- …}, with the jar that the build packed. */
    Ended turnstone(String... arguments) {
        return startTurnstone(List.of(), arguments).await(RUN_LIMIT);
    }

    /** Starts the launcher on this cluster, with further options for the engine. */
    LoggedProcess startTurnstone(List<String> engineOptions, String... arguments) {
        List<String> command = new ArrayList<>();
        command.add(BASE.resolve("scripts/turnstone").toString());
        command.addAll(Arrays.asList(arguments));
        command.addAll(List.of("--master", master, "--"));
        command.addAll(loopback());
        command.addAll(engineOptions);
        return begin(
                command,
                Map.of(
                        "TURNSTONE_BUILD",
                        "never",
                        "TURNSTONE_LOG_DIR",
                        folder.resolve("log").toString()));
    }

    private Ended run(List<String> command, Map<String, String> environment) {
        return begin(command, environment).await(RUN_LIMIT);
    }

    private LoggedProcess begin(List<String> command, Map<String, String> environment) {
        runs++;
        return LoggedProcess.start("run-" + runs, folder, command, environment);
    }

    private static List<String> java(String memory) {
        List<String> command = new ArrayList<>();
        command.add(Path.of(System.getProperty("java.home"), "bin", "java").toString());
        command.addAll(List.of("@" + ENGINE.resolve("jvm.options"), memory, "-cp", ENGINE.resolve("jars") + "/*"));
        return command;
    }

    private static Map<String, String> environment() {
        return Map.of(
                "SPARK_HOME", ENGINE.toString(),
                "SPARK_SCALA_VERSION", "2.13",
                "SPARK_LOCAL_IP", "127.0.0.1",
                "SPARK_LOCAL_HOSTNAME", "localhost",
                "JAVA_HOME", System.getProperty("java.home"));
    }

    /** Ends the workers with their executors, then the master. */
    @Override
    public void close() {
        List<LoggedProcess> lastFirst = new ArrayList<>(processes);
        Collections.reverse(lastFirst);
        lastFirst.forEach(LoggedProcess::close);
        processes.clear();
    }
}
