package turnstone.measure;

import java.util.Locale;

/** What the channels of a record are when they arrive. */
public enum InputKind {
    /** Raw detector counts. */
    COUNTS,
    /** Reflectance, 1 at the white. */
    REFLECTANCE,
    /** log10(1/R). */
    ABSORBANCE,
    /** Plain numbers without optical meaning. */
    VALUES;

    /** The word for files and messages. */
    public String label() {
        return name().toLowerCase(Locale.ROOT);
    }
}
