package turnstone.spark;

import turnstone.measure.QuarantineReason;
import turnstone.measure.SourceType;

/**
 * Walks the records of one partition. Everything it returns is good until the next call of {@link #next()}; for one thread.
 */
interface RecordCursor {
    /** Steps to the next record; false after the last. */
    boolean next();

    /** A text column of the record; null where missing. Equal texts are the same object as long as the cursor remembers them. */
    String text(int column);

    /** A text column read as a whole number; {@link #NO_NUMBER} where missing or not one. */
    long whole(int column);

    /** The channels as read, {@link #channelCount()} of them from 0; undefined where {@link #defect()} is not null. */
    double[] channels();

    /** How many channels the record has. */
    int channelCount();

    /** The decimal as written, where the source is text; else null. */
    String channelText(int channel);

    /** The type in which a channel was recorded. */
    SourceType type(int channel);

    /** What is wrong with the record as read; null where nothing is. */
    QuarantineReason defect();

    /** The channel of the defect, or -1. */
    int defectChannel();

    /** What was found there. */
    String defectText();

    /** The file of the record. */
    String file();

    /** The number of the record in its file, from 1; in CSV the number of its line after the header. */
    long row();

    /** No whole number. */
    long NO_NUMBER = Long.MIN_VALUE;
}
