package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;

import com.fasterxml.jackson.databind.JsonNode;
import java.io.IOException;
import java.io.InputStream;
import java.math.BigInteger;
import org.junit.jupiter.api.Test;
import turnstone.json.Json;

class SavitzkyGolayTest {
    /** Source: Savitzky and Golay 1964 with the corrections of Steinier, Termonia and Deltour 1972, values recomputed in rational arithmetic. */
    @Test
    void everyRowOfTheExactTables() throws IOException {
        JsonNode tables;
        try (InputStream in = SavitzkyGolayTest.class.getResourceAsStream("/checks/savitzky_golay_exact.json")) {
            tables = Json.read(in.readAllBytes(), "savitzky_golay_exact.json");
        }
        int rows = 0;
        for (JsonNode row : tables.path("rows")) {
            int window = row.path("window").asInt();
            TailSpec.SavitzkyGolay spec = new TailSpec.SavitzkyGolay(
                    window, row.path("order").asInt(), row.path("derivative").asInt());
            Fraction[] weights = SavitzkyGolayWeights.of(spec);
            assertThat(weights).hasSize(window);
            for (int k = 0; k < window; k++) {
                Fraction exact = Fraction.of(
                        row.path("weights").get(k).asLong(), row.path("norm").asLong());
                assertThat(weights[k]).as("%s weight %d", spec, k).isEqualTo(exact);
            }
            rows++;
        }
        assertThat(rows).isEqualTo(99);
    }

    @Test
    void polynomialsUpToTheOrderComeOutExactly() {
        for (int window = 1; window <= 21; window += 2) {
            for (int order = 0; order < Math.min(window, 6); order++) {
                for (int derivative = 0; derivative <= order; derivative++) {
                    checkPolynomial(new TailSpec.SavitzkyGolay(window, order, derivative));
                }
            }
        }
    }

    /** f(k) = k^order at k = 5, 6, …: derivative s is order!/(order − s)!·k^(order − s). */
    private static void checkPolynomial(TailSpec.SavitzkyGolay spec) {
        int channels = spec.window() + 2;
        BigInteger[] f = new BigInteger[channels];
        for (int k = 0; k < channels; k++) {
            f[k] = BigInteger.valueOf(k + 5L).pow(spec.order());
        }
        Tail tail = Tail.of(TailSpec.of(spec), channels);
        BigInteger[] numerators = tail.applyExactly(f);
        assertThat(numerators).hasSize(3);
        for (int i = 0; i < 3; i++) {
            BigInteger expected = BigInteger.valueOf(i + spec.window() / 2 + 5L).pow(spec.order() - spec.derivative());
            for (int s = 0; s < spec.derivative(); s++) {
                expected = expected.multiply(BigInteger.valueOf(spec.order() - s));
            }
            assertThat(numerators[i])
                    .as("%s", spec)
                    .isEqualTo(expected.multiply(BigInteger.valueOf(tail.denominator(i))));
        }
    }
}
