package turnstone.cli;

import com.fasterxml.jackson.databind.JsonNode;
import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.measure.CountScale;

/** Reads a count scale from a file: its own JSON form, alone or under {@code countScale}. */
final class ScaleFiles {
    private ScaleFiles() {}

    static CountScale read(Path file) {
        try {
            JsonNode node = Json.read(Files.readAllBytes(file), file.toString());
            return CountScale.fromJson(node.has("countScale") ? node.get("countScale") : node);
        } catch (IOException e) {
            throw Fault.storage("the count scale can't be read")
                    .at(file.toString())
                    .found(e.getClass().getSimpleName())
                    .because(e);
        }
    }
}
