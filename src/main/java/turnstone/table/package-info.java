/**
 * Fits and projects a plain table of labelled numeric records, without a plant.
 *
 * <p>Owns the defaults of a one-shot fit: which columns are channels, the count scale, the weights of the materials. Knows no plant, ledger or
 * shelf, and not the command line.
 */
package turnstone.table;
