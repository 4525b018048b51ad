package turnstone.fisher;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatExceptionOfType;
import static org.assertj.core.api.Assertions.within;

import java.math.BigDecimal;
import java.math.BigInteger;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.List;
import java.util.Random;
import java.util.stream.IntStream;
import org.ejml.data.DMatrixRMaj;
import org.ejml.dense.row.CommonOps_DDRM;
import org.ejml.dense.row.factory.DecompositionFactory_DDRM;
import org.ejml.interfaces.decomposition.EigenDecomposition_F64;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.measure.ChannelScale;
import turnstone.measure.CountScale;
import turnstone.measure.Precision;
import turnstone.measure.Tail;
import turnstone.measure.TailSpec;

/** What must not change a fit, and what must change it in a known way. */
class FitInvarianceTest {
    private static List<Cell> pieces(CheckTable table, String material, Random random) {
        List<Integer> rows =
                new ArrayList<>(IntStream.of(table.rows(material)).boxed().toList());
        Collections.shuffle(rows, random);
        int cut = 1 + random.nextInt(rows.size() - 1);
        int[] all = rows.stream().mapToInt(Integer::intValue).toArray();
        List<Cell> cells = new ArrayList<>(List.of(
                Cell.asCounted(table.moments(Arrays.copyOf(all, cut))),
                Cell.asCounted(table.moments(Arrays.copyOfRange(all, cut, all.length)))));
        Collections.shuffle(cells, random);
        return cells;
    }

    @Test
    void shuffledRecordsInAnyCellsGiveTheSameBits() {
        Random random = new Random(3);
        for (String set : List.of("iris", "meat-nir-fat-tertiles")) {
            CheckTable table = ReferenceFitTest.table(set);
            Fit whole = Fit.of(table.request());
            for (int i = 0; i < 3; i++) {
                List<List<Cell>> cells = table.materials().stream()
                        .map(m -> pieces(table, m, random))
                        .toList();
                Expect.sameBits(Fit.of(FitRequest.of(table.materials(), cells, table.scale())), whole);
            }
        }
    }

    @Test
    void oneWeightForAllIsAsCounted() {
        CheckTable table = ReferenceFitTest.table("wine");
        List<List<Cell>> cells = table.materials().stream()
                .map(m -> List.of(new Cell(table.moments(m), 0.3)))
                .toList();
        Expect.sameBits(Fit.of(FitRequest.of(table.materials(), cells, table.scale())), Fit.of(table.request()));
    }

    @Test
    void aWeightOfThreeIsTheSameRecordsThreeTimes() {
        CheckTable table = ReferenceFitTest.table("iris");
        List<List<Cell>> weighted = new ArrayList<>();
        List<List<Cell>> repeated = new ArrayList<>();
        for (String material : table.materials()) {
            int[] rows = table.rows(material);
            Cell first = Cell.asCounted(table.moments(Arrays.copyOf(rows, 20)));
            Cell rest = Cell.asCounted(table.moments(Arrays.copyOfRange(rows, 20, rows.length)));
            weighted.add(List.of(new Cell(first.moments(), 3), rest));
            repeated.add(List.of(first, first, rest, first));
        }
        Fit byWeight = Fit.of(FitRequest.of(table.materials(), weighted, table.scale()));
        Fit byRecords = Fit.of(FitRequest.of(table.materials(), repeated, table.scale()));
        for (int i = 0; i < 2; i++) {
            Expect.relative("λ", byWeight.fisherRatios()[i], byRecords.fisherRatios()[i], 1e-14);
        }
        assertThat(byWeight.means()[1]).containsExactly(byRecords.means()[1], within(1e-14));
        // Degrees of freedom are those of the records there are.
        assertThat(byWeight.withinDegreesOfFreedom()).isEqualTo(147);
        assertThat(byRecords.withinDegreesOfFreedom()).isEqualTo(267);
    }

    @Test
    void betweenSharesAreTheWeightsOfTheMeans() {
        CheckTable table = ReferenceFitTest.table("wine");
        double[] shares = {59 / 178.0, 71 / 178.0, 48 / 178.0};
        Fit given = Fit.of(table.request().withBetweenShares(shares));
        Fit counted = Fit.of(table.request());
        Expect.relative("λ", given.fisherRatios()[0], counted.fisherRatios()[0], 1e-14);
        Fit equal = Fit.of(table.request().withBetweenShares(new double[] {0.25, 0.25, 0.5}));
        for (int c = 0; c < 13; c++) {
            double[][] means = equal.means();
            assertThat(equal.centre()[c])
                    .isCloseTo(0.25 * means[0][c] + 0.25 * means[1][c] + 0.5 * means[2][c], within(1e-12));
        }
    }

    /** The tail on the sums against the tail on each record, both exact up to the fit: outputs of the records are integers over one denominator. */
    @Test
    void tailOnSumsIsTailOnRecords() {
        CheckTable table = ReferenceFitTest.table("meat-nir-fat-tertiles");
        Tail tail = Tail.of(
                TailSpec.of(new TailSpec.SavitzkyGolay(7, 2, 1), new TailSpec.Bins(3), new TailSpec.Mask(2, 4)), 100);
        Fit onSums = Fit.of(table.request().withTail(tail));
        Fit onRecords = Fit.of(onRecords(table, tail).request());
        for (int i = 0; i < 2; i++) {
            Expect.relative("λ", onSums.fisherRatios()[i], onRecords.fisherRatios()[i], 1e-14);
            for (int k = 0; k < 3; k++) {
                assertThat(Math.abs(onSums.positions()[k][i]))
                        .isCloseTo(Math.abs(onRecords.positions()[k][i]), within(1e-12));
            }
        }
    }

    /** Each output as the integer numerator of T·q: another unit per channel, which no λ depends on. */
    private static CheckTable onRecords(CheckTable table, Tail tail) {
        List<List<BigDecimal>> records = new ArrayList<>();
        for (int row = 0; row < table.labels().size(); row++) {
            BigInteger[] scaled = table.records().get(row).stream()
                    .map(x -> x.movePointRight(5).toBigIntegerExact())
                    .toArray(BigInteger[]::new);
            records.add(Arrays.stream(tail.applyExactly(scaled))
                    .map(BigDecimal::new)
                    .toList());
        }
        return CheckTable.of(table.labels(), records);
    }

    @Test
    void anotherStepChangesNoRatio() {
        CheckTable table = ReferenceFitTest.table("iris");
        List<ChannelScale> fine = new ArrayList<>();
        for (int c = 0; c < 4; c++) {
            ChannelScale channel = table.scale().channel(c);
            fine.add(new ChannelScale(channel.offset(), channel.step().movePointLeft(7), Precision.FINE));
        }
        CheckTable other = new CheckTable(table.labels(), table.records(), CountScale.of(fine));
        Fit one = Fit.of(table.request());
        Fit two = Fit.of(other.request());
        assertThat(two.fisherRatios()).containsExactly(one.fisherRatios(), within(1e-14));
        assertThat(two.axes()[0]).containsExactly(one.axes()[0], within(1e-14));
    }

    /** An independent solver of the same eigenproblem, in doubles: EJML's symmetric eigenvalues of L⁻¹·B·L⁻ᵀ on well-conditioned invented data. */
    @Test
    void ratiosAgreeWithAnotherLibrary() {
        FitRequest request = FitBenchmark.request(40, 5, 60);
        Scatter scatter = Scatter.of(request);
        Fit fit = scatter.fit(Ridge.NONE, 0);
        DMatrixRMaj w = new DMatrixRMaj(scatter.within().rounded());
        DMatrixRMaj b = new DMatrixRMaj(40, 40);
        for (int k = 0; k < 5; k++) {
            for (int i = 0; i < 40; i++) {
                for (int j = 0; j < 40; j++) {
                    double[] mean = fit.means()[k];
                    b.add(i, j, 60 * (mean[i] - fit.centre()[i]) * (mean[j] - fit.centre()[j]));
                }
            }
        }
        DMatrixRMaj product = new DMatrixRMaj(40, 40);
        assertThat(CommonOps_DDRM.solve(w, b, product)).isTrue();
        EigenDecomposition_F64<DMatrixRMaj> eigen = DecompositionFactory_DDRM.eig(40, false, false);
        assertThat(eigen.decompose(product)).isTrue();
        double[] values = IntStream.range(0, 40)
                .mapToDouble(i -> -eigen.getEigenvalue(i).getReal())
                .sorted()
                .limit(4)
                .map(x -> -x)
                .toArray();
        for (int i = 0; i < 4; i++) {
            Expect.relative("λ", fit.fisherRatios()[i], values[i], 1e-9);
        }
    }

    @Test
    void requestsThatMakeNoSenseAreRefused() {
        CheckTable table = ReferenceFitTest.table("iris");
        assertThatExceptionOfType(IllegalArgumentException.class)
                .isThrownBy(() -> table.request().withBetweenShares(new double[] {0.5, 0.5, 0.5}));
        assertThatExceptionOfType(IllegalArgumentException.class).isThrownBy(() -> Ridge.amount(-1));
        List<List<Cell>> cells = List.of(
                List.of(),
                table.request().cells().get(1),
                table.request().cells().get(2));
        assertThatExceptionOfType(Fault.class)
                .isThrownBy(() -> Fit.of(FitRequest.of(table.materials(), cells, table.scale())))
                .withMessageContaining("material setosa: a material has no records");
    }
}
