package turnstone.shelf;

/**
 * The verdict that a release rests on.
 *
 * @param path where its file is
 * @param fingerprint SHA-256 of its content, 64 lower-case hexadecimal digits
 */
public record VerdictReference(String path, String fingerprint) {
    public VerdictReference {
        if (path == null || path.isBlank() || !Fingerprints.isWhole(fingerprint)) {
            throw new IllegalArgumentException("not a path and a fingerprint: " + path + ", " + fingerprint);
        }
    }
}
