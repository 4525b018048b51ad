package turnstone.decide;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.io.ByteArrayInputStream;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.ObjectInputStream;
import java.io.ObjectOutputStream;
import org.junit.jupiter.api.Test;

class ProjectorTest {
    private final Judgement judgement = new Judgement();

    @Test
    void positionsComeFromCountsThroughOffsetAndStep() {
        Projector projector = Projector.of(ModelFixture.plain());
        double[] position = new double[2];
        // Counts 3 and 20 after one that belongs to another record: values 10 + 3·0.5 and 16 + 20·0.25, centre (10,
        // 20).
        projector.position(new double[] {99, 3, 20}, 1, position);
        assertThat(position).containsExactly(1.5, 1.0);
    }

    @Test
    void theNearestMaterialWinsByDistanceAndPrior() {
        Projector projector = Projector.of(ModelFixture.plain());
        assertThat(projector.decide(new double[] {1, 0.5}, judgement)).isEqualTo(1);
        assertThat(judgement.material()).isEqualTo(1);
        // Squared distances 9.25, 1.25 and 31.25; the first two have the same prior.
        assertThat(judgement.margin()).isCloseTo(8, within(1e-14));
        assertThat(judgement.distance()).isCloseTo(Math.sqrt(1.25), within(1e-15));
        assertThat(judgement.unfamiliar()).isFalse();
        assertThat(judgement.residual()).isNaN();
        // (0, 2.7) is nearer to (±2, 0), 11.29, than to (0, 6), 10.89, only because the prior of the third is half as
        // large.
        assertThat(projector.decide(new double[] {0, 2.7}, judgement)).isZero();
        Projector equal = Projector.of(Model.sealed(ModelFixture.content(0.25, 0.25, 0.25)));
        assertThat(equal.decide(new double[] {0, 2.7}, judgement)).isEqualTo(2);
        assertThat(judgement.margin()).isCloseTo(0.4, within(1e-13));
    }

    @Test
    void marginCountsThePriorTerm() {
        Projector projector = Projector.of(ModelFixture.plain());
        projector.decide(new double[] {-2, 6}, judgement);
        // To the third: 4 − 2 ln 0.2; to the first: 36 − 2 ln 0.4.
        assertThat(judgement.material()).isEqualTo(2);
        assertThat(judgement.margin()).isCloseTo(32 - 2 * StrictMath.log(2), within(1e-13));
    }

    @Test
    void tiesGoToTheFirstMaterial() {
        Projector projector = Projector.of(ModelFixture.plain());
        assertThat(projector.decide(new double[] {0, 1}, judgement)).isZero();
        assertThat(judgement.margin()).isZero();
    }

    @Test
    void beyondTheDistanceARecordIsUnfamiliarAndDecidedAllTheSame() {
        Projector projector = Projector.of(ModelFixture.plain());
        assertThat(projector.decide(new double[] {2, -4}, judgement)).isEqualTo(1);
        assertThat(judgement.unfamiliar()).isFalse();
        assertThat(projector.decide(new double[] {2, -4.001}, judgement)).isEqualTo(1);
        assertThat(judgement.unfamiliar()).isTrue();
        assertThat(projector.decide(new double[] {2, 0}, judgement)).isEqualTo(1);
        assertThat(judgement.unfamiliar()).isFalse();
    }

    @Test
    void energyOutsideTheAxesMakesARecordUnfamiliar() {
        Model model = ModelFixture.withResidual();
        // Two degrees of freedom: the quantile of chi-square is −2 ln 0.005 = 10.597.
        assertThat(model.residual().orElseThrow().beyond()).isCloseTo(-2 * StrictMath.log(0.005), within(1e-11));
        Projector projector = Projector.of(model);
        double[] position = new double[1];
        // Values (3.5, 3, 1): 0.5 from PS on the axis, energy 9 + 1 outside it.
        projector.judge(new double[] {7, 12, 4}, 0, position, judgement);
        assertThat(judgement.material()).isEqualTo(1);
        assertThat(judgement.residual()).isCloseTo(10, within(1e-14));
        assertThat(judgement.unfamiliar()).isFalse();
        // Values (3.5, 3, 2): energy 13.
        projector.judge(new double[] {7, 12, 8}, 0, position, judgement);
        assertThat(judgement.residual()).isCloseTo(13, within(1e-14));
        assertThat(judgement.unfamiliar()).isTrue();
        assertThat(judgement.distance()).isEqualTo(0.5);
    }

    @Test
    void copiesAndSerialisedProjectorsJudgeAlike() throws IOException, ClassNotFoundException {
        Projector projector = Projector.of(ModelFixture.withResidual());
        ByteArrayOutputStream bytes = new ByteArrayOutputStream();
        try (ObjectOutputStream out = new ObjectOutputStream(bytes)) {
            out.writeObject(projector);
        }
        Projector read;
        try (ObjectInputStream in = new ObjectInputStream(new ByteArrayInputStream(bytes.toByteArray()))) {
            read = (Projector) in.readObject();
        }
        double[] counts = {3, -5, 11};
        for (Projector other : new Projector[] {projector, projector.copy(), read}) {
            double[] position = new double[1];
            other.judge(counts, 0, position, judgement);
            assertThat(position[0]).isEqualTo(1.5);
            assertThat(judgement.residual()).isCloseTo(1.25 * 1.25 + 2.75 * 2.75, within(1e-14));
            assertThat(other.materials()).containsExactly("PA", "PS");
        }
    }
}
