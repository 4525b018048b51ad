package turnstone.cluster;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.io.InputStream;
import java.io.OutputStream;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.jar.JarEntry;
import java.util.jar.JarOutputStream;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;

/** The cluster that other tests stand on: both workers do a share, and an exit code comes back. */
class StandaloneClusterTest {
    private static final Path FOLDER = Path.of(System.getProperty("turnstone.basedir"), "target", "cluster", "sum");
    private static StandaloneCluster cluster;

    @BeforeAll
    static void start() throws IOException {
        cluster = StandaloneCluster.start(FOLDER, 2);
    }

    @AfterAll
    static void stop() {
        if (cluster != null) {
            cluster.close();
        }
    }

    @Test
    void bothWorkersTakePartAndTheExitCodeComesBack() throws IOException {
        Path jar = FOLDER.resolve("sum-job.jar");
        pack(jar, SumJob.class);
        Ended ended = cluster.submit(SumJob.class, jar, "5");
        assertThat(ended.out()).as(ended.talk()).contains("sum 500500", "executors [0, 1]");
        assertThat(ended.exitCode()).isEqualTo(5);
    }

    private static void pack(Path jar, Class<?> type) throws IOException {
        String name = type.getName().replace('.', '/') + ".class";
        try (OutputStream file = Files.newOutputStream(jar);
                JarOutputStream packed = new JarOutputStream(file);
                InputStream content = type.getClassLoader().getResourceAsStream(name)) {
            packed.putNextEntry(new JarEntry(name));
            content.transferTo(packed);
        }
    }
}
