package turnstone.fisher;

import turnstone.moments.Moments;

/**
 * The exact sums of all cells of one material that share a weight.
 *
 * @param moments at least one record
 * @param weight rescaled so that the weighted number of records of the request equals its number of records
 */
record Part(Moments moments, double weight) {
    double weightedRecords() {
        return weight * moments.records();
    }
}
