package turnstone.night;

import turnstone.spark.QuarantinedRecord;
import turnstone.spark.RecordCounts;

/** Quarantined records as a CSV table. */
public final class QuarantineTable {
    private QuarantineTable() {}

    /** Header and a line for each record that was kept. */
    public static String csv(RecordCounts counts) {
        StringBuilder text = new StringBuilder(QuarantinedRecord.CSV_HEADER).append('\n');
        counts.quarantine().forEach(record -> text.append(record.csv()).append('\n'));
        return text.toString();
    }
}
