package turnstone.ledger;

import java.util.Collections;
import java.util.Map;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.fault.Fault;

/**
 * What became of a day's records: read = accepted + no signal + quarantined.
 *
 * @param read records in the files, counted by a route of its own
 * @param accepted records in the moments
 * @param noSignal records too dark to tell
 * @param quarantined records in quarantine, by the label of the reason
 */
public record DayCounts(long read, long accepted, long noSignal, SortedMap<String, Long> quarantined) {
    /**
     * Checks the sum.
     *
     * @throws Fault of kind storage where records were dropped or counted twice
     */
    public DayCounts {
        SortedMap<String, Long> copy = new TreeMap<>();
        for (Map.Entry<String, Long> reason : quarantined.entrySet()) {
            if (reason.getValue() < 0) {
                throw new IllegalArgumentException("quarantined is negative: " + reason);
            }
            if (reason.getValue() > 0) {
                copy.put(reason.getKey(), reason.getValue());
            }
        }
        quarantined = Collections.unmodifiableSortedMap(copy);
        if (read < 0 || accepted < 0 || noSignal < 0) {
            throw new IllegalArgumentException("a count is negative");
        }
        long total = Math.addExact(Math.addExact(accepted, noSignal), total(copy));
        if (read != total) {
            throw Fault.storage("records were dropped or counted twice: read is not accepted + no signal + quarantined")
                    .found(total + " (" + accepted + " + " + noSignal + " + " + total(copy) + ")")
                    .expected(read)
                    .remedy("nothing was posted; check that no file changes while it is read, then run again");
        }
    }

    /** All records in quarantine. */
    public long quarantinedTotal() {
        return total(quarantined);
    }

    private static long total(Map<String, Long> counts) {
        return counts.values().stream().mapToLong(Long::longValue).reduce(0, Math::addExact);
    }
}
