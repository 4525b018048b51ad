package turnstone.cli;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.Comparator;
import java.util.List;
import java.util.stream.Stream;
import turnstone.night.Places;
import turnstone.plant.Plant;

/** A plant's folder, as the tests of the command line look into it and damage it. */
record PlantOnDisk(Path folder) {
    /** An empty folder. */
    static PlantOnDisk temporary() {
        try {
            return new PlantOnDisk(Files.createTempDirectory("small-plant-"));
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    void removeAll() {
        try (Stream<Path> all = Files.walk(folder)) {
            for (Path path : all.sorted(Comparator.reverseOrder()).toList()) {
                Files.delete(path);
            }
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    /** The same, with all that was posted and made until now, in another folder. */
    PlantOnDisk copy(Path target) {
        try (Stream<Path> all = Files.walk(folder)) {
            for (Path from : all.toList()) {
                Path to = target.resolve(folder.relativize(from).toString());
                if (Files.isDirectory(from)) {
                    Files.createDirectories(to);
                } else {
                    Files.copy(from, to);
                }
            }
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
        return new PlantOnDisk(target);
    }

    String file() {
        return folder.resolve("plant.yaml").toString();
    }

    /** Runs a command on this plant. */
    Ran run(String command, String... arguments) {
        return Ran.command(Stream.concat(Stream.of(command, "--plant", file()), Stream.of(arguments))
                .toArray(String[]::new));
    }

    /** The same plant file with one text in the place of another. */
    PlantOnDisk with(String old, String other) {
        Path file = folder.resolve("plant.yaml");
        String text = text(file);
        if (!text.contains(old)) {
            throw new IllegalArgumentException("the plant file has no " + old);
        }
        write(file, text.replace(old, other));
        return this;
    }

    /** The posted days with the revision of each. */
    List<String> posted() {
        return Places.ledger(Plant.read(Path.of(file()))).days().stream()
                .map(entry -> entry.day() + " revision " + entry.revision())
                .toList();
    }

    /** The fingerprint of a day's sums. */
    String sums(LocalDate day) {
        return Places.ledger(Plant.read(Path.of(file()))).day(day).orElseThrow().momentsFingerprint();
    }

    /** Files below a part of the folder whose names end so, in order; none where the part is not there. */
    List<Path> files(String part, String end) {
        Path top = folder.resolve(part);
        if (!Files.exists(top)) {
            return List.of();
        }
        try (Stream<Path> all = Files.walk(top)) {
            return all.filter(Files::isRegularFile)
                    .filter(path -> path.getFileName().toString().endsWith(end))
                    .filter(path -> !path.getFileName().toString().startsWith("."))
                    .sorted()
                    .toList();
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    static String text(Path file) {
        try {
            return Files.readString(file);
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    static void write(Path file, String text) {
        try {
            Files.writeString(file, text);
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    /** Writes a file in a folder that may not be there yet. */
    static void writeIn(Path file, String text) {
        try {
            Files.createDirectories(file.toAbsolutePath().getParent());
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
        write(file, text);
    }

    static byte[] bytes(Path file) {
        try {
            return Files.readAllBytes(file);
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    static void write(Path file, byte[] content) {
        try {
            Files.write(file, content);
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    static void remove(Path file) {
        try {
            Files.delete(file);
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }
}
