package turnstone.measure;

/** What the head made of a record. */
public enum HeadOutcome {
    /** The output is a measurement. */
    ACCEPTED,
    /** A good measurement of something too dark to tell. */
    NO_SIGNAL,
    /** Not a measurement; {@link HeadTrouble} says why. */
    QUARANTINED
}
