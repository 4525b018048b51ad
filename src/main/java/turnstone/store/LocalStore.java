package turnstone.store;

import java.io.BufferedOutputStream;
import java.io.IOException;
import java.io.InputStream;
import java.io.OutputStream;
import java.nio.file.FileAlreadyExistsException;
import java.nio.file.Files;
import java.nio.file.LinkOption;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.security.DigestOutputStream;
import java.security.MessageDigest;
import java.util.ArrayDeque;
import java.util.Deque;
import java.util.Optional;
import java.util.OptionalLong;
import turnstone.fault.Fault;

/**
 * A store on a local file system ({@code file:}).
 *
 * <p>A file is written aside under a name that nobody else makes, synced, and hard-linked to its name, which fails where the name is
 * taken; then the folder is synced. A rename would replace silently. The file system must have hard links. Names aside start with
 * {@code .aside-}: a crash may leave some, nothing reads them, and they may be deleted while no run is active.
 */
public final class LocalStore implements Store {
    private static final int BUFFER_BYTES = 1 << 16;

    private final Path root;
    private final Disk disk;

    /**
     * The store in a folder, which is made when the first file is published.
     *
     * @param root the folder
     */
    public LocalStore(Path root) {
        this(root, new Disk());
    }

    LocalStore(Path root, Disk disk) {
        this.root = root.toAbsolutePath().normalize();
        this.disk = disk;
    }

    @Override
    public Optional<byte[]> read(String name) {
        Path file = path(name);
        try (InputStream in = disk.open(file)) {
            return Optional.of(in.readAllBytes());
        } catch (NoSuchFileException e) {
            refuseDangling(file, e);
            return Optional.empty();
        } catch (IOException e) {
            throw DiskFaults.reading(file, e);
        }
    }

    @Override
    public InputStream open(String name) {
        Path file = path(name);
        try {
            return disk.open(file);
        } catch (IOException e) {
            throw DiskFaults.reading(file, e);
        }
    }

    @Override
    public OptionalLong size(String name) {
        Path file = path(name);
        try {
            return OptionalLong.of(Files.size(file));
        } catch (NoSuchFileException e) {
            refuseDangling(file, e);
            return OptionalLong.empty();
        } catch (IOException e) {
            throw DiskFaults.reading(file, e);
        }
    }

    @Override
    public Outcome publish(String name, byte[] content) {
        return publishOnce(path(name), out -> out.write(content));
    }

    @Override
    public Written write(String name, ContentWriter content) {
        MessageDigest digest = Digests.sha256();
        long[] bytes = new long[1];
        Outcome outcome = publishOnce(path(name), out -> {
            CountingStream counting = new CountingStream(new DigestOutputStream(out, digest));
            OutputStream buffered = new BufferedOutputStream(counting, BUFFER_BYTES);
            content.writeTo(buffered);
            buffered.flush();
            bytes[0] = counting.count();
        });
        if (outcome == Outcome.LOST) {
            throw Fault.storage("there is a file already where a new one was to be written")
                    .at(place(name))
                    .remedy("nothing was replaced; run again");
        }
        return new Written(name, bytes[0], Digests.hex(digest));
    }

    @Override
    public void discard(String name) {
        Path file = path(name);
        try {
            disk.delete(file);
        } catch (IOException e) {
            throw DiskFaults.writing(file, e);
        }
    }

    @Override
    public String describe() {
        return root.toString();
    }

    private Path path(String name) {
        return root.resolve(Names.check(name));
    }

    private Outcome publishOnce(Path file, ContentWriter content) {
        Path folder = file.getParent();
        Path aside = folder.resolve(".aside-" + RunNames.fresh());
        try {
            createFolders(folder);
            disk.write(aside, content);
        } catch (IOException e) {
            throw cleaned(aside, DiskFaults.writing(file, e));
        }
        Outcome outcome;
        try {
            outcome = link(file, aside);
            if (outcome == Outcome.PUBLISHED) {
                syncFolder(folder, file);
            }
        } catch (Fault fault) {
            throw cleaned(aside, fault);
        }
        // The outcome is settled. A second name that can't be taken away is debris that nothing reads.
        cleaned(aside, null);
        return outcome;
    }

    private Outcome link(Path file, Path aside) {
        try {
            disk.link(file, aside);
            return Outcome.PUBLISHED;
        } catch (FileAlreadyExistsException e) {
            return Outcome.LOST;
        } catch (UnsupportedOperationException e) {
            throw DiskFaults.noHardLinks(file, e);
        } catch (IOException e) {
            return settle(file, aside, e);
        }
    }

    /** The link failed, or seemed to: on a remote mount the answer can be lost after the deed. What is there now tells. */
    private Outcome settle(Path file, Path aside, IOException failure) {
        try {
            if (!Files.exists(file, LinkOption.NOFOLLOW_LINKS)) {
                throw DiskFaults.writing(file, failure);
            }
            // Two names of one file, not merely equal content: equal content may be somebody else's.
            return Files.isSameFile(file, aside) ? Outcome.PUBLISHED : Outcome.LOST;
        } catch (IOException e) {
            failure.addSuppressed(e);
            throw DiskFaults.uncertain(file, failure);
        }
    }

    private void syncFolder(Path folder, Path file) {
        try {
            disk.syncFolder(folder);
        } catch (IOException first) {
            try {
                disk.syncFolder(folder);
            } catch (IOException second) {
                second.addSuppressed(first);
                throw DiskFaults.uncertain(file, second);
            }
        }
    }

    private void createFolders(Path folder) throws IOException {
        Deque<Path> missing = new ArrayDeque<>();
        for (Path at = folder; at != null && !Files.isDirectory(at); at = at.getParent()) {
            missing.push(at);
        }
        for (Path next : missing) {
            disk.createFolder(next);
            Path parent = next.getParent();
            if (parent != null) {
                disk.syncFolder(parent);
            }
        }
    }

    private Fault cleaned(Path aside, Fault fault) {
        try {
            disk.delete(aside);
        } catch (IOException e) {
            if (fault != null) {
                fault.addSuppressed(e);
            }
        }
        return fault;
    }

    private static void refuseDangling(Path file, NoSuchFileException cause) {
        if (Files.exists(file, LinkOption.NOFOLLOW_LINKS)) {
            throw DiskFaults.dangling(file, cause);
        }
    }
}
