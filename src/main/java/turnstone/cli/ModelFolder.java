package turnstone.cli;

import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.night.WholeFile;
import turnstone.spark.RecordCounts;

/** The folder that {@code fit} writes: {@code model.json}, and {@code quarantine.csv} where there is any. */
final class ModelFolder {
    private static final String MODEL = "model.json";

    private final Path folder;

    private ModelFolder(Path folder) {
        this.folder = folder;
    }

    /** Makes sure, before any work, that the folder can be written and holds no model yet. */
    static ModelFolder prepare(Path folder) {
        if (Files.exists(folder.resolve(MODEL))) {
            throw Fault.input("there is a model already")
                    .at(folder.resolve(MODEL).toString())
                    .remedy("name another folder, or move this one away");
        }
        if (Files.exists(folder) && !Files.isDirectory(folder)) {
            throw Fault.input("there is a file where the folder should be")
                    .at(folder.toString())
                    .remedy("name another folder");
        }
        WholeFile.folder(folder);
        return new ModelFolder(folder);
    }

    void write(Model model, RecordCounts counts) {
        if (counts.quarantinedTotal() > 0) {
            put("quarantine.csv", counts.quarantineCsv().getBytes(StandardCharsets.UTF_8));
        }
        put(MODEL, Json.pretty(model.json()));
    }

    private void put(String name, byte[] content) {
        WholeFile.write(folder.resolve(name), content);
    }
}
