package turnstone.store;

import java.util.Objects;

/**
 * What was written: enough to tell later whether a file is still what it was.
 *
 * @param name name in the store
 * @param bytes length
 * @param sha256 SHA-256 of the content, 64 lower-case hexadecimal digits
 */
public record Written(String name, long bytes, String sha256) {
    public Written {
        Names.check(name);
        Objects.requireNonNull(sha256, "sha256");
        if (bytes < 0 || !Digests.isSha256(sha256)) {
            throw new IllegalArgumentException("not a length and a SHA-256: " + bytes + ", " + sha256);
        }
    }
}
