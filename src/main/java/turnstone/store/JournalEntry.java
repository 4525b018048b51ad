package turnstone.store;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.Objects;

/**
 * One entry of a journal as it was read.
 *
 * @param number its number, from 1
 * @param sha256 of the bytes of its file
 * @param content what it says, without the journal's own keys; not to be changed
 */
public record JournalEntry(long number, String sha256, ObjectNode content) {
    public JournalEntry {
        Objects.requireNonNull(sha256, "sha256");
        Objects.requireNonNull(content, "content");
    }
}
