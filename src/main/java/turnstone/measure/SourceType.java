package turnstone.measure;

/** The type in which a value was recorded; "without loss" means that the value comes back in this type. */
public enum SourceType {
    /** A decimal in a text file. It is used as the nearest double. */
    DECIMAL,
    /** A 64-bit floating-point number. */
    DOUBLE,
    /** A 32-bit floating-point number. */
    FLOAT,
    /** A 32-bit or 64-bit integer below 2^53 in size. */
    INT,
    /** A 16-bit integer. */
    SHORT
}
