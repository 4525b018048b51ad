package turnstone.spark;

import java.io.Serializable;

/**
 * A run of whole lines of one file.
 *
 * @param file its address
 * @param start the first byte; 0 for a compressed file, of which there is one split
 * @param end the byte after the last
 * @param firstRow the number of the first line, the header being 1
 * @param lines the lines in it
 */
record CsvSplit(String file, long start, long end, long firstRow, long lines) implements Serializable {}
