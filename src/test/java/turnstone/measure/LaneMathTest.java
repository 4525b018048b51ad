package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.Random;
import org.junit.jupiter.api.Test;

class LaneMathTest {
    private static final MathContext FORTY = new MathContext(40);
    // From memory, and held against StrictMath below.
    private static final BigDecimal LN_2 = new BigDecimal("0.693147180559945309417232121458176568075500134360255");
    private static final BigDecimal LN_10 = new BigDecimal("2.302585092994045684017991454684364207601101488628773");

    @Test
    void sumFollowsTheLaneRule() {
        long seed = 20260301L;
        System.out.println("seed " + seed);
        Random random = new Random(seed);
        for (int n = 0; n < 70; n++) {
            double[] a = random.doubles(n + 3, -1e3, 1e3).toArray();
            double[] b = random.doubles(n + 5, -1, 1).toArray();
            double[] products = new double[n];
            for (int i = 0; i < n; i++) {
                products[i] = a[3 + i] * b[5 + i];
            }
            assertThat(LaneMath.laneSum(a, 3, n)).isEqualTo(byLanes(a, 3, n));
            assertThat(LaneMath.laneDot(a, 3, b, 5, n)).isEqualTo(byLanes(products, 0, n));
        }
    }

    private static double byLanes(double[] a, int from, int n) {
        double[] lane = new double[8];
        for (int k = 0; k < n; k++) {
            lane[k % 8] += a[from + k];
        }
        for (int width = 4; width > 0; width /= 2) {
            for (int l = 0; l < width; l++) {
                lane[l] += lane[l + width];
            }
        }
        return lane[0];
    }

    @Test
    void orderOfLanesMatters() {
        // 1 + 2^-53 rounds to 1; the lanes keep the two small numbers together.
        double[] a = {1, 0, 0, 0, 0, 0, 0, 0, 0, 0x1p-53, 0, 0, 0, 0x1p-53};
        assertThat(LaneMath.laneSum(a, 0, a.length)).isEqualTo(1 + 0x1p-52);
    }

    @Test
    void logarithmsOfPowersOfTwoAndOne() {
        assertThat(LaneMath.log(1)).isEqualTo(0.0);
        assertThat(Double.doubleToRawLongBits(LaneMath.absorbance(1))).isZero();
        assertThat(LaneMath.log(2)).isEqualTo(0.6931471805599453);
        assertThat(LaneMath.absorbance(0.1)).isEqualTo(1.0);
        assertThat(LaneMath.absorbance(0.5)).isEqualTo(0.3010299956639812);
        assertThat(LaneMath.log(Double.MIN_NORMAL)).isEqualTo(StrictMath.log(Double.MIN_NORMAL));
        assertThat(LaneMath.log(Double.MAX_VALUE)).isEqualTo(StrictMath.log(Double.MAX_VALUE));
    }

    @Test
    void logarithmStaysWithinItsStatedErrorOfFortyDigits() {
        assertThat(LN_2.doubleValue()).isEqualTo(StrictMath.log(2));
        assertThat(LN_10.doubleValue()).isEqualTo(StrictMath.log(10));
        long seed = 7L;
        System.out.println("seed " + seed);
        Random random = new Random(seed);
        double worst = 0;
        for (int i = 0; i < 6_000; i++) {
            double x = switch (i % 4) {
                case 0 -> 1e-3 + random.nextDouble();
                case 1 -> 1 + (random.nextDouble() - 0.5) * 1e-3;
                case 2 -> StrictMath.sqrt(0.5) * (1 + (random.nextDouble() - 0.5) * 1e-10);
                default -> Double.longBitsToDouble((long) (random.nextInt(2046) + 1) << 52 | random.nextLong() >>> 12);
            };
            BigDecimal exact = naturalLog(x);
            BigDecimal absorbance = exact.negate().divide(LN_10, FORTY);
            worst = Math.max(worst, ulps(LaneMath.log(x), exact));
            worst = Math.max(worst, ulps(LaneMath.absorbance(x), absorbance));
        }
        System.out.println("largest error of the logarithm: " + worst + " ulp");
        assertThat(worst).isLessThan(LaneMath.LOG_ERROR_ULPS).isGreaterThan(0.4);
    }

    private static double ulps(double found, BigDecimal exact) {
        double error = new BigDecimal(found).subtract(exact).abs().doubleValue();
        return error / Math.ulp(exact.doubleValue());
    }

    /** ln x = k ln 2 + 2 artanh((m − 1)/(m + 1)), m in [½, 2), to forty digits. */
    private static BigDecimal naturalLog(double x) {
        int k = Math.getExponent(x);
        BigDecimal m = new BigDecimal(Math.scalb(x, -k));
        if (m.compareTo(new BigDecimal("1.4")) > 0) {
            m = m.divide(BigDecimal.valueOf(2));
            k++;
        }
        BigDecimal s = m.subtract(BigDecimal.ONE).divide(m.add(BigDecimal.ONE), new MathContext(60));
        BigDecimal z = s.multiply(s, new MathContext(60));
        BigDecimal term = s;
        BigDecimal sum = s;
        for (int n = 3; term.abs().compareTo(s.abs().scaleByPowerOfTen(-42)) > 0; n += 2) {
            term = term.multiply(z, new MathContext(50));
            sum = sum.add(term.divide(BigDecimal.valueOf(n), new MathContext(50)));
        }
        return sum.multiply(BigDecimal.valueOf(2)).add(LN_2.multiply(BigDecimal.valueOf(k)));
    }

    @Test
    void arrayAndScalarFormsAreEqual() {
        double[] values = new Random(3).doubles(1000, 1e-3, 2).toArray();
        double[] copy = values.clone();
        new Absorbances(998).apply(copy, 1, 998);
        assertThat(copy[0]).isEqualTo(values[0]);
        assertThat(copy[999]).isEqualTo(values[999]);
        for (int i = 1; i < 999; i++) {
            assertThat(copy[i]).isEqualTo(LaneMath.absorbance(values[i]));
        }
    }
}
