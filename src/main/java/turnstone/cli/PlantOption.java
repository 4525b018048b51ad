package turnstone.cli;

import java.nio.file.Path;
import picocli.CommandLine.Option;
import turnstone.plant.Plant;

/** The option that names the plant file. */
final class PlantOption {
    @Option(names = "--plant", paramLabel = "FILE", required = true, description = "the plant file")
    Path file;

    Plant read() {
        return Plant.read(file);
    }
}
