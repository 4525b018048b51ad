package turnstone.cli;

import com.fasterxml.jackson.databind.node.ObjectNode;
import turnstone.json.Json;
import turnstone.shelf.ShelfEntry;

/** How a change of what is in service is printed. */
final class ShelfLines {
    static final int SHORT_DIGITS = 12;

    private ShelfLines() {}

    static void print(Console console, CommonOptions common, ShelfEntry entry, String done) {
        if (common.json) {
            console.json(json(entry));
            return;
        }
        console.say(done + "  " + shortened(entry.to()) + "  now in service"
                + entry.from().map(from -> ", instead of " + shortened(from)).orElse(""));
        console.say("journal entry " + entry.number() + ", by " + entry.by() + ": " + entry.reason());
        console.say(
                "Changing coefficients on a running sorter moves air valves: follow the machine maker's lock-out procedure.");
    }

    static ObjectNode json(ShelfEntry entry) {
        ObjectNode node = Json.object()
                .put("number", entry.number())
                .put("at", entry.at().toString())
                .put("by", entry.by())
                .put("action", entry.action().label())
                .put("from", entry.from().orElse(null))
                .put("to", entry.to());
        entry.verdict()
                .ifPresent(verdict -> node.putObject("verdict")
                        .put("path", verdict.path())
                        .put("fingerprint", verdict.fingerprint()));
        return node.put("reason", entry.reason());
    }

    static String shortened(String fingerprint) {
        return fingerprint.substring(0, Math.min(SHORT_DIGITS, fingerprint.length()));
    }
}
