package turnstone.night;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardCopyOption;
import turnstone.fault.Fault;

/** Writes a result file so that it appears whole: aside first, then moved to its name. */
public final class WholeFile {
    private WholeFile() {}

    /**
     * Writes, in place of what was there.
     *
     * @throws Fault of kind storage where it can't be written; nothing is left then
     */
    public static void write(Path file, byte[] content) {
        Path aside = file.resolveSibling("." + file.getFileName() + ".part");
        try {
            Files.write(aside, content);
            Files.move(aside, file, StandardCopyOption.ATOMIC_MOVE);
        } catch (IOException e) {
            remove(aside, e);
            throw cannotWrite(file, e);
        }
    }

    private static void remove(Path aside, IOException because) {
        try {
            Files.deleteIfExists(aside);
        } catch (IOException e) {
            because.addSuppressed(e);
        }
    }

    /** The refusal of a place that can't be written. */
    static Fault cannotWrite(Path path, IOException e) {
        return Fault.storage("can't be written")
                .at(path.toString())
                .found(e.getClass().getSimpleName() + " " + e.getMessage())
                .remedy("check space and permissions, or name another folder")
                .because(e);
    }

    /** Makes a folder with all above it. */
    public static void folder(Path folder) {
        try {
            Files.createDirectories(folder);
        } catch (IOException e) {
            throw cannotWrite(folder, e);
        }
    }
}
