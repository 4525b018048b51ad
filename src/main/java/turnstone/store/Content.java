package turnstone.store;

import java.io.BufferedInputStream;
import java.io.IOException;
import java.io.InputStream;
import java.security.DigestInputStream;
import java.security.MessageDigest;
import java.util.Optional;
import java.util.OptionalLong;
import turnstone.fault.Fault;

/** Reading of files against what was written: length and SHA-256 are checked over the whole file, whatever the reader used of it. */
public final class Content {
    private static final int BUFFER_BYTES = 1 << 16;

    private Content() {}

    /**
     * Reads a file and checks it.
     *
     * @param <T> what the reader makes of it
     * @return what the reader made of it, only where the file is what was written
     * @throws Fault of kind storage, naming the file, where it is missing, unreadable or not what was written
     */
    public static <T> T read(Store store, Written written, ContentReader<T> reader) {
        MessageDigest digest = Digests.sha256();
        T result = null;
        Exception unreadable = null;
        CountingInput counted;
        try (InputStream in = store.open(written.name())) {
            counted = new CountingInput(in);
            InputStream checked = new DigestInputStream(counted, digest);
            try {
                result = reader.readFrom(new BufferedInputStream(checked, BUFFER_BYTES));
            } catch (IOException | RuntimeException e) {
                // A damaged file often can't be parsed: the digest over the rest says whether it is damaged.
                unreadable = e;
            }
            drain(checked);
        } catch (IOException e) {
            throw Fault.storage("can't be read")
                    .at(store.place(written.name()))
                    .found(e.getMessage())
                    .remedy("check the disk, then run verify")
                    .because(e);
        }
        Optional<Problem> problem = compare(written, counted.count(), Digests.hex(digest));
        if (problem.isPresent()) {
            throw notAsWritten(store, problem.get(), unreadable);
        }
        if (unreadable instanceof RuntimeException defect) {
            throw defect;
        }
        if (unreadable != null) {
            throw Fault.storage("is what was written, but not of a form that this version reads")
                    .at(store.place(written.name()))
                    .found(unreadable.getMessage())
                    .because(unreadable);
        }
        return result;
    }

    /** Reads a file to its end; tells how it differs from what was written, or empty where it doesn't. */
    public static Optional<Problem> check(Store store, Written written) {
        OptionalLong size = store.size(written.name());
        if (size.isEmpty()) {
            return Optional.of(new Problem(
                    written.name(), Problem.Trouble.MISSING, stated(written.bytes(), written.sha256()), "nothing"));
        }
        MessageDigest digest = Digests.sha256();
        long bytes;
        try (InputStream in = store.open(written.name())) {
            CountingInput counted = new CountingInput(in);
            drain(new DigestInputStream(counted, digest));
            bytes = counted.count();
        } catch (IOException e) {
            return Optional.of(new Problem(
                    written.name(),
                    Problem.Trouble.UNREADABLE,
                    stated(written.bytes(), written.sha256()),
                    String.valueOf(e.getMessage())));
        }
        return compare(written, bytes, Digests.hex(digest));
    }

    /**
     * Reads a file back after writing.
     *
     * @throws Fault of kind storage where it is not what was written
     */
    public static void readBack(Store store, Written written) {
        check(store, written).ifPresent(problem -> {
            throw notAsWritten(store, problem, null);
        });
    }

    private static Optional<Problem> compare(Written written, long bytes, String sha256) {
        if (bytes == written.bytes() && sha256.equals(written.sha256())) {
            return Optional.empty();
        }
        Problem.Trouble trouble = bytes < written.bytes() ? Problem.Trouble.TRUNCATED : Problem.Trouble.ALTERED;
        return Optional.of(
                new Problem(written.name(), trouble, stated(written.bytes(), written.sha256()), stated(bytes, sha256)));
    }

    private static String stated(long bytes, String sha256) {
        return bytes + " bytes of SHA-256 " + sha256;
    }

    private static Fault notAsWritten(Store store, Problem problem, Throwable cause) {
        return Fault.storage("not what was written: " + problem.trouble().label())
                .at(store.place(problem.file()))
                .found(problem.found())
                .expected(problem.expected())
                .remedy("restore the file from a copy, then run verify")
                .because(cause);
    }

    private static void drain(InputStream in) throws IOException {
        byte[] buffer = new byte[BUFFER_BYTES];
        while (in.read(buffer) >= 0) {
            // Only the digest and the count matter.
        }
    }
}
