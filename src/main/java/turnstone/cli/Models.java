package turnstone.cli;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.util.regex.Pattern;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.night.Places;
import turnstone.plant.Plant;
import turnstone.shelf.Shelf;

/** Finds a model by folder, file or fingerprint. */
final class Models {
    private static final Pattern FINGERPRINT = Pattern.compile("[0-9a-f]{8,64}");

    private Models() {}

    /**
     * The model that MODEL names.
     *
     * @param plant the plant file, or null where none was given
     * @throws Fault where there is none, or it is not what was written
     */
    static Model find(String name, Path plant) {
        Path path = Path.of(name);
        if (Files.isDirectory(path)) {
            return read(path.resolve("model.json"));
        }
        if (Files.isRegularFile(path)) {
            return read(path);
        }
        if (!FINGERPRINT.matcher(name).matches()) {
            throw Fault.input("there is no such model")
                    .at(name)
                    .expected("a folder with model.json, or 8 or more hexadecimal digits of a fingerprint");
        }
        if (plant == null) {
            throw Fault.usage("a fingerprint needs the plant file, which says where the shelf is")
                    .at(name)
                    .remedy("add --plant FILE");
        }
        Shelf shelf = Places.shelf(Plant.read(plant));
        return shelf.model(name)
                .map(node -> Model.read(node, "model " + name + " of " + shelf.describe()))
                .orElseThrow(() -> Fault.input("the shelf has no such model")
                        .at(shelf.describe())
                        .found("none that starts with " + name));
    }

    private static Model read(Path file) {
        try {
            return Model.read(Json.read(Files.readAllBytes(file), file.toString()), file.toString());
        } catch (NoSuchFileException e) {
            throw Fault.input("there is no model").at(file.toString()).because(e);
        } catch (IOException e) {
            throw Fault.storage("the model can't be read")
                    .at(file.toString())
                    .found(e.getMessage())
                    .because(e);
        }
    }
}
