package turnstone.ledger;

/** Whether a day that is posted with other records is to become a new revision. */
public enum Replace {
    /** Refuse it. */
    NO,
    /** Publish the next revision. */
    YES
}
