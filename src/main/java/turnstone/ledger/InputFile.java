package turnstone.ledger;

import java.time.Instant;
import java.util.Objects;
import java.util.Optional;

/**
 * One file that a day was read from. Lineage for people: not part of what a day's fingerprint covers.
 *
 * @param path where it was
 * @param bytes its length
 * @param modified when it was last changed, as the file system tells
 * @param sha256 SHA-256 of its content, where that was asked for
 */
public record InputFile(String path, long bytes, Instant modified, Optional<String> sha256) {
    public InputFile {
        Texts.check("path", path);
        Objects.requireNonNull(modified, "modified");
        Objects.requireNonNull(sha256, "sha256");
        if (bytes < 0) {
            throw new IllegalArgumentException("length of " + path + " is negative");
        }
    }
}
