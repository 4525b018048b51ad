package turnstone.audit;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import turnstone.fault.Fault;
import turnstone.json.Json;

/**
 * What a hand sort of both streams, held against the board's decisions, found of the air valves.
 *
 * @param decided_kg mass that the board decided to eject
 * @param ejected_kg of it, what was found in the ejected stream
 * @param left_kg mass that the board decided to leave
 * @param carried_kg of it, what was found in the ejected stream all the same
 */
public record Valves(double decided_kg, double ejected_kg, double left_kg, double carried_kg) {
    public Valves {
        requirePart("ejected", ejected_kg, "decided", decided_kg);
        requirePart("carried", carried_kg, "left", left_kg);
    }

    private static void requirePart(String part, double part_kg, String whole, double whole_kg) {
        if (!(whole_kg > 0) || Double.isInfinite(whole_kg) || !(part_kg >= 0) || part_kg > whole_kg) {
            throw Fault.usage("masses of a valve check that can't be")
                    .found(whole + "=" + String.valueOf(whole_kg) + ", " + part + "=" + String.valueOf(part_kg))
                    .expected(whole + " above 0, and " + part + " from 0 to " + whole);
        }
    }

    /** The two together, as if weighed at once. */
    Valves plus(Valves other) {
        return new Valves(
                decided_kg + other.decided_kg,
                ejected_kg + other.ejected_kg,
                left_kg + other.left_kg,
                carried_kg + other.carried_kg);
    }

    /** Of what is decided to be ejected, the mass share that is. */
    public double ejectionEfficiency() {
        return ejected_kg / decided_kg;
    }

    /** Of what is decided to be left, the mass share that is ejected all the same. */
    public double coEjection() {
        return carried_kg / left_kg;
    }

    ObjectNode json() {
        return Json.object()
                .put("decided_kg", decided_kg)
                .put("ejected_kg", ejected_kg)
                .put("left_kg", left_kg)
                .put("carried_kg", carried_kg);
    }

    static Valves fromJson(JsonNode node) {
        return new Valves(
                node.required("decided_kg").doubleValue(),
                node.required("ejected_kg").doubleValue(),
                node.required("left_kg").doubleValue(),
                node.required("carried_kg").doubleValue());
    }
}
