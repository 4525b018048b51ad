/**
 * Owns the plant file: its schema, the checks at that boundary, the defaults, and what comes of it as small validated values.
 *
 * <p>Whoever holds a {@link turnstone.plant.Plant} may rely on it: nothing is checked a second time further in. It must not know how records are read,
 * folded, fitted or tried.
 */
package turnstone.plant;
