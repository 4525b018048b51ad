package turnstone.store;

import java.io.IOException;
import java.nio.file.AccessDeniedException;
import java.nio.file.FileAlreadyExistsException;
import java.nio.file.FileSystemException;
import java.nio.file.NoSuchFileException;
import java.nio.file.NotDirectoryException;
import java.nio.file.Path;
import java.util.Locale;
import turnstone.fault.Fault;

/** Failures of a local file system in one clear line each. */
final class DiskFaults {
    private DiskFaults() {}

    static Fault reading(Path file, IOException cause) {
        return explained("can't be read", file, cause);
    }

    static Fault writing(Path file, IOException cause) {
        return explained("can't be written; nothing was published", file, cause);
    }

    static Fault uncertain(Path file, IOException cause) {
        return Fault.storage("it is not certain that this file was published and is safe on the disk")
                .at(file.toString())
                .found(reason(cause))
                .remedy("look after the disk, then run again: what was published is found there")
                .because(cause);
    }

    static Fault noHardLinks(Path file, Exception cause) {
        return Fault.storage("this file system has no hard links, so nothing can be published safely")
                .at(file.toString())
                .remedy("use a folder on another file system")
                .because(cause);
    }

    static Fault dangling(Path file, IOException cause) {
        return Fault.storage("a symbolic link whose target is missing")
                .at(file.toString())
                .remedy("restore its target")
                .because(cause);
    }

    private static Fault explained(String what, Path file, IOException cause) {
        return Fault.storage(what)
                .at(file.toString())
                .found(reason(cause))
                .remedy(remedy(cause))
                .because(cause);
    }

    private static String reason(IOException cause) {
        if (cause instanceof AccessDeniedException) {
            return "no permission";
        }
        if (cause instanceof NoSuchFileException) {
            return "no such file";
        }
        if (cause instanceof NotDirectoryException || says(cause, "not a directory")) {
            return "a regular file where a folder should be";
        }
        if (cause instanceof FileAlreadyExistsException) {
            return "a regular file where a folder should be";
        }
        if (says(cause, "no space left") || says(cause, "quota")) {
            return "the disk is full";
        }
        if (says(cause, "read-only file system")) {
            return "a read-only file system";
        }
        if (says(cause, "is a directory")) {
            return "a folder where a file should be";
        }
        return text(cause);
    }

    private static String remedy(IOException cause) {
        if (cause instanceof AccessDeniedException) {
            return "give this user access to the folder";
        }
        if (says(cause, "no space left") || says(cause, "quota")) {
            return "free some space and run again";
        }
        if (says(cause, "read-only file system")) {
            return "use a folder that can be written";
        }
        return "check the path";
    }

    private static boolean says(IOException cause, String words) {
        return text(cause).toLowerCase(Locale.ROOT).contains(words);
    }

    private static String text(IOException cause) {
        String reason = cause instanceof FileSystemException failure ? failure.getReason() : null;
        return reason != null ? reason : String.valueOf(cause.getMessage());
    }
}
