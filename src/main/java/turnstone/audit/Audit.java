package turnstone.audit;

import java.time.Instant;

/**
 * An entry of the journal of audits.
 *
 * @param number from 1
 * @param at when it was entered
 * @param by who entered it
 * @param found what was found
 */
public record Audit(long number, Instant at, String by, Found found) {}
