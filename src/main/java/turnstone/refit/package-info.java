/**
 * From the ledger to coefficients: the recipe, the window of days, what is left out by subtraction.
 *
 * <p>Owns which sums enter a fit. Does not know where records come from, nor how a model is judged.
 */
package turnstone.refit;
