package turnstone.cli;

import com.fasterxml.jackson.databind.node.ArrayNode;
import java.util.List;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import turnstone.json.Json;
import turnstone.night.Places;
import turnstone.shelf.ShelfEntry;

/** {@code history}: every change of what is in service. */
@Command(
        name = "history",
        description = "Lists every change of what is in service, the newest last.",
        footer = {"", "Example: turnstone history --plant plant.yaml"})
final class HistoryCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    HistoryCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        List<ShelfEntry> history = Places.shelf(plant.read()).history();
        if (common.json) {
            ArrayNode entries = Json.array();
            history.forEach(entry -> entries.add(ShelfLines.json(entry)));
            console.json(entries);
            return 0;
        }
        if (history.isEmpty()) {
            console.say("nothing was ever in service");
        }
        for (ShelfEntry entry : history) {
            console.say(String.format(
                    "%4d  %s  %-8s  %s  by %s: %s",
                    entry.number(),
                    entry.at().toString().substring(0, 19).replace('T', ' '),
                    entry.action().label(),
                    ShelfLines.shortened(entry.to()),
                    entry.by(),
                    entry.reason()));
        }
        return 0;
    }
}
