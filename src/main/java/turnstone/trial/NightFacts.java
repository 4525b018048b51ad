package turnstone.trial;

import java.util.EnumMap;
import java.util.Map;
import java.util.OptionalDouble;
import turnstone.plant.Guard;

/** What guards look at beside tallies: numbers that the night found out elsewhere. Immutable. */
public final class NightFacts {
    private final Map<Guard.Kind, Double> found;

    private NightFacts(Map<Guard.Kind, Double> found) {
        this.found = found;
    }

    /** No facts at all: every guard that needs one holds. */
    public static NightFacts none() {
        return new NightFacts(Map.of());
    }

    /** The same with one more; refused for guards that are judged from tallies. */
    public NightFacts with(Guard.Kind kind, double value) {
        if (kind.hasInterval() || kind == Guard.Kind.SHOWINGS) {
            throw new IllegalArgumentException(kind.label() + " is judged from tallies");
        }
        Map<Guard.Kind, Double> more = new EnumMap<>(Guard.Kind.class);
        more.putAll(found);
        more.put(kind, value);
        return new NightFacts(more);
    }

    /** The number, where the night found it out. */
    public OptionalDouble of(Guard.Kind kind) {
        Double value = found.get(kind);
        return value == null ? OptionalDouble.empty() : OptionalDouble.of(value);
    }
}
