package turnstone.ledger;

/** How posting a day ended. */
public enum PostOutcome {
    /** A new entry is in the journal. */
    POSTED,
    /** The day's newest revision holds the same records already: nothing was written. */
    SAME_RECORDS
}
