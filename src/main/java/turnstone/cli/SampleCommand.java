package turnstone.cli;

import java.nio.file.Path;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import turnstone.json.Json;
import turnstone.night.SampleNight;
import turnstone.sample.SamplePlant;
import turnstone.spark.Session;

/** {@code sample}: writes the invented plant. */
@Command(
        name = "sample",
        description = "Writes the invented plant: records, references, plant file. Nothing in it is measured data.",
        footer = {"", "Example: turnstone sample --out work/plant"})
final class SampleCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Option(names = "--out", paramLabel = "DIR", required = true, description = "the folder to write")
    Path out;

    SampleCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        try (Session session = Engine.open("sample", console)) {
            SampleNight.write(session, SamplePlant.standard(), out.toAbsolutePath(), console.talk());
        }
        Path plant = out.resolve("plant.yaml");
        if (common.json) {
            console.json(Json.object().put("plantFile", plant.toString()));
        } else {
            console.say("plant file: " + plant);
            console.say("next: turnstone post --plant " + plant + " --day 2026-03-02");
        }
        return 0;
    }
}
