/**
 * What a record is before it is summed: instruments, references, pretreatment, count scale, and the reasons for turning a record away.
 *
 * <p>Owns the per-record head, the linear tail, the rule by which sums are taken in lanes, and the form in which a value becomes an integer
 * count. Must not know where records come from, how sums are held, or what is fitted to them.
 */
package turnstone.measure;
