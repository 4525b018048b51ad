package turnstone.cli;

import java.nio.file.Path;
import java.util.Optional;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import picocli.CommandLine.Parameters;
import turnstone.decide.Model;
import turnstone.decide.ModelPage;
import turnstone.plant.Plant;

/** {@code show}: a page about a model. */
@Command(
        name = "show",
        description = "Prints a page about a model.",
        footer = {
            "",
            "Examples: turnstone show work/fit",
            "          turnstone show 3f9c21ab --plant plant.yaml",
            "          turnstone show 3f9c21ab --plant plant.yaml --lineage"
        })
final class ShowCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Option(names = "--plant", paramLabel = "FILE", description = "the plant file, for a model on the shelf")
    Path plant;

    @Parameters(
            paramLabel = "MODEL",
            description =
                    "a folder with model.json, or the first 8 or more digits of a fingerprint on the plant's shelf")
    String model;

    @Option(
            names = "--lineage",
            description =
                    "print what it was made from instead: ledger days, fingerprints, records and showings by instrument and material")
    boolean lineage;

    ShowCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Model found = Models.find(model, plant);
        if (lineage) {
            Lineage.print(console, common, found, Optional.ofNullable(plant).map(Plant::read));
        } else if (common.json) {
            console.json(found.json());
        } else {
            console.say(ModelPage.of(found));
        }
        return 0;
    }
}
