package turnstone.moments;

import static org.assertj.core.api.Assertions.assertThat;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import java.io.IOException;
import java.io.InputStream;
import java.math.BigDecimal;
import java.math.BigInteger;
import java.math.MathContext;
import java.nio.charset.StandardCharsets;
import java.util.List;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

/**
 * Mean, standard deviation and lag-1 autocorrelation from exact moments against the certified values of the NIST Statistical Reference Datasets,
 * univariate summary statistics (National Institute of Standards and Technology; NumAcc: Simon and Lesage 1989).
 */
class NistUnivariateTest {
    private static final MathContext DIGITS = new MathContext(40);

    /** Certified values are printed to 15 significant digits: half a unit of the last is at most 5e-15 of the value. */
    private static final BigDecimal CERTIFIED = new BigDecimal("5e-15");

    @ParameterizedTest
    @CsvSource({
        "NumAcc1, 10000000, 1, COARSE",
        "NumAcc2, 0, 0.1, COARSE",
        "NumAcc3, 0, 0.1, FINE",
        "NumAcc4, 0, 0.1, FINE",
        "Lottery, 0, 1, COARSE",
        "Lew, 0, 1, COARSE",
        "Mavro, 2, 0.0001, COARSE",
        "Michelso, 299, 0.01, COARSE",
        "PiDigits, 0, 1, COARSE",
    })
    void countsGiveTheCertifiedValues(String set, BigDecimal offset, BigDecimal step, String precision)
            throws IOException {
        JsonNode certified = new ObjectMapper()
                .readTree(resource("nist_strd.json"))
                .get("sets")
                .get(set);
        List<BigDecimal> values = values(set);
        assertThat(values).hasSize(certified.get("n").asInt());
        double[] counts = values.stream()
                .mapToDouble(value -> value.subtract(offset).divide(step).longValueExact())
                .toArray();
        Moments moments = fold(counts, 1, counts.length, precision);
        Moments pairs = fold(counts, 2, counts.length - 1, precision);

        BigDecimal records = BigDecimal.valueOf(moments.records());
        BigDecimal mean = offset.add(step.multiply(new BigDecimal(moments.sum(0)).divide(records, DIGITS)));
        assertCertified(mean, certified.get("certified_mean"));

        BigInteger scatter = moments.scatter(0, 0);
        BigDecimal variance =
                new BigDecimal(scatter).divide(records.multiply(records.subtract(BigDecimal.ONE)), DIGITS);
        assertCertified(step.multiply(variance.sqrt(DIGITS)), certified.get("certified_standard_deviation"));

        assertCertified(
                new BigDecimal(laggedScatter(moments, pairs)).divide(records.multiply(new BigDecimal(scatter)), DIGITS),
                certified.get("certified_lag1_autocorrelation"));
    }

    /** n^2 times the sum over successive records of the product of their deviations from the mean of all. */
    private static BigInteger laggedScatter(Moments all, Moments pairs) {
        BigInteger n = BigInteger.valueOf(all.records());
        BigInteger sum = all.sum(0);
        return n.multiply(n)
                .multiply(pairs.product(1, 0))
                .subtract(n.multiply(sum).multiply(pairs.sum(0).add(pairs.sum(1))))
                .add(BigInteger.valueOf(pairs.records()).multiply(sum).multiply(sum));
    }

    /** Overlapping records: each begins one count after the last. */
    private static Moments fold(double[] counts, int channels, int records, String precision) {
        RowFolder folder = new RowFolder(
                channels,
                CountSample.marks(channels, precision.equals("FINE")),
                BlockKernels.choose(KernelChoice.AUTO),
                256);
        for (int k = 0; k < records; k++) {
            folder.add(counts, k);
        }
        return folder.snapshot();
    }

    private static void assertCertified(BigDecimal found, JsonNode certified) {
        BigDecimal expected = new BigDecimal(certified.asText());
        assertThat(found.subtract(expected).abs())
                .as("%s against %s", found, expected)
                .isLessThanOrEqualTo(expected.abs().multiply(CERTIFIED));
    }

    /** The data follow the last line that is a comment, says that data follow, or is a rule. */
    private static List<BigDecimal> values(String set) throws IOException {
        List<String> lines = new String(resource(set + ".txt"), StandardCharsets.ISO_8859_1)
                .lines()
                .map(String::strip)
                .toList();
        int start = 0;
        for (int i = 0; i < lines.size(); i++) {
            String line = lines.get(i);
            if (line.startsWith("#") || line.startsWith("Data:") || line.matches("-+")) {
                start = i + 1;
            }
        }
        return lines.subList(start, lines.size()).stream()
                .filter(line -> line.matches("[-+]?[0-9]+(\\.[0-9]*)?"))
                .map(BigDecimal::new)
                .toList();
    }

    private static byte[] resource(String name) throws IOException {
        try (InputStream in = NistUnivariateTest.class.getResourceAsStream("/checks/nist/" + name)) {
            return in.readAllBytes();
        }
    }
}
