/**
 * Audits: what bales and hand sorts were found to hold, set against what a trial predicted.
 *
 * <p>Owns the journal of results, the measured ejection efficiency and co-ejection, and the figures that follow from them. Must not know how a
 * prediction comes about, what a model is, or how a plant file is written.
 */
package turnstone.audit;
