package turnstone.ledger;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.time.Instant;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.store.JournalEntry;
import turnstone.store.Written;

/**
 * The form of a day's entry in the journal.
 *
 * <p>The entry itself is the day's whole description; there is no second file beside the parts. So one publication commits everything at
 * once, and no two descriptions can disagree.
 *
 * <table>
 * <caption>Keys, besides those of the journal</caption>
 * <tr><th>key</th><th>content</th></tr>
 * <tr><td>{@code format}, {@code version}</td><td>{@code turnstone-day}, 1</td></tr>
 * <tr><td>{@code day}, {@code revision}</td><td>the date; from 1</td></tr>
 * <tr><td>{@code inputs}</td><td>[{{@code path}, {@code bytes}, {@code modified}, {@code sha256} if it was asked for}]</td></tr>
 * <tr><td>{@code counts}</td><td>{{@code read}, {@code accepted}, {@code noSignal}, {@code quarantined} {reason: records}}</td></tr>
 * <tr><td>{@code countScale}, {@code head}, {@code moments}, {@code fingerprint}</td><td>fingerprints</td></tr>
 * <tr><td>{@code parts}</td><td>{{@code moments}, {@code showings}}, each {{@code name}, {@code bytes}, {@code sha256}}</td></tr>
 * <tr><td>{@code showings}, {@code without}</td><td>ids, sorted</td></tr>
 * </table>
 */
final class DayEntryJson {
    private static final String FORMAT = "turnstone-day";
    private static final int VERSION = 1;

    private DayEntryJson() {}

    static ObjectNode write(DayEntry entry) {
        ObjectNode node = Json.object()
                .put("format", FORMAT)
                .put("version", VERSION)
                .put("day", entry.day().toString())
                .put("revision", entry.revision());
        ArrayNode inputs = node.putArray("inputs");
        for (InputFile input : entry.inputs()) {
            ObjectNode one = inputs.addObject()
                    .put("path", input.path())
                    .put("bytes", input.bytes())
                    .put("modified", input.modified().toString());
            input.sha256().ifPresent(sha256 -> one.put("sha256", sha256));
        }
        DayCounts counts = entry.counts();
        ObjectNode quarantined = node.putObject("counts")
                .put("read", counts.read())
                .put("accepted", counts.accepted())
                .put("noSignal", counts.noSignal())
                .putObject("quarantined");
        counts.quarantined().forEach(quarantined::put);
        node.put("countScale", entry.scaleFingerprint())
                .put("head", entry.headFingerprint())
                .put("moments", entry.momentsFingerprint())
                .put("fingerprint", entry.fingerprint());
        ObjectNode parts = node.putObject("parts");
        parts.set("moments", part(entry.momentsPart()));
        parts.set("showings", part(entry.showingsPart()));
        ArrayNode showings = node.putArray("showings");
        entry.showings().forEach(showings::add);
        ArrayNode without = node.putArray("without");
        entry.without().forEach(without::add);
        return node;
    }

    static DayEntry read(JournalEntry entry, String place) {
        JsonNode node = entry.content();
        if (!FORMAT.equals(node.path("format").asText())) {
            throw Fault.storage("not an entry of a ledger")
                    .at(place)
                    .found(node.path("format"))
                    .expected(FORMAT);
        }
        if (node.path("version").asInt() > VERSION) {
            throw Fault.storage("written by a newer version of this program")
                    .at(place)
                    .found("version " + node.path("version"))
                    .expected("at most " + VERSION)
                    .remedy("use the newer program");
        }
        try {
            return parse(entry.number(), node);
        } catch (IllegalArgumentException | NullPointerException | java.time.DateTimeException e) {
            throw Fault.storage("not an entry of a ledger")
                    .at(place)
                    .found(e.getMessage())
                    .because(e);
        }
    }

    private static DayEntry parse(long number, JsonNode node) {
        List<InputFile> inputs = new ArrayList<>();
        for (JsonNode input : node.get("inputs")) {
            inputs.add(new InputFile(
                    input.get("path").asText(),
                    input.get("bytes").longValue(),
                    Instant.parse(input.get("modified").asText()),
                    Optional.ofNullable(input.get("sha256")).map(JsonNode::asText)));
        }
        JsonNode counts = node.get("counts");
        SortedMap<String, Long> quarantined = new TreeMap<>();
        counts.get("quarantined")
                .properties()
                .forEach(reason ->
                        quarantined.put(reason.getKey(), reason.getValue().longValue()));
        return new DayEntry(
                number,
                LocalDate.parse(node.get("day").asText()),
                node.get("revision").intValue(),
                inputs,
                new DayCounts(
                        counts.get("read").longValue(),
                        counts.get("accepted").longValue(),
                        counts.get("noSignal").longValue(),
                        quarantined),
                node.get("countScale").asText(),
                node.get("head").asText(),
                node.get("moments").asText(),
                node.get("fingerprint").asText(),
                part(node.get("parts").get("moments")),
                part(node.get("parts").get("showings")),
                texts(node.get("showings")),
                texts(node.get("without")));
    }

    private static ObjectNode part(Written written) {
        return Json.object()
                .put("name", written.name())
                .put("bytes", written.bytes())
                .put("sha256", written.sha256());
    }

    private static Written part(JsonNode node) {
        return new Written(
                node.get("name").asText(),
                node.get("bytes").longValue(),
                node.get("sha256").asText());
    }

    private static List<String> texts(JsonNode array) {
        List<String> texts = new ArrayList<>();
        array.forEach(text -> texts.add(text.asText()));
        return texts;
    }
}
