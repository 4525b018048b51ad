package turnstone.cli;

import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Parameters;
import turnstone.night.Places;
import turnstone.shelf.ShelfEntry;

/** {@code withdraw}: takes a model out of use. */
@Command(
        name = "withdraw",
        description = {
            "Withdraws a model: from then on a release of it is refused unless it says so, and a revert passes over it.",
            "Wherever it is in service, what ran there before is put back in the same step; with nothing to put back it is refused."
        },
        footer = {
            "",
            "Example: turnstone withdraw 3f9c21ab --plant plant.yaml --reason \"made from a mislabelled tray\""
        })
final class WithdrawCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    @Mixin
    WhyOptions why;

    @Parameters(paramLabel = "MODEL", description = "the first 8 or more digits of its fingerprint")
    String model;

    WithdrawCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        ShelfEntry entry = Places.shelf(plant.read()).withdraw(model, why.reason, why.by);
        ShelfLines.print(console, common, entry, "withdrawn");
        return 0;
    }
}
