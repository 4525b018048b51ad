/**
 * The jobs on Apache Spark: reading records, folding a day, proposing a scale, projecting, trying, making the invented plant's nights.
 *
 * <p>Owns how records are read and counted, how work is cut into partitions and how partial results are merged, so that the numbers do
 * not depend on it. Must not know the command line, the nightly sequence, nor how anything is published.
 */
package turnstone.spark;
