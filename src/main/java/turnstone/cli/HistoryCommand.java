package turnstone.cli;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.time.Instant;
import java.util.List;
import java.util.Optional;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import turnstone.json.Json;
import turnstone.night.Places;
import turnstone.plant.Plant;
import turnstone.shelf.Service;
import turnstone.shelf.Shelf;
import turnstone.shelf.ShelfEntry;

/** {@code history}: every change of what is in service, or what ran where at a time. */
@Command(
        name = "history",
        description =
                "Lists every change of what is in service, the newest last; or tells which sorter ran which model then.",
        footer = {
            "",
            "Examples: turnstone history --plant plant.yaml",
            "          turnstone history --plant plant.yaml --as-of 2026-03-10",
            "          turnstone history --plant plant.yaml --as-of 2026-03-10T06:00:00Z"
        })
final class HistoryCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    @Option(
            names = "--as-of",
            paramLabel = "DATE",
            converter = InstantOption.class,
            description = "tell what ran where at the end of this day (UTC), or at this instant")
    Instant asOf;

    HistoryCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Plant file = plant.read();
        Shelf shelf = Places.shelf(file);
        if (asOf != null) {
            return tell(file, shelf.runningAsOf(asOf));
        }
        List<ShelfEntry> history = shelf.history();
        if (common.json) {
            ArrayNode entries = Json.array();
            history.forEach(entry -> entries.add(ShelfLines.json(entry)));
            console.json(entries);
            return 0;
        }
        if (history.isEmpty()) {
            console.say("nothing was ever in service");
            return 0;
        }
        history.forEach(entry -> ShelfLines.lines(entry).forEach(console::say));
        console.say("now: " + ShelfLines.running(shelf.running().orElseThrow()));
        return 0;
    }

    private int tell(Plant file, Optional<Service> then) {
        if (common.json) {
            ObjectNode node = Json.object().put("asOf", asOf.toString());
            ObjectNode sorters = node.putObject("sorters");
            file.sorters()
                    .forEach(sorter -> sorters.put(
                            sorter, then.map(service -> service.on(sorter)).orElse(null)));
            console.json(node);
            return 0;
        }
        console.say("in service at " + asOf);
        int width = file.sorters().stream().mapToInt(String::length).max().orElse(0);
        for (String sorter : file.sorters()) {
            String model = then.map(service -> ShelfLines.shortened(service.on(sorter)))
                    .orElse("nothing");
            console.say("  " + sorter + " ".repeat(width - sorter.length()) + "  " + model);
        }
        return 0;
    }
}
