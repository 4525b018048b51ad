package turnstone.night;

import java.util.Optional;
import turnstone.fault.Fault;
import turnstone.plant.Plant;
import turnstone.plant.ReleaseRule;
import turnstone.shelf.Release;
import turnstone.shelf.Shelf;
import turnstone.shelf.ShelfEntry;
import turnstone.shelf.SigningKey;
import turnstone.shelf.VerdictReference;
import turnstone.trial.Decision;
import turnstone.trial.Verdict;

/** The release that a night makes by itself, where the plant file lets it; what can be refused beforehand is, before the night's work. */
final class NightRelease {
    private final Plant plant;
    private final Shelf shelf;
    private final String by;
    private final long lastEntry;
    private final Optional<SigningKey> key;

    private NightRelease(Plant plant, Shelf shelf, String by, long lastEntry, Optional<SigningKey> key) {
        this.plant = plant;
        this.shelf = shelf;
        this.by = by;
        this.lastEntry = lastEntry;
        this.key = key;
    }

    /**
     * Notes what is in service and reads the key that is to sign.
     *
     * @throws Fault of kind usage where the night may release and its key can't be used, or is not the plant's
     */
    static NightRelease prepare(Plant plant, Shelf shelf, String by) {
        Optional<SigningKey> key = plant.release() == ReleaseRule.AUTOMATIC
                ? plant.signing().privateKey().map(SigningKey::read)
                : Optional.empty();
        key.map(SigningKey::publicKey)
                .ifPresent(ours -> shelf.rule()
                        .key()
                        .filter(expected -> !expected.equals(ours))
                        .ifPresent(expected -> {
                            throw Fault.usage("the private key that the night signs with is not the public key's")
                                    .at(plant.signing()
                                            .privateKey()
                                            .orElseThrow()
                                            .toString())
                                    .found(ours)
                                    .expected(expected)
                                    .remedy("correct signing in the plant file");
                        }));
        return new NightRelease(plant, shelf, by, shelf.history().size(), key);
    }

    /**
     * Puts the candidate in service, or says why not; empty where the verdict or the plant file does not let the night do so.
     *
     * @throws Fault of kind busy where something was changed since {@link #prepare}
     */
    Optional<ShelfEntry> make(Verdict verdict, VerdictReference reference, Progress progress) {
        if (verdict.decision() != Decision.RELEASE
                || plant.release() != ReleaseRule.AUTOMATIC
                || verdict.inService().isEmpty()) {
            return Optional.empty();
        }
        if (shelf.running().map(running -> !running.isWhole()).orElse(false)) {
            progress.remark(
                    "not released by the night: single sorters run a model of their own; end the split by hand");
            return Optional.empty();
        }
        ShelfEntry withdrawn = shelf.withdrawn().get(verdict.candidate());
        if (withdrawn != null) {
            progress.remark("not released by the night: the candidate was withdrawn by " + withdrawn.by() + ": "
                    + withdrawn.reason());
            return Optional.empty();
        }
        return Optional.of(shelf.release(Release.of(verdict.candidate(), verdict.mainReason(), by)
                .withVerdict(Optional.of(reference))
                .withKey(key)
                .withLastEntry(lastEntry)));
    }
}
