package turnstone.decide;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

class QuantilesTest {
    // Tables of Student's law as every handbook prints them (Abramowitz and Stegun, table 26.10), from memory.
    @ParameterizedTest
    @CsvSource({
        "0.95, 1, 6.314",
        "0.975, 1, 12.706",
        "0.95, 2, 2.920",
        "0.975, 4, 2.776",
        "0.95, 5, 2.015",
        "0.975, 10, 2.228",
        "0.99, 10, 2.764",
        "0.95, 30, 1.697",
        "0.975, 60, 2.000",
        "0.995, 120, 2.617"
    })
    void studentQuantilesAreThoseOfTheTables(double probability, double degreesOfFreedom, double expected) {
        assertThat(Quantiles.student(probability, degreesOfFreedom)).isCloseTo(expected, within(5.1e-4));
        assertThat(Quantiles.student(1 - probability, degreesOfFreedom)).isCloseTo(-expected, within(5.1e-4));
    }

    // Abramowitz and Stegun, table 26.8, from memory.
    @ParameterizedTest
    @CsvSource({
        "0.95, 1, 3.841",
        "0.99, 1, 6.635",
        "0.95, 3, 7.815",
        "0.05, 10, 3.940",
        "0.95, 10, 18.307",
        "0.99, 30, 50.892",
        "0.5, 2, 1.386",
        "0.95, 100, 124.342"
    })
    void chiSquareQuantilesAreThoseOfTheTables(double probability, double degreesOfFreedom, double expected) {
        assertThat(Quantiles.chiSquare(probability, degreesOfFreedom)).isCloseTo(expected, within(5.1e-4));
    }

    // Widely printed, from memory.
    @Test
    void normalQuantilesAreThoseOfTheTables() {
        assertThat(Quantiles.normal(0.975)).isCloseTo(1.959963984540054, within(1e-12));
        assertThat(Quantiles.normal(0.95)).isCloseTo(1.644853626951473, within(1e-12));
        assertThat(Quantiles.normal(0.1)).isCloseTo(-1.281551565544600, within(1e-12));
        assertThat(Quantiles.normal(0.5)).isZero();
    }

    @Test
    void closedFormsAgree() {
        // Two degrees of freedom: chi-square is exponential; one degree of freedom: Student's law is Cauchy's.
        assertThat(Quantiles.chiSquare(0.995, 2)).isCloseTo(-2 * StrictMath.log(0.005), within(1e-11));
        assertThat(Quantiles.student(0.9, 1)).isCloseTo(StrictMath.tan(0.4 * StrictMath.PI), within(1e-11));
        double p = 0.975;
        double two = (2 * p - 1) * StrictMath.sqrt(2 / (4 * p * (1 - p)));
        assertThat(Quantiles.student(p, 2)).isCloseTo(two, within(1e-11));
        assertThat(Quantiles.chiSquare(0.9, 7.5)).isBetween(Quantiles.chiSquare(0.9, 7), Quantiles.chiSquare(0.9, 8));
    }

    // Clopper and Pearson (1934), Biometrika 26, 404–413; the values as software and tables print them, from memory.
    @Test
    void sharesHaveTheirExactBounds() {
        assertThat(Quantiles.shareLower(5, 10, 0.975)).isCloseTo(0.1871, within(5e-5));
        assertThat(Quantiles.shareUpper(5, 10, 0.975)).isCloseTo(0.8129, within(5e-5));
        assertThat(Quantiles.shareUpper(1, 10, 0.975)).isCloseTo(0.4450, within(5e-5));
        assertThat(Quantiles.shareLower(1, 10, 0.975)).isCloseTo(0.0025, within(5e-5));
        assertThat(Quantiles.shareUpper(0, 10, 0.975)).isCloseTo(1 - StrictMath.pow(0.025, 0.1), within(1e-12));
        assertThat(Quantiles.shareLower(0, 10, 0.975)).isZero();
        assertThat(Quantiles.shareUpper(10, 10, 0.975)).isOne();
    }

    @Test
    void senselessQuestionsAreRefused() {
        assertThatThrownBy(() -> Quantiles.student(1, 3)).isInstanceOf(IllegalArgumentException.class);
        assertThatThrownBy(() -> Quantiles.chiSquare(Double.NaN, 3)).isInstanceOf(IllegalArgumentException.class);
        assertThatThrownBy(() -> Quantiles.chiSquare(0.5, 0)).isInstanceOf(IllegalArgumentException.class);
        assertThatThrownBy(() -> Quantiles.shareUpper(3, 2, 0.9)).isInstanceOf(IllegalArgumentException.class);
    }
}
