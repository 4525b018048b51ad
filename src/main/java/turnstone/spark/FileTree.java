package turnstone.spark;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Comparator;
import java.util.List;
import java.util.stream.Stream;

/** A folder and all below it, on this machine. */
final class FileTree {
    private FileTree() {}

    /** Deletes it, deepest first; nothing happens where it is not there. */
    static void delete(Path folder) throws IOException {
        if (Files.notExists(folder)) {
            return;
        }
        try (Stream<Path> below = Files.walk(folder)) {
            List<Path> deepestFirst = below.sorted(Comparator.reverseOrder()).toList();
            for (Path path : deepestFirst) {
                Files.delete(path);
            }
        }
    }
}
