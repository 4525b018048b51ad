package turnstone.measure;

import java.util.Locale;

/** Why a record is not a measurement. */
public enum QuarantineReason {
    /** A channel is not a number, infinite or missing. */
    NON_FINITE,
    /** A channel's count would pass the limit of the count scale. */
    OFF_SCALE,
    /** Another number of channels than the instrument or the table has. */
    WRONG_CHANNEL_COUNT,
    /** The sorter is not in the plant file. */
    UNKNOWN_SORTER,
    /** The material is not in the plant file. */
    UNKNOWN_MATERIAL,
    /** A key column is empty. */
    MISSING_KEY,
    /** A raw count at or above the saturation count. */
    SATURATED,
    /** No white (or dark) of that belt column at or before the record, or only one older than allowed. */
    STALE_WHITE,
    /** White at or below dark. */
    BAD_WHITE,
    /** A raw count at or below the dead-pixel count. */
    DEAD_PIXEL,
    /** Text where a number should be. */
    NOT_A_NUMBER,
    /** The record's day is not the day that is posted. */
    WRONG_DAY;

    /** The words for tables and messages: {@code unknown sorter}. */
    public String label() {
        return name().toLowerCase(Locale.ROOT).replace('_', ' ');
    }

    /**
     * The reason with a label.
     *
     * @throws IllegalArgumentException where there is none
     */
    public static QuarantineReason labelled(String label) {
        for (QuarantineReason reason : values()) {
            if (reason.label().equals(label)) {
                return reason;
            }
        }
        throw new IllegalArgumentException("no quarantine reason is called " + label);
    }
}
