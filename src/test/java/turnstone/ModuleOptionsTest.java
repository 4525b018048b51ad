package turnstone;

import static org.assertj.core.api.Assertions.assertThat;

import java.lang.management.ManagementFactory;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import org.apache.spark.launcher.JavaModuleOptions;
import org.junit.jupiter.api.Test;

/** The one line of JVM options in pom.xml, against what this version of Spark asks for. */
class ModuleOptionsTest {
    private static List<String> words(String options) {
        return List.of(options.trim().split("\\s+"));
    }

    @Test
    void thePomHasEveryOptionThatSparkAsksFor() {
        List<String> asked = words(JavaModuleOptions.defaultModuleOptions());
        assertThat(asked).hasSizeGreaterThan(10);
        assertThat(words(System.getProperty("turnstone.moduleOptions"))).containsAll(asked);
    }

    @Test
    void theTestsRunWithThem() {
        assertThat(ManagementFactory.getRuntimeMXBean().getInputArguments())
                .containsAll(words(System.getProperty("turnstone.moduleOptions")).stream()
                        .filter(option -> option.startsWith("--add-opens"))
                        .toList());
    }

    @Test
    void theLauncherTakesThemFromThePom() throws Exception {
        Path options = Path.of(System.getProperty("turnstone.basedir"), "src/main/engine/jvm.options");
        assertThat(Files.readString(options, StandardCharsets.UTF_8))
                .isEqualToIgnoringNewLines("${spark.module.options}");
    }
}
