/**
 * Owns the invented demo plant: its sorters, trays and pieces, the light that falls on them, and the traps that are laid; nothing in it is measured data.
 *
 * <p>Every record is a function of the seed and its place alone, so that records can be made in any order and in parallel. It must not know how records are
 * written, read or judged; {@code docs/sample-plant.md} has the table of traps.
 */
package turnstone.sample;
