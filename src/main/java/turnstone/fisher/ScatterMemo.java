package turnstone.fisher;

import java.util.IdentityHashMap;
import turnstone.moments.Moments;

/**
 * Scatter of cells about their own means, and sums of cells of one weight, kept for further fits that hold the same cells.
 *
 * <p>What is kept is a function of a cell's sums alone, so a fit has the same numbers with a memo and without. Cells are told by identity,
 * not by content: a caller keeps the {@link Moments} that it hands in. For many threads.
 */
public final class ScatterMemo {
    private final long most_bytes;
    private final IdentityHashMap<Moments, LowerRows> kept = new IdentityHashMap<>();
    private final IdentityHashMap<Moments, IdentityHashMap<Moments, Moments>> added = new IdentityHashMap<>();
    private long held_bytes;

    /**
     * An empty memo.
     *
     * @param most_bytes what it may hold; cells beyond it are formed anew each time
     */
    public ScatterMemo(long most_bytes) {
        this.most_bytes = most_bytes;
    }

    /** A memo that keeps nothing. */
    static ScatterMemo nothing() {
        return new ScatterMemo(0);
    }

    /** (n·P − s·s)/n of these moments, in counts. */
    LowerRows of(Moments moments) {
        long bytes = LowerRows.bytes(moments.channels());
        synchronized (kept) {
            LowerRows found = kept.get(moments);
            if (found != null) {
                return found;
            }
        }
        // Outside of the lock: two threads may form the same rows, and either will do.
        LowerRows formed = ExactDeviations.scatter(moments);
        synchronized (kept) {
            if (held_bytes + bytes <= most_bytes && kept.putIfAbsent(moments, formed) == null) {
                held_bytes += bytes;
            }
        }
        return formed;
    }

    /** The moments of both; the same object again for the same two objects. */
    Moments plus(Moments one, Moments other) {
        synchronized (kept) {
            IdentityHashMap<Moments, Moments> withOne = added.get(one);
            Moments found = withOne == null ? null : withOne.get(other);
            if (found != null) {
                return found;
            }
        }
        Moments both = one.plus(other);
        long bytes = 2 * LowerRows.bytes(one.channels());
        synchronized (kept) {
            if (held_bytes + bytes > most_bytes) {
                return both;
            }
            Moments earlier =
                    added.computeIfAbsent(one, key -> new IdentityHashMap<>()).putIfAbsent(other, both);
            if (earlier != null) {
                return earlier;
            }
            held_bytes += bytes;
            return both;
        }
    }
}
