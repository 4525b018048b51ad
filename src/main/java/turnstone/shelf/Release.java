package turnstone.shelf;

import java.util.Collection;
import java.util.Collections;
import java.util.Optional;
import java.util.OptionalLong;
import java.util.SortedSet;
import java.util.TreeSet;

/** A wish to put a model in service: which, where, on what grounds. Immutable; the {@code with} methods give a changed copy. */
public final class Release {
    private final String model;
    private final String reason;
    private final String by;
    private final SortedSet<String> sorters;
    private final Optional<VerdictReference> verdict;
    private final Optional<SigningKey> key;
    private final OptionalLong lastEntry;
    private final IfWithdrawn ifWithdrawn;

    /** What happens where the model was withdrawn. */
    public enum IfWithdrawn {
        /** It is refused. */
        REFUSE,
        /** It goes in service, and is withdrawn no longer. */
        RELEASE
    }

    private Release(
            String model,
            String reason,
            String by,
            SortedSet<String> sorters,
            Optional<VerdictReference> verdict,
            Optional<SigningKey> key,
            OptionalLong lastEntry,
            IfWithdrawn ifWithdrawn) {
        this.model = model;
        this.reason = reason;
        this.by = by;
        this.sorters = Collections.unmodifiableSortedSet(new TreeSet<>(sorters));
        this.verdict = verdict;
        this.key = key;
        this.lastEntry = lastEntry;
        this.ifWithdrawn = ifWithdrawn;
    }

    /**
     * On the whole fleet, by hand, unsigned, whatever was changed before, and not where it was withdrawn.
     *
     * @param model first 8 or more digits of a fingerprint on the shelf
     */
    public static Release of(String model, String reason, String by) {
        return new Release(
                model,
                reason,
                by,
                Collections.emptySortedSet(),
                Optional.empty(),
                Optional.empty(),
                OptionalLong.empty(),
                IfWithdrawn.REFUSE);
    }

    /** On these sorters only; none means the whole fleet, which ends a split. */
    public Release withSorters(Collection<String> named) {
        return new Release(model, reason, by, new TreeSet<>(named), verdict, key, lastEntry, ifWithdrawn);
    }

    /** Resting on a verdict. */
    public Release withVerdict(Optional<VerdictReference> reference) {
        return new Release(model, reason, by, sorters, reference, key, lastEntry, ifWithdrawn);
    }

    /** Signed with this key. */
    public Release withKey(Optional<SigningKey> signing) {
        return new Release(model, reason, by, sorters, verdict, signing, lastEntry, ifWithdrawn);
    }

    /** Only if there is no entry newer than this one, 0 where there was none. */
    public Release withLastEntry(long number) {
        return new Release(model, reason, by, sorters, verdict, key, OptionalLong.of(number), ifWithdrawn);
    }

    /** What happens where the model was withdrawn. */
    public Release withWithdrawn(IfWithdrawn choice) {
        return new Release(model, reason, by, sorters, verdict, key, lastEntry, choice);
    }

    String model() {
        return model;
    }

    String reason() {
        return reason;
    }

    String by() {
        return by;
    }

    SortedSet<String> sorters() {
        return sorters;
    }

    Optional<VerdictReference> verdict() {
        return verdict;
    }

    Optional<SigningKey> key() {
        return key;
    }

    OptionalLong lastEntry() {
        return lastEntry;
    }

    IfWithdrawn ifWithdrawn() {
        return ifWithdrawn;
    }
}
