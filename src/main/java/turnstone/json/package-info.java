/**
 * JSON as this program writes it: one reader, one pretty form, one canonical form.
 *
 * <p>Owns number formatting, key order and digests of JSON content. Knows nothing of what the content means.
 */
package turnstone.json;
