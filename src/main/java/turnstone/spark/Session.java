package turnstone.spark;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Map;
import org.apache.spark.api.java.JavaSparkContext;
import org.apache.spark.sql.SparkSession;

/**
 * A Spark session with sober settings: no web page, no catalogue on disk, nothing of the source silently left out.
 *
 * <p>Closing it stops the engine and removes its temporary folder, unless an engine was running already: that one belongs to whoever
 * started it.
 */
public final class Session implements AutoCloseable {
    private enum Engine {
        STARTED_HERE,
        RUNNING_BEFORE
    }

    private final SparkSession spark;
    private final Path warehouse;
    private final Engine engine;

    private Session(SparkSession spark, Path warehouse, Engine engine) {
        this.spark = spark;
        this.warehouse = warehouse;
        this.engine = engine;
    }

    /**
     * How to start.
     *
     * @param name what the cluster shows
     * @param master for instance {@code local[2]}; null when {@code spark-submit} has set it
     * @param more further settings of Spark; they win over ours
     */
    public record Settings(String name, String master, Map<String, String> more) {
        /** Copies the map. */
        public Settings {
            more = Map.copyOf(more);
        }

        /** On this machine, with so many task slots. */
        public static Settings local(String name, int slots) {
            return new Settings(name, "local[" + slots + "]", Map.of());
        }
    }

    /**
     * Starts or attaches.
     *
     * @throws turnstone.fault.Fault of kind storage where the engine does not start
     */
    public static Session open(Settings settings) {
        Path warehouse = temporaryFolder();
        Engine engine = SparkSession.getDefaultSession().isDefined() ? Engine.RUNNING_BEFORE : Engine.STARTED_HERE;
        SparkSession.Builder builder = SparkSession.builder().appName(settings.name());
        if (settings.master() != null) {
            builder.master(settings.master());
            if (settings.master().startsWith("local")) {
                builder.config("spark.driver.bindAddress", "127.0.0.1").config("spark.driver.host", "127.0.0.1");
            }
        }
        builder.config("spark.ui.enabled", "false")
                .config("spark.ui.showConsoleProgress", "false")
                .config("spark.sql.catalogImplementation", "in-memory")
                .config("spark.sql.warehouse.dir", warehouse.toUri().toString())
                .config("spark.sql.files.ignoreCorruptFiles", "false")
                .config("spark.sql.files.ignoreMissingFiles", "false")
                .config("spark.driver.maxResultSize", "4g");
        settings.more().forEach(builder::config);
        SparkSession spark = SparkTrouble.guard("starting the engine", builder::getOrCreate);
        if (System.getProperty("log4j2.configurationFile") == null
                && System.getProperty("log4j.configurationFile") == null) {
            spark.sparkContext().setLogLevel("ERROR");
        }
        return new Session(spark, warehouse, engine);
    }

    /** The engine's own session. */
    public SparkSession spark() {
        return spark;
    }

    /** The engine's context, for Java. */
    public JavaSparkContext context() {
        return JavaSparkContext.fromSparkContext(spark.sparkContext());
    }

    /** How many tasks run at once, as far as the engine says. */
    public int slots() {
        return Math.max(1, spark.sparkContext().defaultParallelism());
    }

    @Override
    public void close() {
        if (engine == Engine.STARTED_HERE) {
            spark.stop();
        }
        remove(warehouse);
    }

    private static Path temporaryFolder() {
        try {
            return Files.createTempDirectory("turnstone-");
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    private static void remove(Path folder) {
        try {
            FileTree.delete(folder);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
