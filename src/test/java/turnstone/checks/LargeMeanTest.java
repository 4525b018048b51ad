package turnstone.checks;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.math.BigDecimal;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import turnstone.decide.Model;
import turnstone.spark.Session;
import turnstone.spark.SharedSession;
import turnstone.table.TableFit;

/**
 * Means of 1e5 and 2e5 with deviations of 1e-5: sums of squares in doubles gave a negative variance here (SPARK-26158). The exact answer is
 * worked by hand from the table's own counts.
 */
@ExtendWith(SharedSession.class)
class LargeMeanTest {
    private static final int TIMES = 2500;
    private static final double STEP = 1e-5;

    @TempDir
    Path folder;

    /** Steps of a material's mean from 1e5 and 2e5. */
    private record Centre(String material, int first, int second) {}

    private static final List<Centre> CENTRES =
            List.of(new Centre("a", 0, 0), new Centre("b", 1, 0), new Centre("c", 0, 3));

    private static String decimal(long whole, int steps) {
        return BigDecimal.valueOf(whole)
                .add(BigDecimal.valueOf(steps, 5))
                .setScale(5)
                .toPlainString();
    }

    private static TextTable table() {
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < TIMES; i++) {
            for (Centre centre : CENTRES) {
                for (int corner = 0; corner < 4; corner++) {
                    int first = centre.first() + (corner % 2 == 0 ? -1 : 1);
                    int second = centre.second() + (corner < 2 ? -1 : 1);
                    rows.add(List.of(centre.material(), decimal(100_000, first), decimal(200_000, second)));
                }
            }
        }
        return new TextTable(List.of(TextTable.LABEL, "c1", "c2"), rows);
    }

    /**
     * In steps, every material has n_k = 10000 records at the corners of a square of side 2: W = 30000·I. The means (0,0), (1,0), (0,3) give
     * B = 10000·[[2/3, −1], [−1, 6]], so W⁻¹B has the eigenvalues (10 ± √73)/9, and the axes A satisfy AᵀA = Sw⁻¹ = 29997/30000·I.
     */
    @Test
    void varianceIsExact(Session session) throws IOException {
        Path csv = table().toCsv(folder.resolve("large-mean.csv"));
        TableFit.Result fitted = new WholePath(session, folder).fitted(csv, 0, WholePath.ALL_AXES);
        Model model = fitted.model();
        assertThat(fitted.loss().isLossless()).isTrue();
        assertThat(fitted.counts().accepted()).isEqualTo(12L * TIMES);
        double root = Math.sqrt(73);
        Close.relative("ratios", model.fisherRatios(), new double[] {(10 + root) / 9, (10 - root) / 9}, 1e-14);
        double[][] axes = model.axes();
        double precision = 29997 / 30000.0 / (STEP * STEP);
        double[] found = {
            axes[0][0] * axes[0][0] + axes[1][0] * axes[1][0], axes[0][1] * axes[0][1] + axes[1][1] * axes[1][1]
        };
        Close.relative("inverse of the within variance", found, new double[] {precision, precision}, 1e-14);
        double across = axes[0][0] * axes[0][1] + axes[1][0] * axes[1][1];
        assertThat(Math.abs(across)).isLessThan(1e-14 * precision);
        for (int k = 0; k < CENTRES.size(); k++) {
            Centre centre = CENTRES.get(k);
            assertThat(model.materials().get(k).mean())
                    .containsExactly(
                            Double.parseDouble(decimal(100_000, centre.first())),
                            Double.parseDouble(decimal(200_000, centre.second())));
        }
    }

    /** Whatever the merge tree: in many small files equal records have a variance of exactly 0, which is refused by name. */
    @Test
    void equalRecordsHaveNoVariance(Session session) throws IOException {
        List<List<String>> rows = new ArrayList<>();
        for (int i = 0; i < 999; i++) {
            rows.add(List.of(i % 2 == 0 ? "a" : "b", decimal(100_000, 1), decimal(200_000, i % 7)));
        }
        Path files = new TextTable(List.of(TextTable.LABEL, "c1", "c2"), rows).toFiles(folder.resolve("equal"), 7);
        assertThat(session.slots()).isPositive();
        String line = CommandRun.of("fit", "--table", files, "--label", TextTable.LABEL, "--out", folder.resolve("out"))
                .refusal(3);
        assertThat(line).contains("constant in every record: c1;");
    }
}
