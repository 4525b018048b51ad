package turnstone.cli;

import java.nio.file.Path;
import java.util.Optional;
import java.util.Set;
import java.util.TreeSet;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import picocli.CommandLine.Parameters;
import turnstone.night.Places;
import turnstone.night.PlantTerms;
import turnstone.plant.Plant;
import turnstone.plant.Spelling;
import turnstone.shelf.Release;
import turnstone.shelf.ShelfEntry;
import turnstone.shelf.SigningKey;

/** {@code release}: puts a model in service by hand. */
@Command(
        name = "release",
        description = {
            "Puts a model of the shelf in service: on the whole fleet, or on some sorters first.",
            "A later release to the whole fleet ends the split; so does a revert, step by step."
        },
        footer = {
            "",
            "Examples: turnstone release 3f9c21ab --plant plant.yaml --reason \"first coefficients\"",
            "          turnstone release 3f9c21ab --plant plant.yaml --sorters avocet,curlew --reason \"try on two\"",
            "          turnstone release 3f9c21ab --plant plant.yaml --key keys/shore --reason \"better on PVC\""
        })
final class ReleaseCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    @Mixin
    WhyOptions why;

    @Parameters(paramLabel = "MODEL", description = "the first 8 or more digits of its fingerprint")
    String model;

    @Option(
            names = "--sorters",
            paramLabel = "NAME",
            split = ",",
            description = "the sorters that run it from now on (default: all)")
    Set<String> sorters = new TreeSet<>();

    @Option(
            names = "--key",
            paramLabel = "FILE",
            description = "sign the model with this private key (default: the plant file's, if it names one)")
    Path key;

    @Option(
            names = "--although-withdrawn",
            description = "release it although it was withdrawn; it is withdrawn no longer")
    boolean althoughWithdrawn;

    ReleaseCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Plant file = plant.read();
        for (String sorter : sorters) {
            if (!file.sorters().contains(sorter)) {
                throw Spelling.unknown("sorter", sorter, file.sorters()).at("--sorters");
            }
        }
        PlantTerms.require(file, Models.find(model, plant.file), "the model");
        Optional<SigningKey> signing =
                (key != null ? Optional.of(key) : file.signing().privateKey()).map(SigningKey::read);
        Release wish = Release.of(model, why.reason, why.by)
                .withSorters(sorters.containsAll(file.sorters()) ? Set.of() : sorters)
                .withKey(signing)
                .withWithdrawn(althoughWithdrawn ? Release.IfWithdrawn.RELEASE : Release.IfWithdrawn.REFUSE);
        ShelfEntry entry = Places.shelf(file).release(wish);
        ShelfLines.print(console, common, entry, "released");
        return 0;
    }
}
