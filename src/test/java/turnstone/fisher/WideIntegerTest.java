package turnstone.fisher;

import static org.assertj.core.api.Assertions.assertThat;

import java.math.BigDecimal;
import java.math.BigInteger;
import java.util.Random;
import org.junit.jupiter.api.Test;

/** The 192-bit integer and its rounding against BigInteger and BigDecimal. */
class WideIntegerTest {
    private static final long[] EDGES = {
        0, 1, -1, 2, 3, Long.MAX_VALUE, Long.MIN_VALUE + 1, 1L << 53, (1L << 53) + 1, -(1L << 62)
    };

    private static void check(long n, long high, long low, long a, long b) {
        BigInteger product = BigInteger.valueOf(high).shiftLeft(64).add(new BigInteger(Long.toUnsignedString(low)));
        BigInteger exact = BigInteger.valueOf(n)
                .multiply(product)
                .subtract(BigInteger.valueOf(a).multiply(BigInteger.valueOf(b)));
        WideInteger wide = new WideInteger();
        wide.setProduct(n, high, low);
        wide.subtractProduct(a, b);
        assertThat(wide.value()).isEqualTo(exact);
        assertThat(wide.signum()).isEqualTo(exact.signum());
        double[] rounded = new double[2];
        double[] rest = new double[2];
        wide.round(rounded, rest, 1);
        double first = new BigDecimal(exact).doubleValue();
        assertThat(rounded[1]).isEqualTo(first);
        assertThat(rest[1])
                .isEqualTo(new BigDecimal(exact).subtract(new BigDecimal(first)).doubleValue());
    }

    @Test
    void valuesAndRoundingAreExactAtTheEdges() {
        for (long n : EDGES) {
            for (long high : EDGES) {
                for (long low : EDGES) {
                    for (long a : EDGES) {
                        check(Math.abs(n), high, low, a, a);
                        check(Math.abs(n), high, low, a, -7 * a / 8);
                    }
                }
            }
        }
    }

    @Test
    void valuesAndRoundingAreExactAtRandom() {
        Random random = new Random(11);
        for (int i = 0; i < 10_000; i++) {
            check(
                    random.nextLong() >>> (1 + random.nextInt(62)),
                    random.nextLong() >> random.nextInt(63),
                    random.nextLong(),
                    random.nextLong() >> random.nextInt(63),
                    random.nextLong() >> random.nextInt(63));
        }
    }

    @Test
    void halfwayCasesGoToEven() {
        // 2^54 + 2 lies halfway between doubles; a bit far below it must decide.
        check(1, 0, (1L << 54) + 2, 0, 0);
        check(1, 0, (1L << 54) + 6, 0, 0);
        check(1L << 60, 1L << 40, 1, 0, 0);
        check((1L << 54) + 2, 1L << 50, 0, 1, -1);
        check((1L << 54) + 2, 1L << 50, 0, 1, 1);
    }
}
