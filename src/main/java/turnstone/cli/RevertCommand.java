package turnstone.cli;

import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import turnstone.night.Places;
import turnstone.shelf.ShelfEntry;

/** {@code revert}: puts back what was in service before. */
@Command(
        name = "revert",
        description = {
            "Puts back what was in service before the newest release, on the sorters that it went to.",
            "Withdrawn models are passed over."
        },
        footer = {"", "Example: turnstone revert --plant plant.yaml --reason \"PVC in the PET bales\""})
final class RevertCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    @Mixin
    WhyOptions why;

    RevertCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        ShelfEntry entry = Places.shelf(plant.read()).revert(why.reason, why.by);
        ShelfLines.print(console, common, entry, "reverted");
        return 0;
    }
}
