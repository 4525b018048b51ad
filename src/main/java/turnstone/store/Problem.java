package turnstone.store;

import java.util.Objects;

/**
 * One file that is not what was written.
 *
 * @param file name in the store
 * @param trouble what is wrong with it
 * @param expected what was written: digest and length, or another statement of it
 * @param found what is there now
 */
public record Problem(String file, Trouble trouble, String expected, String found) {
    /** What can be wrong with a file. */
    public enum Trouble {
        /** Named by an entry, and not there. */
        MISSING("missing"),
        /** Shorter than what was written. */
        TRUNCATED("truncated"),
        /** There with other content. */
        ALTERED("altered"),
        /** There, but it couldn't be read. */
        UNREADABLE("unreadable");

        private final String label;

        Trouble(String label) {
            this.label = label;
        }

        /** The word for messages. */
        public String label() {
            return label;
        }
    }

    public Problem {
        Objects.requireNonNull(file, "file");
        Objects.requireNonNull(trouble, "trouble");
        Objects.requireNonNull(expected, "expected");
        Objects.requireNonNull(found, "found");
    }

    @Override
    public String toString() {
        return file + ": " + trouble.label() + "; found " + found + ", expected " + expected;
    }
}
