package turnstone.cli;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import turnstone.json.Json;
import turnstone.shelf.Action;
import turnstone.shelf.Service;
import turnstone.shelf.ShelfEntry;

/** How a change of what is in service is printed. */
final class ShelfLines {
    static final int SHORT_DIGITS = 12;

    private ShelfLines() {}

    static void print(Console console, CommonOptions common, ShelfEntry entry, String done) {
        if (common.json) {
            console.json(json(entry));
            return;
        }
        entry.withdrawn().ifPresent(model -> console.say(done + "  " + shortened(model)));
        if (!moves(entry)) {
            console.say("it was not in service; " + running(entry.after()));
            console.say("journal entry " + entry.number() + ", by " + entry.by() + ": " + entry.reason());
            return;
        }
        String word = entry.action() == Action.WITHDRAW ? "put back" : done;
        console.say(word + "  " + shortened(entry.to()) + "  now in service" + where(entry)
                + entry.from().map(from -> ", instead of " + shortened(from)).orElse(""));
        if (!entry.after().isWhole()) {
            console.say(running(entry.after()));
        }
        entry.signature().ifPresent(signature -> console.say("signed by " + signature.key()));
        console.say("journal entry " + entry.number() + ", by " + entry.by() + ": " + entry.reason());
        console.say(
                "Changing coefficients on a running sorter moves air valves: follow the machine maker's lock-out procedure.");
    }

    /** One change, in two lines. */
    static List<String> lines(ShelfEntry entry) {
        List<String> lines = new ArrayList<>();
        String what = entry.withdrawn().map(ShelfLines::shortened).orElse(shortened(entry.to()));
        String change = "";
        if (entry.action() == Action.WITHDRAW) {
            change = moves(entry) ? ", put back " + shortened(entry.to()) + where(entry) : ", which was not in service";
        } else {
            change = where(entry)
                    + entry.from()
                            .map(from -> ", instead of " + shortened(from))
                            .orElse("");
        }
        lines.add(String.format(
                "%4d  %s  %-8s  %s%s",
                entry.number(),
                entry.at().toString().substring(0, 19).replace('T', ' '),
                entry.action().label(),
                what,
                change));
        lines.add("      by " + entry.by() + ": " + entry.reason()
                + entry.verdict().map(verdict -> "; verdict " + verdict.path()).orElse("")
                + entry.signature()
                        .map(signature -> "; signed by " + signature.key())
                        .orElse(""));
        return lines;
    }

    /** {@code fleet 3f9c21ab0011; avocet, curlew 77aa00bb1122}. */
    static String running(Service service) {
        StringBuilder text = new StringBuilder("the fleet runs " + shortened(service.fleet()));
        service.sorters().values().stream().distinct().forEach(model -> {
            List<String> sorters = service.sorters().entrySet().stream()
                    .filter(sorter -> sorter.getValue().equals(model))
                    .map(Map.Entry::getKey)
                    .toList();
            text.append("; ").append(String.join(", ", sorters));
            text.append(sorters.size() == 1 ? " runs " : " run ").append(shortened(model));
        });
        return text.toString();
    }

    private static boolean moves(ShelfEntry entry) {
        return !entry.from().equals(Optional.of(entry.to()))
                || !entry.sorters().isEmpty()
                || entry.action() != Action.WITHDRAW;
    }

    private static String where(ShelfEntry entry) {
        return entry.sorters().isEmpty() ? "" : " on " + String.join(", ", entry.sorters());
    }

    static ObjectNode json(ShelfEntry entry) {
        ObjectNode node = Json.object()
                .put("number", entry.number())
                .put("at", entry.at().toString())
                .put("by", entry.by())
                .put("action", entry.action().label())
                .put("from", entry.from().orElse(null))
                .put("to", entry.to());
        entry.withdrawn().ifPresent(model -> node.put("withdrawn", model));
        entry.sorters().forEach(node.putArray("sorters")::add);
        node.set("after", entry.after().json());
        entry.verdict()
                .ifPresent(verdict -> node.putObject("verdict")
                        .put("path", verdict.path())
                        .put("fingerprint", verdict.fingerprint()));
        entry.signature()
                .ifPresent(signature -> node.put("signedBy", signature.key().fingerprint()));
        return node.put("reason", entry.reason());
    }

    static String shortened(String fingerprint) {
        return fingerprint.substring(0, Math.min(SHORT_DIGITS, fingerprint.length()));
    }
}
