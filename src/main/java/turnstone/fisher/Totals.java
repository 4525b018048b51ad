package turnstone.fisher;

import java.math.BigInteger;
import java.util.Arrays;
import turnstone.moments.Moments;

/** Number of records and sums over everything, unweighted; the products are not needed. */
final class Totals {
    private final BigInteger[] sums;
    private long records;

    Totals(int channels) {
        sums = new BigInteger[channels];
        Arrays.fill(sums, BigInteger.ZERO);
    }

    void add(Moments moments) {
        records += moments.records();
        for (int i = 0; i < sums.length; i++) {
            sums[i] = sums[i].add(moments.sum(i));
        }
    }

    long records() {
        return records;
    }

    BigInteger sum(int i) {
        return sums[i];
    }

    /** Whether every sum fits 64 bits. */
    boolean fitWord() {
        for (BigInteger sum : sums) {
            if (sum.bitLength() > 63) {
                return false;
            }
        }
        return true;
    }
}
