package turnstone.cli;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.ledger.Ledger;
import turnstone.night.Places;
import turnstone.plant.Plant;
import turnstone.shelf.Shelf;
import turnstone.store.Problem;

/** {@code verify}: reads ledger and shelf again and names any file that is not what was written. */
@Command(
        name = "verify",
        description = "Reads the whole ledger and shelf again and names any file that is not what was written.",
        footer = {"", "Example: turnstone verify --plant plant.yaml"})
final class VerifyCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    VerifyCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Plant file = plant.read();
        Ledger ledger = Places.ledger(file);
        Shelf shelf = Places.shelf(file);
        List<Problem> problems = new ArrayList<>(ledger.verify());
        problems.addAll(shelf.verify());
        if (common.json) {
            ObjectNode result = Json.object();
            ArrayNode list = result.putArray("problems");
            problems.forEach(problem -> list.add(problem.toString()));
            console.json(result);
        } else if (problems.isEmpty()) {
            console.say("every file of the ledger (" + ledger.days().size() + " days) and the shelf ("
                    + shelf.history().size() + " changes) is what was written");
        } else {
            problems.forEach(problem -> console.say(problem.toString()));
        }
        if (!problems.isEmpty()) {
            throw Fault.storage(problems.size() + (problems.size() == 1 ? " file is" : " files are")
                            + " not what was written")
                    .at(ledger.describe() + ", " + shelf.describe())
                    .remedy("restore from a copy, or post the days concerned again");
        }
        return 0;
    }
}
