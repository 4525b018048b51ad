package turnstone.store;

/**
 * How an attempt to publish ended. A certain failure is thrown as a storage fault after cleaning up; an uncertain one is settled by
 * reading back, and thrown as a storage fault that says so where reading back fails as well.
 */
public enum Outcome {
    /** The content is there, complete, and this caller put it there. */
    PUBLISHED,
    /** Something was there before: it is untouched, and nothing of this caller's remains. */
    LOST
}
