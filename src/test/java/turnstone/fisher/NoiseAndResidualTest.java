package turnstone.fisher;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatExceptionOfType;
import static org.assertj.core.api.Assertions.within;

import java.math.BigDecimal;
import java.math.RoundingMode;
import java.util.ArrayList;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;

/** Rounding noise, energy outside the axes, orientation. */
class NoiseAndResidualTest {
    /** Invented records whose channels sum to zero before they are rounded to the step. */
    private static CheckTable summingToZero() {
        Random random = new Random(17);
        List<String> labels = new ArrayList<>();
        List<List<BigDecimal>> records = new ArrayList<>();
        for (int i = 0; i < 300; i++) {
            labels.add(i % 2 == 0 ? "a" : "b");
            double[] x = new double[6];
            double mean = 0;
            for (int c = 0; c < 6; c++) {
                x[c] = random.nextGaussian() + (i % 2) * c;
                mean += x[c] / 6;
            }
            List<BigDecimal> record = new ArrayList<>();
            for (double value : x) {
                record.add(new BigDecimal(value - mean).setScale(4, RoundingMode.HALF_EVEN));
            }
            records.add(record);
        }
        return CheckTable.of(labels, records);
    }

    @Test
    void roundedSourcesNeedARidgeWhereADirectionIsNoise() {
        FitRequest request = summingToZero().request().withRoundedSource(RoundedSource.ROUNDED);
        assertThatExceptionOfType(Fault.class)
                .isThrownBy(() -> Fit.of(request))
                .withMessageContaining("1 of 6 directions")
                .withMessageContaining("ridge");
        assertThat(Fit.of(request.withRidge(Ridge.amount(1e-3))).remarks()).isEmpty();
    }

    @Test
    void losslessSpectraAreFittedWithARemark() {
        assertThat(Fit.of(ReferenceFitTest.table("meat-nir-fat-tertiles").request())
                        .remarks())
                .singleElement()
                .asString()
                .startsWith("5 of 100 directions ");
        assertThat(Fit.of(ReferenceFitTest.table("iris").request().withRoundedSource(RoundedSource.ROUNDED))
                        .remarks())
                .isEmpty();
    }

    /** Exact dependence on many records leaves pivots of about 1e-32 of either sign: the limit, not the sign, must refuse them. */
    @Test
    void dependentChannelsAreRefusedWhateverRoundingLeaves() {
        CheckTable wine = ReferenceFitTest.table("wine");
        for (int i = 0; i < 12; i++) {
            List<List<BigDecimal>> records = new ArrayList<>();
            for (List<BigDecimal> record : wine.records()) {
                List<BigDecimal> longer = new ArrayList<>(record);
                longer.add(record.get(i).multiply(BigDecimal.valueOf(3)).add(record.get(i + 1)));
                records.add(longer);
            }
            FitRequest request = CheckTable.of(wine.labels(), records).request();
            assertThatExceptionOfType(Fault.class)
                    .isThrownBy(() -> Fit.of(request))
                    .withMessageContaining("c14 = 3·c" + (i + 1) + " + c" + (i + 2) + " (up to a constant)");
        }
    }

    /** Trace and degrees of freedom against the records themselves: the energy of each about its own mean. */
    @Test
    void expectedEnergyIsThatOfTheRecords() {
        CheckTable table = ReferenceFitTest.table("wine");
        Fit fit = Fit.of(table.request());
        ResidualNorm residual = fit.residual();
        double energy = 0;
        for (int i = 0; i < table.labels().size(); i++) {
            double[] x = table.values(i);
            double[] mean = fit.means()[table.materials().indexOf(table.labels().get(i))];
            for (int c = 0; c < x.length; c++) {
                x[c] -= mean[c];
            }
            energy += residual.energy(x);
        }
        Expect.relative("energy", residual.expectedEnergy(), energy / 175, 1e-10);
        // One channel (proline) has nearly all the variance: about one effective degree of freedom.
        assertThat(residual.effectiveDegreesOfFreedom()).isBetween(1.0, 1.2);
        double[][] basis = residual.basis();
        for (double[] axis : fit.axes()) {
            assertThat(residual.energy(axis)).isLessThan(1e-20);
        }
        assertThat(basis).hasNumberOfRows(2);
    }

    @Test
    void signsFollowTheReferenceAndDistancesStay() {
        Fit fit = Fit.of(ReferenceFitTest.table("iris").request());
        double[][] flipped = fit.axes();
        for (int c = 0; c < 4; c++) {
            flipped[1][c] = -flipped[1][c];
        }
        Orientation orientation = Orientation.of(fit, flipped, Orientation.Manner.SIGNS);
        assertThat(orientation.rotation()).isDeepEqualTo(new double[][] {{1, 0}, {0, -1}});
        assertThat(orientation.turned().axes()).isDeepEqualTo(flipped);
        assertThat(orientation.turned().squaredDistance(0, 2)).isEqualTo(fit.squaredDistance(0, 2));
        assertThat(orientation.principalAngles()).containsExactly(new double[] {0, 0}, within(1e-7));
    }

    @Test
    void procrustesFindsARotationBackAndAnglesSeeATilt() {
        Fit fit = Fit.of(ReferenceFitTest.table("iris").request());
        double cosine = 0.8;
        double sine = 0.6;
        double[][] axes = fit.axes();
        double[][] rotated = new double[2][4];
        for (int c = 0; c < 4; c++) {
            rotated[0][c] = cosine * axes[0][c] - sine * axes[1][c];
            rotated[1][c] = sine * axes[0][c] + cosine * axes[1][c];
        }
        Orientation orientation = Orientation.of(fit, rotated, Orientation.Manner.PROCRUSTES);
        double[][] expected = {{cosine, -sine}, {sine, cosine}};
        for (int i = 0; i < 2; i++) {
            assertThat(orientation.rotation()[i]).containsExactly(expected[i], within(1e-12));
            assertThat(orientation.turned().axes()[i]).containsExactly(rotated[i], within(1e-12));
        }
        Expect.relative("distance", orientation.turned().squaredDistance(0, 1), fit.squaredDistance(0, 1), 1e-13);
        Fit first = Fit.of(ReferenceFitTest.table("iris").request().withRank(1));
        // Axes of unit variance, uncorrelated: 0.8 and 0.6 of them make an angle with cosine 0.8.
        double[] angle = Orientation.of(first, new double[][] {rotated[0]}, Orientation.Manner.SIGNS)
                .principalAngles();
        assertThat(angle).containsExactly(new double[] {StrictMath.acos(cosine)}, within(1e-12));
        assertThat(Orientation.of(first, rotated, Orientation.Manner.PROCRUSTES).rotation())
                .isDeepEqualTo(new double[][] {{1}});
    }
}
