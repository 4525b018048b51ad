package turnstone.measure;

import java.math.BigInteger;

/**
 * Exact Savitzky–Golay weights, from the definition: the derivative at 0 of the polynomial that fits window values at −m … m by least squares.
 *
 * <p>With the moments S_p = Σ k^p the normal equations are Σ_b S_(a+b) c_b = Σ_k k^a y_k, and the wanted value is s!·c_s. So weight k is s!·Σ_a u_a k^a where
 * u solves S u = e_s: one exact elimination. Source: A. Savitzky, M. J. E. Golay, Analytical Chemistry 36 (1964) 1627–1639; J. Steinier, Y. Termonia, J. Deltour,
 * Analytical Chemistry 44 (1972) 1906–1909 (whose corrections show why the printed tables are not typed in).
 */
final class SavitzkyGolayWeights {
    private SavitzkyGolayWeights() {}

    /** The weights of channels −m … m in ascending order. */
    static Fraction[] of(TailSpec.SavitzkyGolay spec) {
        int m = spec.window() / 2;
        int terms = spec.order() + 1;
        Fraction[] u = solve(normalMatrix(m, terms), spec.derivative());
        Fraction factorial = Fraction.ONE;
        for (int i = 2; i <= spec.derivative(); i++) {
            factorial = factorial.times(Fraction.of(i));
        }
        Fraction[] weights = new Fraction[spec.window()];
        for (int k = -m; k <= m; k++) {
            Fraction sum = Fraction.ZERO;
            for (int a = terms - 1; a >= 0; a--) {
                sum = sum.times(Fraction.of(k)).plus(u[a]);
            }
            weights[k + m] = sum.times(factorial);
        }
        return weights;
    }

    private static Fraction[][] normalMatrix(int m, int terms) {
        Fraction[][] matrix = new Fraction[terms][terms];
        for (int a = 0; a < terms; a++) {
            for (int b = 0; b < terms; b++) {
                BigInteger sum = BigInteger.ZERO;
                for (int k = -m; k <= m; k++) {
                    sum = sum.add(BigInteger.valueOf(k).pow(a + b));
                }
                matrix[a][b] = new Fraction(sum, BigInteger.ONE);
            }
        }
        return matrix;
    }

    /** Solves matrix·u = e by elimination; the matrix is positive definite, so no pivot is 0. */
    private static Fraction[] solve(Fraction[][] matrix, int unit) {
        int n = matrix.length;
        Fraction[] right = new Fraction[n];
        for (int a = 0; a < n; a++) {
            right[a] = a == unit ? Fraction.ONE : Fraction.ZERO;
        }
        for (int p = 0; p < n; p++) {
            for (int a = p + 1; a < n; a++) {
                Fraction factor = matrix[a][p].over(matrix[p][p]);
                for (int b = p; b < n; b++) {
                    matrix[a][b] = matrix[a][b].minus(factor.times(matrix[p][b]));
                }
                right[a] = right[a].minus(factor.times(right[p]));
            }
        }
        for (int a = n - 1; a >= 0; a--) {
            for (int b = a + 1; b < n; b++) {
                right[a] = right[a].minus(matrix[a][b].times(right[b]));
            }
            right[a] = right[a].over(matrix[a][a]);
        }
        return right;
    }
}
