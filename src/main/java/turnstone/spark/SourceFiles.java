package turnstone.spark;

import java.io.IOException;
import java.io.InputStream;
import java.security.DigestInputStream;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.HashMap;
import java.util.HexFormat;
import java.util.List;
import java.util.Map;
import org.apache.hadoop.conf.Configuration;
import org.apache.hadoop.fs.FileStatus;
import org.apache.hadoop.fs.FileSystem;
import org.apache.hadoop.fs.LocatedFileStatus;
import org.apache.hadoop.fs.Path;
import org.apache.hadoop.fs.RemoteIterator;
import turnstone.fault.Fault;

/** Finds the files of a table and refuses the same file given twice. */
final class SourceFiles {
    private SourceFiles() {}

    /** The files under the paths, sorted by address; rows not counted yet. */
    static List<SourceFile> find(List<String> paths, Configuration configuration) {
        Map<String, String> givenBy = new HashMap<>();
        List<SourceFile> files = new ArrayList<>();
        for (String path : paths) {
            List<FileStatus> found = below(path, configuration);
            if (found.isEmpty()) {
                throw Fault.input("no files").at(path).remedy("check the path or the pattern of the records");
            }
            for (FileStatus status : found) {
                String address = status.getPath().toString();
                String before = givenBy.putIfAbsent(address, path);
                if (before != null) {
                    throw Fault.input("the same file is given twice")
                            .at(address)
                            .found(before + " and " + path)
                            .remedy("give it once");
                }
                files.add(new SourceFile(address, status.getLen(), status.getModificationTime(), 0));
            }
        }
        files.sort(Comparator.comparing(SourceFile::path));
        return files;
    }

    private static List<FileStatus> below(String pattern, Configuration configuration) {
        try {
            Path path = new Path(pattern);
            FileSystem system = path.getFileSystem(configuration);
            FileStatus[] matches = system.globStatus(path);
            List<FileStatus> files = new ArrayList<>();
            if (matches == null) {
                return files;
            }
            for (FileStatus match : matches) {
                if (match.isFile()) {
                    files.add(match);
                } else {
                    addBelow(system, match.getPath(), files);
                }
            }
            return files;
        } catch (IOException | IllegalArgumentException e) {
            throw Fault.storage("the files can't be listed")
                    .at(pattern)
                    .found(e.getMessage())
                    .because(e);
        }
    }

    private static void addBelow(FileSystem system, Path folder, List<FileStatus> files) throws IOException {
        RemoteIterator<LocatedFileStatus> all = system.listFiles(folder, true);
        while (all.hasNext()) {
            LocatedFileStatus file = all.next();
            if (isData(folder, file.getPath())) {
                files.add(file);
            }
        }
    }

    private static boolean isData(Path folder, Path file) {
        for (Path part = file; part != null && !part.equals(folder); part = part.getParent()) {
            if (part.getName().startsWith(".") || part.getName().startsWith("_")) {
                return false;
            }
        }
        return true;
    }

    /** Refuses two files of equal size and SHA-256 under different names; files without records may be alike. */
    static void refuseCopies(List<SourceFile> files, Configuration configuration) {
        Map<Long, List<SourceFile>> bySize = new HashMap<>();
        for (SourceFile file : files) {
            if (file.rows() > 0) {
                bySize.computeIfAbsent(file.bytes(), size -> new ArrayList<>()).add(file);
            }
        }
        for (List<SourceFile> alike : bySize.values()) {
            if (alike.size() > 1) {
                refuseEqual(alike, configuration);
            }
        }
    }

    private static void refuseEqual(List<SourceFile> alike, Configuration configuration) {
        Map<String, String> byDigest = new HashMap<>();
        for (SourceFile file : alike) {
            String other = byDigest.putIfAbsent(sha256(file.path(), configuration), file.path());
            if (other != null) {
                throw Fault.input("the same file is given twice, by size and SHA-256")
                        .at(file.path())
                        .found("a copy of " + other)
                        .remedy("give it once");
            }
        }
    }

    /** SHA-256 of a file, 64 lower-case hexadecimal digits. */
    static String sha256(String address, Configuration configuration) {
        try {
            MessageDigest digest = MessageDigest.getInstance("SHA-256");
            Path path = new Path(address);
            try (InputStream in = path.getFileSystem(configuration).open(path);
                    DigestInputStream digesting = new DigestInputStream(in, digest)) {
                digesting.transferTo(java.io.OutputStream.nullOutputStream());
            }
            return HexFormat.of().formatHex(digest.digest());
        } catch (IOException e) {
            throw Fault.storage("the file can't be read")
                    .at(address)
                    .found(e.getMessage())
                    .because(e);
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException(e);
        }
    }
}
