/**
 * The nightly sequence: post, refit, trial, verdict, project, summary; and the files of a run.
 *
 * <p>Owns the order of the steps and the run folder. Does not know the command line.
 */
package turnstone.night;
