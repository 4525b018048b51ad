/**
 * Publishing once on a file system: files that appear complete and are never replaced, and numbered journals made of them.
 *
 * <p>Owns names, outcomes of publishing, digests while writing and reading, and the chain of journal entries. Knows nothing of what the
 * files mean.
 */
package turnstone.store;
