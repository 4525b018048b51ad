package turnstone.ledger;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.math.BigInteger;
import java.time.LocalDate;
import java.util.Map;
import turnstone.json.Json;
import turnstone.moments.Moments;

/**
 * What makes two days the same: SHA-256 of a canonical JSON form of their content.
 *
 * <p>Covered are the day, count scale and head, keys with the fingerprints of their moments, every field of every showing, and the
 * counts of all outcomes. Not covered: names, lengths and times of inputs, the revision, and which showings were left out on purpose.
 */
final class DayFingerprints {
    private DayFingerprints() {}

    /** Of keys and moments alone. */
    static String moments(DayMoments day) {
        return Json.fingerprint(momentsNode(day));
    }

    /** Of the whole canonical content. */
    static String day(
            LocalDate date, DayMoments day, DayCounts counts, String scaleFingerprint, String headFingerprint) {
        ObjectNode node = Json.object()
                .put("day", date.toString())
                .put("countScale", scaleFingerprint)
                .put("head", headFingerprint)
                .put("read", counts.read())
                .put("accepted", counts.accepted())
                .put("noSignal", counts.noSignal());
        ObjectNode quarantined = node.putObject("quarantined");
        counts.quarantined().forEach(quarantined::put);
        node.set("moments", momentsNode(day));
        ArrayNode showings = node.putArray("showings");
        for (ShowingSums showing : day.showings().values()) {
            ObjectNode one = showings.addObject()
                    .put("showing", showing.showing())
                    .put("sorter", showing.sorter())
                    .put("instrument", showing.instrument())
                    .put("tray", showing.tray())
                    .put("trayGroup", showing.trayGroup())
                    .put("material", showing.material())
                    .put("records", showing.records())
                    .put("noSignal", showing.noSignal())
                    .put("quarantined", showing.quarantined());
            ArrayNode sums = one.putArray("sums");
            for (BigInteger sum : showing.sums()) {
                sums.add(sum);
            }
        }
        return Json.fingerprint(node);
    }

    private static ArrayNode momentsNode(DayMoments day) {
        ArrayNode keys = Json.array();
        for (Map.Entry<LedgerKey, Moments> entry : day.moments().entrySet()) {
            keys.addObject()
                    .put("instrument", entry.getKey().instrument())
                    .put("material", entry.getKey().material())
                    .put("trayGroup", entry.getKey().trayGroup())
                    .put("moments", entry.getValue().fingerprint());
        }
        return keys;
    }
}
