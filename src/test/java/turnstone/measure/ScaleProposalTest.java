package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.IOException;
import java.io.InputStream;
import java.math.BigDecimal;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import turnstone.fault.Fault;

class ScaleProposalTest {
    private static ChannelScale proposed(ProposalKind kind, String... decimals) {
        ScaleProposal proposal = new ScaleProposal(1);
        for (String decimal : decimals) {
            assertThat(proposal.add(0, decimal)).isTrue();
        }
        return proposal.propose(kind).channel(0);
    }

    private static ChannelScale expected(String offset, String step, Precision precision) {
        return new ChannelScale(new BigDecimal(offset), new BigDecimal(step), precision);
    }

    @Test
    void takesTheLargestPowerOfTenThatLosesNothing() {
        assertThat(proposed(ProposalKind.LOSSLESS, "1.5", "2.25", "3.10"))
                .isEqualTo(expected("2.3", "0.01", Precision.COARSE));
        assertThat(proposed(ProposalKind.LOSSLESS, "10", "300", "50"))
                .isEqualTo(expected("160", "10", Precision.COARSE));
        assertThat(proposed(ProposalKind.LOSSLESS, "10", "305")).isEqualTo(expected("158", "1", Precision.COARSE));
        assertThat(proposed(ProposalKind.LOSSLESS, "0", "2000")).isEqualTo(expected("1000", "1000", Precision.COARSE));
        assertThat(proposed(ProposalKind.LOSSLESS, "0", "0")).isEqualTo(expected("0", "1", Precision.COARSE));
        assertThat(proposed(ProposalKind.LOSSLESS, "1e-7", "-1.20E-6"))
                .isEqualTo(expected("-0.0000006", "0.0000001", Precision.COARSE));
        assertThat(proposed(ProposalKind.LOSSLESS, "-0.00")).isEqualTo(expected("0", "1", Precision.COARSE));
    }

    @Test
    void midRangeIsRoundedToEven() {
        assertThat(proposed(ProposalKind.LOSSLESS, "0", "5").offset()).isEqualByComparingTo("2");
        assertThat(proposed(ProposalKind.LOSSLESS, "0", "7").offset()).isEqualByComparingTo("4");
    }

    @Test
    void reachesForFineWhereCoarseCannotHoldIt() {
        // 2^21 − 1 steps either side are coarse, 2^21 are not.
        assertThat(proposed(ProposalKind.LOSSLESS, "-2097151", "2097151").precision())
                .isEqualTo(Precision.COARSE);
        assertThat(proposed(ProposalKind.LOSSLESS, "-2097152", "2097152").precision())
                .isEqualTo(Precision.FINE);
    }

    @Test
    void whereNotEvenFineHoldsItTheStepGrowsOrTheChannelIsNamed() {
        ChannelScale scale = proposed(ProposalKind.LOSSLESS, "0", "9007199254740993");
        assertThat(scale.step()).isEqualByComparingTo("1000");
        assertThat(scale.precision()).isEqualTo(Precision.FINE);
        ScaleProposal proposal = new ScaleProposal(2);
        proposal.add(0, "1");
        proposal.add(1, "0");
        proposal.add(1, "9007199254740993");
        assertThatThrownBy(() -> proposal.propose(ProposalKind.LOSSLESS_OR_REFUSED))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("channel 2: no count scale holds this channel without loss");
        assertThat(proposed(ProposalKind.LOSSLESS_OR_REFUSED, "1.5", "2"))
                .isEqualTo(expected("1.8", "0.1", Precision.COARSE));
        ScaleProposal largeOffset = new ScaleProposal(1);
        largeOffset.add(0, "1e15");
        largeOffset.add(0, "1000000000000000.1");
        assertThatThrownBy(() -> largeOffset.propose(ProposalKind.LOSSLESS_OR_REFUSED))
                .isInstanceOf(Fault.class);
    }

    @Test
    void computedValuesGetFourTimesTheRange() {
        // 4·3/2^22 = 2.861e-6, up to two digits.
        assertThat(proposed(ProposalKind.COMPUTED, "-1", "2", "0.123456789"))
                .isEqualTo(expected("0.5000006", "0.0000029", Precision.COARSE));
        // 4·1.048576/2^22 = 1e-6 exactly: nothing to round.
        assertThat(proposed(ProposalKind.COMPUTED, "0", "1.048576").step()).isEqualByComparingTo("0.000001");
        assertThat(proposed(ProposalKind.COMPUTED, "5", "5").step()).isEqualByComparingTo("0.000005");
        assertThat(proposed(ProposalKind.COMPUTED, "0").step()).isEqualByComparingTo("0.000001");
        assertThat(proposed(ProposalKind.COMPUTED, "1e9", "1000000001").precision())
                .isEqualTo(Precision.COARSE);
    }

    @Test
    void floatsAreTakenAsTheirOwnShortestDecimals() {
        ScaleProposal proposal = new ScaleProposal(3);
        for (float x : new float[] {0.1f, 2.61776f, 3.3f}) {
            proposal.add(0, x, SourceType.FLOAT);
            proposal.add(1, x, SourceType.DOUBLE);
        }
        for (int x : new int[] {100, 4095, 7}) {
            proposal.add(2, x, SourceType.SHORT);
        }
        assertThat(proposal.decimalPlaces(0)).isEqualTo(5);
        assertThat(proposal.decimalPlaces(1)).isGreaterThan(14);
        assertThat(proposal.propose(ProposalKind.LOSSLESS).channel(0))
                .isEqualTo(expected("1.7", "0.00001", Precision.COARSE));
        assertThat(proposal.propose(ProposalKind.LOSSLESS).channel(2))
                .isEqualTo(expected("2051", "1", Precision.COARSE));
        assertThatThrownBy(() -> proposal.add(0, 0.1, SourceType.FLOAT)).isInstanceOf(IllegalArgumentException.class);
    }

    @Test
    void whatIsNoFiniteDecimalIsNotAdded() {
        ScaleProposal proposal = new ScaleProposal(1);
        assertThat(proposal.add(0, "abc")).isFalse();
        assertThat(proposal.add(0, "1e400")).isFalse();
        assertThat(proposal.add(0, Double.NaN, SourceType.DOUBLE)).isFalse();
        assertThat(proposal.add(0, Double.NEGATIVE_INFINITY, SourceType.DOUBLE)).isFalse();
        assertThatThrownBy(() -> proposal.propose(ProposalKind.LOSSLESS))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("channel 1");
        assertThat(proposal.add(0, "1e-500")).isTrue();
        assertThat(proposal.propose(ProposalKind.LOSSLESS).channel(0)).isEqualTo(expected("0", "1", Precision.COARSE));
    }

    @Test
    void orderAndMergesDoNotMatter() {
        long seed = 99L;
        System.out.println("seed " + seed);
        Random random = new Random(seed);
        for (int round = 0; round < 50; round++) {
            List<String> decimals = new ArrayList<>();
            for (int i = 0; i < 40; i++) {
                decimals.add(BigDecimal.valueOf(random.nextInt(2_000_000) - 1_000_000, random.nextInt(8) - 2)
                        .toString());
            }
            ScaleProposal whole = new ScaleProposal(1);
            decimals.forEach(decimal -> whole.add(0, decimal));
            Collections.shuffle(decimals, random);
            ScaleProposal left = new ScaleProposal(1);
            ScaleProposal right = new ScaleProposal(1);
            ScaleProposal doubles = new ScaleProposal(1);
            for (int i = 0; i < decimals.size(); i++) {
                (i % 3 == 0 ? left : right).add(0, decimals.get(i));
                doubles.add(0, Double.parseDouble(decimals.get(i)), SourceType.DOUBLE);
            }
            right.merge(new ScaleProposal(1));
            left.merge(right);
            for (ProposalKind kind : List.of(ProposalKind.LOSSLESS, ProposalKind.COMPUTED)) {
                assertThat(left.propose(kind)).isEqualTo(whole.propose(kind)).isEqualTo(doubles.propose(kind));
            }
            assertThat(left.values(0)).isEqualTo(40);
        }
    }

    @ParameterizedTest
    @CsvSource({"wine.csv, 10", "breast_cancer.csv, 7"})
    void reachesForFineOnRealTablesByItself(String file, int fineChannel) throws IOException {
        List<String[]> rows = rows(file);
        CountScale scale = propose(rows);
        assertThat(scale.channel(fineChannel - 1).precision()).isEqualTo(Precision.FINE);
        assertThat(scale.channel(0).precision()).isEqualTo(Precision.COARSE);
        assertThat(loss(rows, scale).isLossless()).isTrue();
    }

    @ParameterizedTest
    @CsvSource({"meat-nir.csv, 0.00001", "iris.csv, 0.1"})
    void findsTheStepOfRealTables(String file, String step) throws IOException {
        List<String[]> rows = rows(file);
        CountScale scale = propose(rows);
        for (int c = 0; c < scale.channels(); c++) {
            assertThat(scale.channel(c).step()).isEqualByComparingTo(step);
            assertThat(scale.channel(c).precision()).isEqualTo(Precision.COARSE);
        }
        ScaleLoss loss = loss(rows, scale);
        assertThat(loss.isLossless()).isTrue();
        assertThat(loss.records()).isEqualTo(rows.size());
    }

    private static CountScale propose(List<String[]> rows) {
        ScaleProposal proposal = new ScaleProposal(rows.get(0).length - 1);
        for (String[] row : rows) {
            for (int c = 1; c < row.length; c++) {
                assertThat(proposal.add(c - 1, row[c])).isTrue();
            }
        }
        return proposal.propose(ProposalKind.LOSSLESS_OR_REFUSED);
    }

    private static ScaleLoss loss(List<String[]> rows, CountScale scale) {
        int d = scale.channels();
        ScaleLoss loss = new ScaleLoss(scale, SourceType.DECIMAL);
        double[] values = new double[d];
        double[] counts = new double[d];
        for (String[] row : rows) {
            for (int c = 0; c < d; c++) {
                values[c] = Double.parseDouble(row[c + 1]);
            }
            assertThat(scale.toCounts(values, 0, counts, 0)).isEqualTo(-1);
            loss.add(values, 0, counts, 0);
        }
        return loss;
    }

    private static List<String[]> rows(String file) throws IOException {
        try (InputStream in = ScaleProposalTest.class.getResourceAsStream("/checks/data/" + file)) {
            String all = new String(in.readAllBytes(), StandardCharsets.UTF_8);
            return all.lines().skip(1).map(line -> line.split(",", -1)).toList();
        }
    }
}
