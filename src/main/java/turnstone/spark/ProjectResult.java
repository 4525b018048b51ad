package turnstone.spark;

/**
 * What a projection did.
 *
 * @param counts records by outcome
 * @param tally by truth and decision; where the table has no label the truth is the empty text
 * @param out the folder that was made: {@code positions/}, {@code quarantine.csv}, with a label {@code tally.csv}
 */
public record ProjectResult(RecordCounts counts, ProjectTally tally, String out) {}
