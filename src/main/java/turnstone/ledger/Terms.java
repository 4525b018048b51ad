package turnstone.ledger;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;

/**
 * What a ledger is kept in for good: one count scale and one pretreatment head, and the form of {@code ledger.json} that says so.
 *
 * <p>Keys: {@code format} {@code turnstone-ledger}, {@code version} 1, {@code countScale}, {@code head}, their fingerprints, and
 * {@code check}, the SHA-256 of the canonical form of all the rest.
 */
record Terms(CountScale scale, HeadSpec head) {
    static final String FILE = "ledger.json";

    private static final String FORMAT = "turnstone-ledger";
    private static final int VERSION = 1;
    /** A scale of other steps differs in every channel: the first few tell the story. */
    private static final int MOST_NAMED = 6;

    byte[] bytes() {
        ObjectNode node = Json.object().put("format", FORMAT).put("version", VERSION);
        node.set("countScale", scale.json());
        node.put("countScaleFingerprint", scale.fingerprint());
        node.set("head", head.json());
        node.put("headFingerprint", head.fingerprint());
        node.put("check", Json.fingerprint(node));
        return Json.pretty(node);
    }

    static Terms read(byte[] content, String place) {
        JsonNode node = Json.read(content, place);
        if (!(node instanceof ObjectNode ledger)
                || !FORMAT.equals(node.path("format").asText())) {
            throw Fault.storage("not the description of a ledger").at(place).expected("format " + FORMAT);
        }
        if (node.path("version").asInt() > VERSION) {
            throw Fault.storage("written by a newer version of this program")
                    .at(place)
                    .found("version " + node.path("version"))
                    .expected("at most " + VERSION)
                    .remedy("use the newer program");
        }
        String computed = Json.fingerprint(ledger.deepCopy().without("check"));
        if (!computed.equals(node.path("check").asText()) || !Arrays.equals(content, Json.pretty(node))) {
            throw Fault.storage("not what was written: altered")
                    .at(place)
                    .found("check " + computed)
                    .expected(node.path("check").asText())
                    .remedy("restore the file from a copy, then run verify");
        }
        return new Terms(CountScale.fromJson(node.get("countScale")), HeadSpec.fromJson(node.get("head")));
    }

    /** Refuses to go on in other terms, naming the fields that differ. */
    void require(Terms wanted, String place) {
        List<String> differing = new ArrayList<>();
        if (!scale.fingerprint().equals(wanted.scale.fingerprint())) {
            differing.addAll(prefixed("count scale", wanted.scale.differences(scale)));
        }
        if (!head.fingerprint().equals(wanted.head.fingerprint())) {
            differing.addAll(prefixed("head", wanted.head.differences(head)));
        }
        if (!differing.isEmpty()) {
            throw Fault.input("this ledger is kept with another count scale or pretreatment head, for good")
                    .at(place)
                    .found(named(differing))
                    .remedy("use the ledger's own settings, or another ledger folder for these");
        }
    }

    private static String named(List<String> differing) {
        String first = String.join(", ", differing.subList(0, Math.min(MOST_NAMED, differing.size())));
        int more = differing.size() - MOST_NAMED;
        return more > 0 ? first + " and " + more + " more" : first;
    }

    private static List<String> prefixed(String whose, List<String> fields) {
        if (fields.isEmpty()) {
            throw new IllegalStateException("fingerprints of the " + whose + " differ, and no field does");
        }
        return fields.stream().map(field -> whose + " " + field).toList();
    }
}
