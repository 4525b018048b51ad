package turnstone.measure;

import java.util.Locale;

/** The two references. */
public enum ReferenceKind {
    /** Shutter closed. */
    DARK,
    /** White tile. */
    WHITE;

    /** The word for files and messages. */
    public String label() {
        return name().toLowerCase(Locale.ROOT);
    }
}
