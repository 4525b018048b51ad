package turnstone.store;

import java.io.InputStream;
import java.util.Optional;
import java.util.OptionalLong;

/**
 * A folder of files that are published once: each appears complete under its name and is never replaced.
 *
 * <p>Names are segments joined by {@code /} (letters, digits, {@code . _ - = @ +}, no leading dot); another name is an
 * {@link IllegalArgumentException}. A store can't be listed: what is committed is told by numbered entries, never by what lies in a
 * folder. Every method throws a storage {@link turnstone.fault.Fault} where the file system fails; an empty result means that the file
 * is certainly not there. Safe for use by several threads and several processes at once.
 */
public interface Store {
    /** The whole content of a small file, or empty where there is certainly none of this name. */
    Optional<byte[]> read(String name);

    /** The content of a file as a stream, which the caller closes. A missing file is a storage fault. */
    InputStream open(String name);

    /** The length in bytes, or empty where there is certainly no file of this name. */
    OptionalLong size(String name);

    /**
     * Publishes a small file: afterwards it is there as a whole, safe against a crash of the machine, or nothing of it is.
     *
     * @return {@link Outcome#LOST} where something of this name was there before
     */
    Outcome publish(String name, byte[] content);

    /**
     * Publishes a file of any length, front to back, with its digest taken while it is written. A name that is already there is a
     * storage fault: names of such files are made unique by the caller.
     */
    Written write(String name, ContentWriter content);

    /** Takes away a file that no published entry names: only after a failure that is certain. A missing file is fine. */
    void discard(String name);

    /** Where the store is, for messages. */
    String describe();

    /** Where a file is, for messages. */
    default String place(String name) {
        return describe() + "/" + name;
    }
}
