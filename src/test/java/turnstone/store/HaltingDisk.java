package turnstone.store;

import java.io.IOException;
import java.io.InputStream;
import java.nio.channels.FileChannel;
import java.nio.file.Path;

/** A local disk on which the process stops dead before its {@code step}-th operation, as by a kill. */
public final class HaltingDisk extends Disk {
    /** What the process ends with. */
    public static final int HALTED = 137;

    private final int step;
    private int done;

    private HaltingDisk(int step) {
        this.step = step;
    }

    /** A store in this folder on such a disk; 0 never stops. */
    public static Store store(Path folder, int step) {
        return new LocalStore(folder, new HaltingDisk(step));
    }

    private void count() {
        done++;
        if (done == step) {
            Runtime.getRuntime().halt(HALTED);
        }
    }

    @Override
    InputStream open(Path file) throws IOException {
        count();
        return super.open(file);
    }

    @Override
    void write(Path file, ContentWriter content) throws IOException {
        count();
        super.write(file, out -> {
            content.writeTo(out);
            count();
        });
    }

    @Override
    void sync(FileChannel channel) throws IOException {
        count();
        super.sync(channel);
    }

    @Override
    void link(Path name, Path file) throws IOException {
        count();
        super.link(name, file);
        count();
    }

    @Override
    void syncFolder(Path folder) throws IOException {
        count();
        super.syncFolder(folder);
    }

    @Override
    void createFolder(Path folder) throws IOException {
        count();
        super.createFolder(folder);
    }

    @Override
    void delete(Path file) throws IOException {
        count();
        super.delete(file);
        count();
    }
}
