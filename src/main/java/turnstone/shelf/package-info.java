/**
 * The shelf: models by fingerprint, and the numbered journal that alone says which is in service.
 *
 * <p>Owns the files of models, the entries of release and revert, and the questions that they answer. Must not know how a model is fitted,
 * how a verdict comes about, or what a board does with a model.
 */
package turnstone.shelf;
