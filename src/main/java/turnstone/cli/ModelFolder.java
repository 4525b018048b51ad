package turnstone.cli;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardCopyOption;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.night.QuarantineTable;
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
        try {
            Files.createDirectories(folder);
        } catch (IOException e) {
            throw cannotWrite(folder, e);
        }
        return new ModelFolder(folder);
    }

    void write(Model model, RecordCounts counts) {
        if (counts.quarantinedTotal() > 0) {
            put("quarantine.csv", QuarantineTable.csv(counts).getBytes(StandardCharsets.UTF_8));
        }
        put(MODEL, Json.pretty(model.json()));
    }

    private void put(String name, byte[] content) {
        Path aside = folder.resolve("." + name + ".part");
        try {
            Files.write(aside, content);
            Files.move(aside, folder.resolve(name), StandardCopyOption.ATOMIC_MOVE);
        } catch (IOException e) {
            throw cannotWrite(folder.resolve(name), e);
        }
    }

    private static Fault cannotWrite(Path path, IOException e) {
        return Fault.storage("can't be written")
                .at(path.toString())
                .found(e.getClass().getSimpleName() + " " + e.getMessage())
                .remedy("check space and permissions, or name another folder")
                .because(e);
    }
}
