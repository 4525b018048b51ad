package turnstone.store;

import java.io.FileInputStream;
import java.io.FilterInputStream;
import java.io.IOException;
import java.io.InputStream;
import java.nio.channels.FileChannel;
import java.nio.file.Path;
import java.util.function.Supplier;

/** A local disk, one step of which fails on purpose a stated number of times; it counts how often it did. */
final class FaultyDisk extends Disk {
    /** Where it fails. */
    enum Step {
        OPEN,
        READ,
        WRITE,
        SYNC,
        /** The link isn't made. */
        LINK,
        /** The link is made, and the answer says otherwise. */
        LINK_AFTER,
        SYNC_FOLDER,
        CREATE_FOLDER,
        DELETE
    }

    private final Step failing;
    private final int times;
    private final Supplier<IOException> failure;
    private int fired;

    FaultyDisk(Step failing, int times, Supplier<IOException> failure) {
        this.failing = failing;
        this.times = times;
        this.failure = failure;
    }

    /** How often it failed. */
    int fired() {
        return fired;
    }

    private void at(Step step) throws IOException {
        if (step == failing && fired < times) {
            fired++;
            throw failure.get();
        }
    }

    @Override
    InputStream open(Path file) throws IOException {
        at(Step.OPEN);
        return new FilterInputStream(new FileInputStream(file.toFile())) {
            @Override
            public int read(byte[] bytes, int from, int length) throws IOException {
                at(Step.READ);
                return in.read(bytes, from, length);
            }
        };
    }

    @Override
    void write(Path file, ContentWriter content) throws IOException {
        super.write(file, out -> {
            content.writeTo(out);
            at(Step.WRITE);
        });
    }

    @Override
    void sync(FileChannel channel) throws IOException {
        at(Step.SYNC);
        super.sync(channel);
    }

    @Override
    void link(Path name, Path file) throws IOException {
        at(Step.LINK);
        super.link(name, file);
        at(Step.LINK_AFTER);
    }

    @Override
    void syncFolder(Path folder) throws IOException {
        at(Step.SYNC_FOLDER);
        super.syncFolder(folder);
    }

    @Override
    void createFolder(Path folder) throws IOException {
        at(Step.CREATE_FOLDER);
        super.createFolder(folder);
    }

    @Override
    void delete(Path file) throws IOException {
        at(Step.DELETE);
        super.delete(file);
    }
}
