package turnstone.cli;

import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import turnstone.night.Places;
import turnstone.shelf.ShelfEntry;

/** {@code revert}: puts back what was in service before. */
@Command(
        name = "revert",
        description = "Puts back the model that was in service before the current one.",
        footer = {"", "Example: turnstone revert --plant plant.yaml --reason \"PVC in the PET bales\""})
final class RevertCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    @Option(names = "--reason", paramLabel = "TEXT", required = true, description = "why, for the journal")
    String reason;

    @Option(names = "--by", paramLabel = "NAME", description = "who, for the journal (default: the user's name)")
    String by = System.getProperty("user.name");

    RevertCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        ShelfEntry entry = Places.shelf(plant.read()).revert(reason, by);
        ShelfLines.print(console, common, entry, "reverted");
        return 0;
    }
}
