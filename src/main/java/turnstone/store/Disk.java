package turnstone.store;

import java.io.IOException;
import java.io.InputStream;
import java.io.OutputStream;
import java.nio.channels.Channels;
import java.nio.channels.FileChannel;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardOpenOption;

/** The few steps of a local file system that publishing is made of, each of which can fail by itself. */
class Disk {
    /** Opens a file for reading. */
    InputStream open(Path file) throws IOException {
        return Files.newInputStream(file);
    }

    /** Creates a file that must not be there, writes it, and brings it to the disk. */
    void write(Path file, ContentWriter content) throws IOException {
        try (FileChannel channel = FileChannel.open(file, StandardOpenOption.CREATE_NEW, StandardOpenOption.WRITE)) {
            // Not closed: that would close the channel before it is synced.
            OutputStream out = Channels.newOutputStream(channel);
            content.writeTo(out);
            sync(channel);
        }
    }

    /** Brings a file's content to the disk. */
    void sync(FileChannel channel) throws IOException {
        channel.force(true);
    }

    /** Gives a file a second name, which must not be there. */
    void link(Path name, Path file) throws IOException {
        Files.createLink(name, file);
    }

    /** Brings the names in a folder to the disk. */
    void syncFolder(Path folder) throws IOException {
        try (FileChannel channel = FileChannel.open(folder, StandardOpenOption.READ)) {
            channel.force(true);
        }
    }

    /** Makes one folder, or leaves it where it is there. */
    void createFolder(Path folder) throws IOException {
        Files.createDirectories(folder);
    }

    /** Takes a name away. */
    void delete(Path file) throws IOException {
        Files.deleteIfExists(file);
    }
}
