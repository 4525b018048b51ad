/**
 * From exact sums to discriminant axes.
 *
 * <p>Owns the within and between scatter, the extended-precision solution, the ridge, the singularity and rounding-noise checks,
 * orientation and diagnostics. It must not know records, files, sorters, trays or how a model is written.
 */
package turnstone.fisher;
