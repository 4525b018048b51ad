package turnstone.moments;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.api.Test;

/** Each case but the first is a JVM of its own, started with other options. */
class BlockKernelsTest {
    @Test
    void givesTheScalarKernelWhenAsked() {
        assertThat(BlockKernels.choose(KernelChoice.SCALAR).name()).isEqualTo("scalar");
    }

    @Test
    void fallsBackWithAReasonWithoutTheModule() throws Exception {
        assertThat(probe())
                .contains("kernel=scalar", "equal=true")
                .anyMatch(line -> line.startsWith("reason=") && line.contains("jdk.incubator.vector"));
    }

    @Test
    void fallsBackWithAReasonWithoutFusedMultiplication() throws Exception {
        assertThat(probe("--add-modules=jdk.incubator.vector", "-XX:-UseFMA"))
                .contains("kernel=scalar", "reason=no fused multiply-add in hardware");
    }

    @Test
    void fallsBackWithAReasonOnNarrowVectors() throws Exception {
        assertThat(probe("--add-modules=jdk.incubator.vector", "-XX:MaxVectorSize=16"))
                .contains("kernel=scalar", "reason=vectors of this machine have 128 bits, fewer than 256");
    }

    @Test
    void equalsTheScalarKernelInOtherWidths() throws Exception {
        assertThat(probe("--add-modules=jdk.incubator.vector", "-XX:MaxVectorSize=32"))
                .contains("kernel=vector, 256 bits", "equal=true");
    }

    @Test
    void refusesWhenTheVectorKernelIsDemandedInVain() throws Exception {
        assertThat(probe("-Dkernel=VECTOR"))
                .anyMatch(line -> line.startsWith("refused=the vector kernel can't run on this JVM")
                        && line.contains("--add-modules jdk.incubator.vector"));
    }

    private static List<String> probe(String... options) throws IOException, InterruptedException {
        List<String> command = new ArrayList<>();
        command.add(Path.of(System.getProperty("java.home"), "bin", "java").toString());
        command.addAll(List.of(options));
        command.addAll(List.of("-Xmx128m", "-cp", System.getProperty("java.class.path"), KernelProbe.class.getName()));
        Process process = new ProcessBuilder(command).redirectErrorStream(true).start();
        String output = new String(process.getInputStream().readAllBytes(), StandardCharsets.UTF_8);
        assertThat(process.waitFor()).as(output).isZero();
        return output.lines().toList();
    }
}
