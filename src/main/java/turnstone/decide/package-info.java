/**
 * The model that a refit makes, and what it says of a record: position, nearest material, margin, familiar or not.
 *
 * <p>Owns the model file, its fingerprint, the decision rule, the compiled projection and the page that a person reads. Must not know
 * ledgers, shelves, plants, trials or the engine that records travel through.
 */
package turnstone.decide;
