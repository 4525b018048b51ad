package turnstone.spark;

import java.io.IOException;
import java.io.OutputStream;
import java.nio.charset.StandardCharsets;
import java.util.List;
import java.util.UUID;
import org.apache.hadoop.conf.Configuration;
import org.apache.hadoop.fs.FileSystem;
import org.apache.hadoop.fs.Path;
import turnstone.fault.Fault;

/**
 * A folder of results: written aside under a name of this run alone, counted again, then given its name in one rename.
 *
 * <p>A folder that has something in it is never touched.
 */
final class Output {
    private static final long WHOLE_FILES = Long.MAX_VALUE;

    private final Session session;
    private final Configuration configuration;
    private final FileSystem system;
    private final Path target;
    private final Path aside;

    private Output(Session session, FileSystem system, Path target, Path aside) {
        this.session = session;
        this.configuration = session.spark().sparkContext().hadoopConfiguration();
        this.system = system;
        this.target = target;
        this.aside = aside;
    }

    static Output prepare(Session session, String folder) {
        try {
            Path given = new Path(folder);
            FileSystem system =
                    given.getFileSystem(session.spark().sparkContext().hadoopConfiguration());
            Path target = system.makeQualified(given);
            requireFree(system, target);
            Path aside = new Path(target.getParent(), "." + target.getName() + "." + UUID.randomUUID());
            return new Output(session, system, target, aside);
        } catch (IOException | IllegalArgumentException e) {
            throw unwritable(folder, e);
        }
    }

    private static void requireFree(FileSystem system, Path target) throws IOException {
        if (system.exists(target)
                && (!system.getFileStatus(target).isDirectory() || system.listStatus(target).length > 0)) {
            throw Fault.input("the output folder is not empty")
                    .at(target.toString())
                    .remedy("name another folder, or move this one away");
        }
    }

    private static Fault unwritable(String folder, Exception e) {
        return Fault.storage("the output can't be written")
                .at(folder)
                .found(e.getMessage())
                .because(e);
    }

    /** Where the table of positions goes. */
    String positions() {
        return new Path(aside, "positions").toString();
    }

    /** Reads back what the workers wrote; on a cluster a local folder is on their disks and not on ours. */
    void requireRecords(TableSpec.Form form, long expected) {
        List<SourceFile> files = SourceFiles.find(List.of(positions()), configuration);
        long found = 0;
        for (SourceFile file : files) {
            found += form == TableSpec.Form.CSV
                    ? CsvScan.of(file.path(), WHOLE_FILES, configuration).records()
                    : ParquetScan.of(
                                    file.path(),
                                    configuration,
                                    session.spark().sessionState().conf())
                            .records();
        }
        if (found != expected) {
            throw Fault.storage("what was written is not all there")
                    .at(target.toString())
                    .found(found + " records")
                    .expected(expected)
                    .remedy("write to a file system that the driver and the workers share");
        }
    }

    /** Writes a small file beside the table. */
    void text(String name, String content) {
        Path file = new Path(aside, name);
        try (OutputStream out = system.create(file, false)) {
            out.write(content.getBytes(StandardCharsets.UTF_8));
        } catch (IOException e) {
            throw unwritable(file.toString(), e);
        }
    }

    /** Removes what was written aside; says nothing where that fails, for something else has failed before. */
    void discard() {
        try {
            system.delete(aside, true);
        } catch (IOException alreadyFailing) {
            // The failure that led here is the one to report; the folder's name shows that it is debris.
            return;
        }
    }

    /** Gives the folder its name. */
    void publish() {
        try {
            requireFree(system, target);
            if (system.exists(target)) {
                system.delete(target, false);
            }
            if (!system.rename(aside, target)) {
                throw Fault.storage("the output can't be given its name")
                        .at(target.toString())
                        .found("the file system refused to rename " + aside.getName());
            }
        } catch (IOException e) {
            throw unwritable(target.toString(), e);
        }
    }
}
