package turnstone.fisher;

import static org.assertj.core.api.Assertions.assertThat;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.Random;
import org.junit.jupiter.api.Test;

/** Operations and loops against decimals of 60 digits. */
class DoubleDoubleTest {
    private static final MathContext DIGITS = new MathContext(60);
    private static final double BOUND = 0x1p-102;

    private final Random random = new Random(5);

    private DoubleDouble any() {
        double high = random.nextGaussian() * Math.scalb(1.0, random.nextInt(80) - 40);
        return DoubleDouble.sum(high, high * 0x1p-54 * random.nextDouble());
    }

    private static BigDecimal exact(DoubleDouble x) {
        return new BigDecimal(x.high()).add(new BigDecimal(x.low()));
    }

    private static void near(DoubleDouble found, BigDecimal expected, BigDecimal size) {
        double error = exact(found).subtract(expected).abs().doubleValue();
        assertThat(error).isLessThanOrEqualTo(BOUND * size.abs().doubleValue());
    }

    @Test
    void operationsKeepAHundredAndTwoBits() {
        for (int i = 0; i < 4_000; i++) {
            DoubleDouble a = any();
            DoubleDouble b = any();
            BigDecimal sum = exact(a).add(exact(b));
            near(a.plus(b), sum, sum);
            near(a.times(b), exact(a).multiply(exact(b)), exact(a).multiply(exact(b)));
            BigDecimal quotient = exact(a).divide(exact(b), DIGITS);
            near(a.over(b), quotient, quotient);
            DoubleDouble square = a.times(a);
            BigDecimal root = exact(square).sqrt(DIGITS);
            near(square.root(), root, root);
        }
    }

    @Test
    void loopsKeepTheirBounds() {
        int n = 37;
        ExtendedMatrix m = new ExtendedMatrix(2, n);
        for (int j = 0; j < n; j++) {
            m.set(0, j, any());
            m.set(1, j, any());
        }
        ExtendedMatrix before = m.copy();
        DoubleDouble a = any();
        m.addRow(1, a, m, 0);
        BigDecimal dot = BigDecimal.ZERO;
        BigDecimal sizes = BigDecimal.ZERO;
        for (int j = 0; j < n; j++) {
            BigDecimal product = exact(a).multiply(exact(before.at(0, j)));
            BigDecimal sum = product.add(exact(before.at(1, j)));
            near(m.at(1, j), sum, product.abs().add(exact(before.at(1, j)).abs()));
            BigDecimal term = exact(before.at(0, j)).multiply(exact(before.at(1, j)));
            dot = dot.add(term);
            sizes = sizes.add(term.abs());
        }
        near(before.dotRows(0, before, 1), dot, sizes.multiply(BigDecimal.valueOf(n)));
        ExtendedMatrix divided = before.copy();
        Kernels.divide(7, divided.high[0], divided.low[0], 0, n);
        ExtendedMatrix multiplied = before.copy();
        Kernels.multiply(before.high[1], before.low[1], multiplied.high[0], multiplied.low[0], 0, n);
        for (int j = 0; j < n; j++) {
            BigDecimal quotient = exact(before.at(0, j)).divide(BigDecimal.valueOf(7), DIGITS);
            near(divided.at(0, j), quotient, quotient);
            BigDecimal product = exact(before.at(0, j)).multiply(exact(before.at(1, j)));
            near(multiplied.at(0, j), product, product);
        }
    }
}
