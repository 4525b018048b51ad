/**
 * The ledger: exact moments by day, instrument, material and tray group, and what is known of each showing.
 *
 * <p>Owns the layout of the day's parts, the entries that commit days and their revisions, window totals and the check that everything is
 * still what was written. Must not know how records become counts, how a model is fitted, or what engine folded the day.
 */
package turnstone.ledger;
