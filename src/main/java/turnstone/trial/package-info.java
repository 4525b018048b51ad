/**
 * A candidate against what is in service, judged on trays that neither has seen.
 *
 * <p>Owns tallies, decision purity and recovery with their intervals, requirements and the verdict in its two forms, file and text. Must
 * not know files, shelves, spectra or the engine: it is given tallies, and models to look up.
 */
package turnstone.trial;
