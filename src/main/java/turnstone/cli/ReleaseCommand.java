package turnstone.cli;

import java.util.Optional;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import picocli.CommandLine.Parameters;
import turnstone.night.Places;
import turnstone.shelf.Shelf;
import turnstone.shelf.ShelfEntry;

/** {@code release}: puts a model in service by hand. */
@Command(
        name = "release",
        description = "Puts a model of the shelf in service.",
        footer = {"", "Example: turnstone release 3f9c21ab --plant plant.yaml --reason \"first coefficients\""})
final class ReleaseCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    @Parameters(paramLabel = "MODEL", description = "the first 8 or more digits of its fingerprint")
    String model;

    @Option(names = "--reason", paramLabel = "TEXT", required = true, description = "why, for the journal")
    String reason;

    @Option(names = "--by", paramLabel = "NAME", description = "who, for the journal (default: the user's name)")
    String by = System.getProperty("user.name");

    ReleaseCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Shelf shelf = Places.shelf(plant.read());
        ShelfEntry entry = shelf.release(model, Optional.empty(), reason, by);
        ShelfLines.print(console, common, entry, "released");
        return 0;
    }
}
