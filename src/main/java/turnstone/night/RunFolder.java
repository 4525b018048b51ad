package turnstone.night;

import com.fasterxml.jackson.databind.JsonNode;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.FileAlreadyExistsException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.Locale;
import turnstone.fault.Fault;
import turnstone.json.Json;

/**
 * The folder of one run: {@code DAY/0001}, {@code DAY/0002}, … below the plant's folder of runs.
 *
 * <p>Each file appears whole: it is written aside and moved to its name. The verdict is written last, so that a run that failed leaves none.
 */
public final class RunFolder {
    private static final int MOST_RUNS = 9999;

    private final Path folder;

    private RunFolder(Path folder) {
        this.folder = folder;
    }

    /**
     * Makes the next run folder of a day.
     *
     * @throws Fault of kind storage where the folder can't be made
     */
    public static RunFolder next(Path runs, LocalDate day) {
        Path ofDay = runs.resolve(day.toString());
        try {
            Files.createDirectories(ofDay);
            for (int number = 1; number <= MOST_RUNS; number++) {
                Path candidate = ofDay.resolve(String.format(Locale.ROOT, "%04d", number));
                if (made(candidate)) {
                    return new RunFolder(candidate);
                }
            }
        } catch (IOException e) {
            throw WholeFile.cannotWrite(ofDay, e);
        }
        throw Fault.storage("no free number for a run")
                .at(ofDay.toString())
                .remedy("remove runs that are no longer needed");
    }

    private static boolean made(Path candidate) throws IOException {
        try {
            Files.createDirectory(candidate);
            return true;
        } catch (FileAlreadyExistsException e) {
            return false;
        }
    }

    /** Where it is. */
    public Path path() {
        return folder;
    }

    /** Where a part of it is. */
    public Path path(String name) {
        return folder.resolve(name);
    }

    /** Writes a JSON file, indented. */
    public void write(String name, JsonNode content) {
        write(name, Json.pretty(content));
    }

    /** Writes a text file, UTF-8. */
    public void write(String name, String content) {
        write(name, content.getBytes(StandardCharsets.UTF_8));
    }

    private void write(String name, byte[] content) {
        WholeFile.write(folder.resolve(name), content);
    }
}
