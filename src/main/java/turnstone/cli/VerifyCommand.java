package turnstone.cli;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import picocli.CommandLine.Parameters;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.ledger.Ledger;
import turnstone.night.Places;
import turnstone.plant.Plant;
import turnstone.shelf.ModelSignature;
import turnstone.shelf.PublicKeyFile;
import turnstone.shelf.Shelf;
import turnstone.store.Problem;

/** {@code verify}: reads ledger and shelf again and names any file that is not what was written. */
@Command(
        name = "verify",
        description = {
            "Reads the whole ledger, shelf and audits again and names any file that is not what was written.",
            "With a key also the signatures: of MODEL, or of every model that is in service on any sorter."
        },
        footer = {
            "",
            "Examples: turnstone verify --plant plant.yaml",
            "          turnstone verify --plant plant.yaml --key keys/shore.public",
            "          turnstone verify board/model.json --plant plant.yaml --key keys/shore.public"
        })
final class VerifyCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    @Option(
            names = "--key",
            paramLabel = "PUBLIC",
            description = "check signatures with this public key (default: the plant file's, if it names one)")
    Path key;

    @Parameters(
            paramLabel = "MODEL",
            arity = "0..1",
            description = "check the signature of this model only: a folder with model.json, a file, or a fingerprint")
    String model;

    VerifyCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Plant file = plant.read();
        Optional<PublicKeyFile> checking =
                (key != null ? Optional.of(key) : file.signing().publicKey()).map(PublicKeyFile::read);
        if (model != null) {
            return signatures(file, List.of(Models.find(model, plant.file).fingerprint()), checking);
        }
        everyFile(file);
        return checking.isPresent() ? signatures(file, inService(file), checking) : 0;
    }

    private static List<String> inService(Plant file) {
        return Places.shelf(file)
                .running()
                .map(running -> List.copyOf(running.models()))
                .orElse(List.of());
    }

    private int signatures(Plant file, List<String> models, Optional<PublicKeyFile> checking) {
        if (checking.isEmpty()) {
            throw Fault.usage("a signature is checked with a public key")
                    .remedy("add --key PUBLIC, or name the key in the plant file");
        }
        Shelf shelf = Places.shelf(file);
        for (String fingerprint : models) {
            List<ModelSignature> given = shelf.signatures(fingerprint);
            if (given.stream()
                    .noneMatch(
                            signature -> signature.key().equals(checking.get()) && signature.holdsFor(fingerprint))) {
                throw Fault.input("the model is not signed with this key")
                        .at("model " + ShelfLines.shortened(fingerprint))
                        .found(
                                given.isEmpty()
                                        ? "no signature in the journal of " + shelf.describe()
                                        : "a signature by "
                                                + given.get(given.size() - 1).key())
                        .expected("one by " + checking.get())
                        .remedy("don't run it: it is not what was released, or another plant's");
            }
            if (!common.json) {
                console.say("model " + ShelfLines.shortened(fingerprint) + " is signed by " + checking.get());
            }
        }
        return 0;
    }

    private void everyFile(Plant file) {
        Ledger ledger = Places.ledger(file);
        Shelf shelf = Places.shelf(file);
        List<Problem> problems = new ArrayList<>(ledger.verify());
        problems.addAll(shelf.verify());
        problems.addAll(Places.audits(file).verify());
        if (common.json) {
            ObjectNode result = Json.object();
            ArrayNode list = result.putArray("problems");
            problems.forEach(problem -> list.add(problem.toString()));
            console.json(result);
        } else if (problems.isEmpty()) {
            console.say("every file of the ledger (" + ledger.days().size() + " days) and the shelf ("
                    + shelf.history().size() + (shelf.history().size() == 1 ? " change" : " changes")
                    + ") is what was written");
        } else {
            problems.forEach(problem -> console.say(problem.toString()));
        }
        if (!problems.isEmpty()) {
            throw Fault.storage(problems.size() + (problems.size() == 1 ? " file is" : " files are")
                            + " not what was written")
                    .at(ledger.describe() + ", " + shelf.describe())
                    .remedy("restore from a copy, or post the days concerned again");
        }
    }
}
