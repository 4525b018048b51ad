package turnstone.cli;

import com.fasterxml.jackson.databind.node.ArrayNode;
import java.util.List;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import turnstone.audit.Audit;
import turnstone.json.Json;
import turnstone.night.Places;
import turnstone.plant.Duty;
import turnstone.plant.Plant;

/** {@code audit list}: what was entered. */
@Command(
        name = "list",
        description = "Lists what bales and hand sorts were found to hold.",
        footer = {"", "Example: turnstone audit list --plant plant.yaml --duty \"PET bottles to bale\""})
final class AuditListCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    @Option(names = "--duty", paramLabel = "NAME", description = "of this duty only")
    String duty;

    @Option(names = "--all", description = "also the entries that later ones correct")
    boolean all;

    AuditListCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Plant file = plant.read();
        List<Audit> audits = (all
                        ? Places.audits(file).all()
                        : Places.audits(file).standing())
                .stream()
                        .filter(audit -> duty == null || audit.found().duty().equals(duty))
                        .toList();
        if (common.json) {
            ArrayNode list = Json.array();
            audits.forEach(audit -> list.add(AuditLines.json(audit)));
            console.json(list);
            return 0;
        }
        if (audits.isEmpty()) {
            console.say("no audit" + (duty == null ? "" : " of " + duty) + " was entered");
        }
        for (Audit audit : audits) {
            AuditLines.lines(audit, targets(file, audit)).forEach(console::say);
        }
        return 0;
    }

    private static List<String> targets(Plant file, Audit audit) {
        return file.duties().stream()
                .filter(candidate -> candidate.name().equals(audit.found().duty()))
                .findFirst()
                .map(Duty::targets)
                .orElse(List.of());
    }
}
