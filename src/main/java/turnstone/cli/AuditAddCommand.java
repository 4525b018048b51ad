package turnstone.cli;

import java.time.LocalDate;
import java.time.ZoneOffset;
import java.util.Collections;
import java.util.List;
import java.util.Optional;
import java.util.OptionalLong;
import java.util.SortedMap;
import java.util.SortedSet;
import java.util.TreeSet;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import turnstone.audit.Audit;
import turnstone.audit.Found;
import turnstone.audit.Valves;
import turnstone.fault.Fault;
import turnstone.night.Places;
import turnstone.plant.Duty;
import turnstone.plant.Plant;
import turnstone.plant.Spelling;

/** {@code audit add}: enters the result of a bale or hand sort. */
@Command(
        name = "add",
        description = "Enters what a bale or a hand sort was found to hold.",
        footer = {
            "",
            "Examples: turnstone audit add --plant plant.yaml --date 2026-03-14 --duty \"PET bottles to bale\"",
            "              --mass \"PET bottle=812.5,PVC=3.1\"",
            "          turnstone audit add --plant plant.yaml --date 2026-03-14 --duty \"PET bottles to bale\"",
            "              --method hand-sort --valves \"decided=120,ejected=113.4,left=400,carried=6.2\"",
            "",
            "--valves: of a run whose two streams were sorted by hand and held against the board's decisions, the mass",
            "that was decided to be ejected and of it what was, the mass decided to be left and of it what was ejected."
        })
final class AuditAddCommand implements Callable<Integer> {
    private static final List<String> VALVE_MASSES = List.of("decided", "ejected", "left", "carried");

    private final Console console;

    @Mixin
    CommonOptions common;

    @Mixin
    PlantOption plant;

    @Option(
            names = "--date",
            paramLabel = "DATE",
            required = true,
            converter = DayOption.class,
            description = "when the sampled run was")
    LocalDate date;

    @Option(
            names = "--duty",
            paramLabel = "NAME",
            required = true,
            description = "the duty, as the plant file names it")
    String duty;

    @Option(names = "--mass", paramLabel = "MATERIAL=KG,...", description = "kilograms found of each material")
    String mass;

    @Option(names = "--stream", paramLabel = "product|rest", description = "what was weighed (default: product)")
    Found.Stream stream = Found.Stream.PRODUCT;

    @Option(names = "--method", paramLabel = "bale|hand-sort", description = "how it was found (default: bale)")
    String method = "bale";

    @Option(names = "--valves", paramLabel = "NAME=KG,...", description = "what was found of the air valves, see below")
    String valves;

    @Option(
            names = "--instead-of",
            paramLabel = "N",
            description = "the number of an entry that this one corrects; that one counts no longer")
    Long insteadOf;

    @Option(names = "--note", paramLabel = "TEXT", description = "what else there is to say")
    String note = "";

    @Option(names = "--by", paramLabel = "NAME", description = "who, for the journal (default: the user's name)")
    String by = System.getProperty("user.name");

    AuditAddCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Plant file = plant.read();
        Duty named = duty(file);
        SortedMap<String, Double> masses = mass == null
                ? Collections.emptySortedMap()
                : Masses.read(mass, "--mass", file.materialNames(), "material");
        Found found = new Found(
                date,
                named.name(),
                method(),
                stream,
                masses,
                valves(),
                models(file, named),
                insteadOf == null ? OptionalLong.empty() : OptionalLong.of(insteadOf),
                note);
        Audit audit = Places.audits(file).add(found, by);
        if (common.json) {
            console.json(AuditLines.json(audit));
        } else {
            console.say("entered as number " + audit.number() + " of "
                    + Places.audits(file).describe());
            AuditLines.lines(audit, named.targets()).forEach(console::say);
        }
        return 0;
    }

    private Duty duty(Plant file) {
        List<String> names = file.duties().stream().map(Duty::name).toList();
        return file.duties().stream()
                .filter(candidate -> candidate.name().equals(duty))
                .findFirst()
                .orElseThrow(() -> Spelling.unknown("duty", duty, names).at("--duty"));
    }

    private Found.Method method() {
        return switch (method) {
            case "bale" -> Found.Method.BALE;
            case "hand-sort" -> Found.Method.HAND_SORT;
            default ->
                throw Fault.usage("unknown method").at("--method").found(method).expected("bale or hand-sort");
        };
    }

    private Optional<Valves> valves() {
        if (valves == null) {
            return Optional.empty();
        }
        SortedMap<String, Double> masses = Masses.read(valves, "--valves", VALVE_MASSES, "mass");
        for (String needed : VALVE_MASSES) {
            if (!masses.containsKey(needed)) {
                throw Fault.usage("a check of the valves needs four masses")
                        .at("--valves")
                        .found("no " + needed)
                        .expected(String.join(", ", VALVE_MASSES));
            }
        }
        return Optional.of(
                new Valves(masses.get("decided"), masses.get("ejected"), masses.get("left"), masses.get("carried")));
    }

    /** What the duty's sorters ran at the end of that day. */
    private SortedSet<String> models(Plant file, Duty named) {
        SortedSet<String> models = new TreeSet<>();
        Places.shelf(file)
                .runningAsOf(date.plusDays(1)
                        .atStartOfDay()
                        .toInstant(ZoneOffset.UTC)
                        .minusMillis(1))
                .ifPresent(then -> named.sorters().forEach(sorter -> models.add(then.on(sorter))));
        return models;
    }
}
