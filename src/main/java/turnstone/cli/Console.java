package turnstone.cli;

import com.fasterxml.jackson.databind.JsonNode;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import turnstone.json.Json;

/**
 * Where a command writes: results to standard output, talk to standard error.
 *
 * @param out results
 * @param talk progress and remarks
 */
record Console(PrintStream out, Talk talk) {
    /** Prints a line of the result. */
    void say(String line) {
        talk.wipe();
        out.println(line);
    }

    /** Prints a result for machines. */
    void json(JsonNode result) {
        talk.wipe();
        out.print(new String(Json.pretty(result), StandardCharsets.UTF_8));
        out.flush();
    }
}
