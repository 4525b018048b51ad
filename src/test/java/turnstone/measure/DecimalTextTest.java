package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;

import java.math.BigDecimal;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

class DecimalTextTest {
    private final DecimalText text = new DecimalText();

    @ParameterizedTest
    @ValueSource(
            strings = {
                "0",
                "1",
                "-1",
                "+2.5",
                ".5",
                "5.",
                "0.1",
                "123456789012345678",
                "9007199254740993",
                "0.30000000000000004",
                "1e3",
                "1E-7",
                "-2.5e+10",
                "  7.25 ",
                "00012.500",
                "3.14159265358979323846264338327950288",
                "1e-320",
                "000000000000000000000000.1"
            })
    void readsDecimals(String decimal) {
        assertThat(text.read(decimal)).isTrue();
        assertThat(text.value()).isEqualTo(Double.parseDouble(decimal));
        assertThat(text.exact()).isEqualByComparingTo(new BigDecimal(decimal.strip()));
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "",
                " ",
                ".",
                "-",
                "NaN",
                "Infinity",
                "1d",
                "1f",
                "0x1p3",
                "1,5",
                "1e",
                "e5",
                "1.2.3",
                "--1",
                "1 2",
                "abc",
                "1e9999999999",
                "١"
            })
    void refusesEverythingElse(String other) {
        assertThat(text.read("42")).isTrue();
        assertThat(text.read(other)).isFalse();
        assertThat(text.value()).isEqualTo(42);
        assertThat(text.read(null)).isFalse();
    }

    @Test
    void hasOneZero() {
        for (String zero : new String[] {"-0", "-0.0", "-0e5", "-.0"}) {
            assertThat(text.read(zero)).isTrue();
            assertThat(Double.doubleToRawLongBits(text.value())).isZero();
        }
    }

    @Test
    void givesTheNearestDouble() {
        long seed = 11L;
        System.out.println("seed " + seed);
        Random random = new Random(seed);
        for (int i = 0; i < 50_000; i++) {
            int digits = 1 + random.nextInt(20);
            StringBuilder decimal = new StringBuilder(random.nextBoolean() ? "-" : "");
            int point = random.nextInt(digits + 1);
            for (int k = 0; k < digits; k++) {
                if (k == point) {
                    decimal.append('.');
                }
                decimal.append((char) ('0' + random.nextInt(10)));
            }
            String written = decimal.toString();
            assertThat(text.read(written)).as(written).isTrue();
            assertThat(text.value()).as(written).isEqualTo(Double.parseDouble(written) + 0.0);
        }
    }

    @Test
    void writesShortestDecimalsWhateverTheJvm() {
        // Double.toString gives 2.0E-3 and 2.2250738585072014E-308 everywhere, but 2.0000000000000002E23-like digits
        // differed before Java 19.
        assertThat(DecimalText.shortest(2e23)).isEqualTo("2.0E23");
        assertThat(DecimalText.shortest(0.1f)).isEqualTo("0.1");
        assertThat(DecimalText.shortest(1.1754944E-38f)).isEqualTo("1.1754944E-38");
    }
}
