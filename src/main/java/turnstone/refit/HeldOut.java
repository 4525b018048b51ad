package turnstone.refit;

import com.fasterxml.jackson.databind.JsonNode;
import java.util.Set;
import java.util.TreeSet;
import turnstone.ledger.LedgerKey;

/**
 * What is taken out of the sums before a fit.
 *
 * @param trayGroups numbers of tray groups, from 0
 * @param instruments names of instruments
 */
public record HeldOut(Set<Integer> trayGroups, Set<String> instruments) {
    /** Nothing is left out. */
    public static final HeldOut NOTHING = new HeldOut(Set.of(), Set.of());

    public HeldOut {
        trayGroups = java.util.Collections.unmodifiableSet(new TreeSet<>(trayGroups));
        instruments = java.util.Collections.unmodifiableSet(new TreeSet<>(instruments));
    }

    /** What a model's recipe says was left out; nothing where it says nothing. */
    static HeldOut fromRecipe(JsonNode recipe) {
        Set<Integer> groups = new TreeSet<>();
        recipe.path("without").path("trayGroups").forEach(group -> groups.add(group.intValue()));
        Set<String> names = new TreeSet<>();
        recipe.path("without").path("instruments").forEach(name -> names.add(name.asText()));
        return new HeldOut(groups, names);
    }

    /** One tray group, all instruments kept. */
    public static HeldOut group(int trayGroup) {
        return new HeldOut(Set.of(trayGroup), Set.of());
    }

    /** One tray group and one instrument. */
    public static HeldOut groupAndInstrument(int trayGroup, String instrument) {
        return new HeldOut(Set.of(trayGroup), Set.of(instrument));
    }

    /** Whether these records are left out. */
    public boolean holds(LedgerKey key) {
        return trayGroups.contains(key.trayGroup()) || instruments.contains(key.instrument());
    }

    /** Whether nothing is left out. */
    public boolean isEmpty() {
        return trayGroups.isEmpty() && instruments.isEmpty();
    }
}
