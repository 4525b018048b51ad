package turnstone.spark;

import java.io.EOFException;
import java.io.IOException;
import java.io.InputStream;
import java.util.ArrayList;
import java.util.HashSet;
import java.util.List;
import java.util.Set;
import java.util.zip.GZIPInputStream;
import org.apache.hadoop.conf.Configuration;
import org.apache.hadoop.fs.FSDataInputStream;
import org.apache.hadoop.fs.Path;
import turnstone.fault.Fault;

/**
 * One pass over a CSV file on the driver: its header, its records counted by their line ends, and where it can be cut.
 *
 * <p>Empty lines are not records. The count is made from bytes alone, so it is independent of the parser that the job uses.
 */
record CsvScan(String file, List<String> header, long records, List<CsvSplit> splits) {
    private static final int CHUNK = 1 << 20;

    static CsvScan of(String file, long splitBytes, Configuration configuration) {
        List<String> header = header(file, configuration);
        Counter counter = new Counter(file, file.endsWith(".gz") ? Long.MAX_VALUE : splitBytes);
        try (InputStream in = open(file, 0, configuration)) {
            byte[] chunk = new byte[CHUNK];
            for (int n = in.read(chunk); n >= 0; n = in.read(chunk)) {
                counter.take(chunk, n);
            }
        } catch (IOException e) {
            throw unreadable(file, e);
        }
        counter.finish();
        return new CsvScan(file, header, counter.records - 1, counter.splits);
    }

    private static List<String> header(String file, Configuration configuration) {
        try (LineReader lines = new LineReader(open(file, 0, configuration), 0)) {
            String first = lines.next();
            if (first == null || first.isEmpty()) {
                throw Fault.input("the file has no header line").at(file);
            }
            String plain = first.charAt(0) == '\uFEFF' ? first.substring(1) : first;
            List<String> names = CsvLine.fields(plain, file, 1);
            Set<String> seen = new HashSet<>();
            for (String name : names) {
                if (!seen.add(name)) {
                    throw Fault.input("the header names a column twice")
                            .at(file)
                            .found("\"" + name + "\"");
                }
            }
            return List.copyOf(names);
        } catch (IOException e) {
            throw unreadable(file, e);
        }
    }

    /** Opens a file at a byte of its text; a compressed one only at 0. */
    static InputStream open(String file, long start, Configuration configuration) throws IOException {
        Path path = new Path(file);
        FSDataInputStream in = path.getFileSystem(configuration).open(path);
        if (file.endsWith(".gz")) {
            return new GZIPInputStream(in, 1 << 16);
        }
        in.seek(start);
        return in;
    }

    static Fault unreadable(String file, IOException e) {
        String reason = e instanceof EOFException ? "it ends too early" : e.getMessage();
        return Fault.storage("the file can't be read").at(file).found(reason).because(e);
    }

    /** Counts lines that are not empty and notes cuts after line ends. */
    private static final class Counter {
        private final String file;
        private final long splitBytes;
        private final List<CsvSplit> splits = new ArrayList<>();
        private long position;
        private long lines;
        private long records;
        private long splitStart;
        private long splitRow = 1;
        private int inLine;

        Counter(String file, long splitBytes) {
            this.file = file;
            this.splitBytes = splitBytes;
        }

        void take(byte[] chunk, int n) {
            for (int i = 0; i < n; i++) {
                position++;
                if (chunk[i] == '\n') {
                    endLine();
                } else if (chunk[i] != '\r') {
                    inLine = 1;
                }
            }
        }

        private void endLine() {
            lines++;
            records += inLine;
            inLine = 0;
            if (position - splitStart >= splitBytes) {
                cut();
            }
        }

        private void cut() {
            splits.add(new CsvSplit(file, splitStart, position, splitRow, lines + 1 - splitRow));
            splitStart = position;
            splitRow = lines + 1;
        }

        void finish() {
            if (inLine == 1) {
                endLine();
            }
            if (position > splitStart) {
                cut();
            }
        }
    }
}
