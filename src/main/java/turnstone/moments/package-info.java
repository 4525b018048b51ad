/**
 * Exact integer moments of count records: how many, sums, and sums of products.
 *
 * <p>Owns the block kernels, the widening sums, every bound that keeps them exact, and the byte layout of moments. Must not know where counts come
 * from, what a channel measures, or what is computed from the sums.
 */
package turnstone.moments;
