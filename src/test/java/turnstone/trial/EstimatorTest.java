package turnstone.trial;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;
import static turnstone.plant.Requirement.Figure.DECISION_PURITY;
import static turnstone.plant.Requirement.Figure.DECISION_RECOVERY;

import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.Test;
import turnstone.plant.Duty;

class EstimatorTest {
    private static final Map<String, Double> MIX = Map.of("PET", 0.6, "PVC", 0.1, "PP", 0.3);
    private static final Duty EJECT = Fixture.duty(Duty.Stream.EJECTED, MIX);

    @Test
    void purityAndRecoveryAreMassSharesUnderTheMix() {
        Fixture f = Fixture.small();
        Estimator estimator = new Estimator(f.showings);
        // 17 of 20 of PET, 1 of 20 of PVC, none of PP are ejected; unfamiliar and no signal are not, and stay in the
        // denominators.
        assertThat(estimator
                        .estimate(DECISION_RECOVERY, EJECT, f.tally, 0.9)
                        .point()
                        .orElseThrow())
                .isCloseTo(0.85, within(1e-15));
        assertThat(estimator
                        .estimate(DECISION_PURITY, EJECT, f.tally, 0.9)
                        .point()
                        .orElseThrow())
                .isCloseTo(0.51 / 0.515, within(1e-15));
    }

    @Test
    void wherePassedIsTheProductWhatIsNotEjectedIsInIt() {
        Fixture f = Fixture.small();
        Duty pass = new Duty("PP kept", List.of("PP"), Duty.Stream.PASSED, EJECT.sorters(), MIX, EJECT.requirements());
        Estimator estimator = new Estimator(f.showings);
        // Ejected are familiar records decided PET: 17 of PET, 1 of PVC. Passed: 3 of 20 of PET, 19 of 20 of PVC, all
        // PP.
        assertThat(estimator.estimate(DECISION_RECOVERY, pass, f.tally, 0.9).point())
                .hasValue(1);
        assertThat(estimator
                        .estimate(DECISION_PURITY, pass, f.tally, 0.9)
                        .point()
                        .orElseThrow())
                .isCloseTo(0.3 / (0.3 + 0.1 * 0.95 + 0.6 * 0.15), within(1e-15));
    }

    @Test
    void theIntervalIsTheOneWorkedByHand() {
        Fixture f = Fixture.small();
        Estimate estimate = new Estimator(f.showings).estimate(DECISION_RECOVERY, EJECT, f.tally, 0.9);
        // z = ±0.5/20, v = 2·(2·0.025²) = 0.0025 on 1 degree of freedom, s = 0.05, t(0.95; 1) = 6.3138, logit 0.85 =
        // 1.7346,
        // reach 6.3138·0.05/(0.85·0.15) = 2.4760: from expit(−0.7414) to expit(4.2106).
        assertThat(estimate.degreesOfFreedom()).hasValue(1);
        assertThat(estimate.lower().orElseThrow()).isCloseTo(0.32271, within(2e-5));
        assertThat(estimate.upper().orElseThrow()).isCloseTo(0.98538, within(2e-5));
        assertThat(estimate.showings()).isEqualTo(6);
        assertThat(estimate.note()).isEmpty();
    }

    @Test
    void strataAddTheirVariances() {
        ClusteredError error = new ClusteredError();
        error.add("a", 1);
        error.add("a", 3);
        error.add("b", 0);
        error.add("b", 0);
        error.add("b", 3);
        // v_a = 2·2 = 4 on 1, v_b = 3/2·6 = 9 on 2: V = 13, degrees of freedom 169/(16 + 40.5).
        assertThat(error.variance()).isCloseTo(13, within(1e-14));
        assertThat(error.degreesOfFreedom(0)).isCloseTo(169 / 56.5, within(1e-14));
    }

    @Test
    void withoutAnErrorTheBoundIsTheRuleOfThreeByShowings() {
        Fixture f = new Fixture();
        for (int i = 0; i < 10; i++) {
            f.showing("avocet", "PET", 100, 0, 0, 0).showing("avocet", "PP", 0, 100, 0, 0);
        }
        Duty duty = Fixture.duty(Duty.Stream.EJECTED, Map.of("PET", 0.5, "PP", 0.5));
        Estimator estimator = new Estimator(f.showings);
        Estimate recovery = estimator.estimate(DECISION_RECOVERY, duty, f.tally, 0.9);
        assertThat(recovery.point()).hasValue(1);
        assertThat(recovery.upper()).hasValue(1);
        assertThat(recovery.lower().orElseThrow()).isCloseTo(1 - StrictMath.log(20) / 10, within(1e-15));
        assertThat(recovery.note()).contains("rule of three");
        Estimate purity = estimator.estimate(DECISION_PURITY, duty, f.tally, 0.9);
        double other = 0.5 * StrictMath.log(20) / 10;
        assertThat(purity.lower().orElseThrow()).isCloseTo(0.5 / (0.5 + other), within(1e-15));
    }

    @Test
    void withoutASuccessTheUpperBoundIsGiven() {
        Fixture f = new Fixture();
        for (int i = 0; i < 10; i++) {
            f.showing("avocet", "PET", 0, 100, 0, 0).showing("avocet", "PP", 10, 90, 0, 0);
        }
        Duty duty = Fixture.duty(Duty.Stream.EJECTED, Map.of("PET", 0.5, "PP", 0.5));
        Estimator estimator = new Estimator(f.showings);
        Estimate recovery = estimator.estimate(DECISION_RECOVERY, duty, f.tally, 0.9);
        assertThat(recovery.lower()).hasValue(0);
        assertThat(recovery.upper().orElseThrow()).isCloseTo(StrictMath.log(20) / 10, within(1e-15));
        double most = 0.5 * StrictMath.log(20) / 10;
        assertThat(estimator
                        .estimate(DECISION_PURITY, duty, f.tally, 0.9)
                        .upper()
                        .orElseThrow())
                .isCloseTo(most / (most + 0.05), within(1e-15));
    }

    @Test
    void whatCannotBeGivenSaysWhy() {
        Fixture f = Fixture.small().showing("curlew", "PET", 10, 0, 0, 0);
        Estimate one = new Estimator(f.showings).estimate(DECISION_RECOVERY, EJECT, f.tally, 0.9);
        assertThat(one.point()).isPresent();
        assertThat(one.lower()).isEmpty();
        assertThat(one.note()).contains("one showing only of PET on curlew");

        Duty more = Fixture.duty(Duty.Stream.EJECTED, Map.of("PET", 0.5, "PA", 0.5));
        Estimate absent = new Estimator(f.showings).estimate(DECISION_RECOVERY, more, f.tally, 0.9);
        assertThat(absent.point()).isEmpty();
        assertThat(absent.note()).contains("no records of PA");

        Fixture nothing = new Fixture().showing("avocet", "PET", 0, 9, 0, 1).showing("avocet", "PET", 0, 10, 0, 0);
        Duty alone = Fixture.duty(Duty.Stream.EJECTED, Map.of("PET", 1.0));
        Estimate unsent = new Estimator(nothing.showings).estimate(DECISION_PURITY, alone, nothing.tally, 0.9);
        assertThat(unsent.note()).isEqualTo("nothing was sent to the product stream");

        Fixture still = new Fixture().showing("avocet", "PET", 9, 1, 0, 0).showing("avocet", "PET", 9, 1, 0, 0);
        Estimate spread = new Estimator(still.showings).estimate(DECISION_RECOVERY, alone, still.tally, 0.9);
        assertThat(spread.lower()).isEmpty();
        assertThat(spread.note()).contains("do not differ");
    }

    @Test
    void sortersOfOtherDutiesDoNotCount() {
        Fixture f = Fixture.small().showing("whimbrel", "PET", 0, 10, 0, 0);
        Estimate estimate = new Estimator(f.showings).estimate(DECISION_RECOVERY, EJECT, f.tally, 0.9);
        assertThat(estimate.point().orElseThrow()).isCloseTo(0.85, within(1e-15));
    }

    @Test
    void differencesAreTakenShowingByShowing() {
        Duty alone = Fixture.duty(Duty.Stream.EJECTED, Map.of("PET", 1.0));
        Fixture ours = new Fixture().showing("avocet", "PET", 90, 10, 0, 0).showing("avocet", "PET", 72, 28, 0, 0);
        Fixture theirs = new Fixture().showing("avocet", "PET", 88, 12, 0, 0).showing("avocet", "PET", 71, 29, 0, 0);
        Estimate estimate =
                new Estimator(ours.showings).difference(DECISION_RECOVERY, alone, ours.tally, theirs.tally, 0.9);
        // 0.02 and 0.01 on two showings: mean 0.015; z = ±0.0025, v = 2·(2·0.0025²), s = 0.005, t(0.95; 1) = 6.3138.
        assertThat(estimate.point().orElseThrow()).isCloseTo(0.015, within(1e-15));
        assertThat(estimate.lower().orElseThrow()).isCloseTo(0.015 - 6.3137515 * 0.005, within(1e-8));
        assertThat(estimate.upper().orElseThrow()).isCloseTo(0.015 + 6.3137515 * 0.005, within(1e-8));

        Estimate same = new Estimator(ours.showings).difference(DECISION_RECOVERY, alone, ours.tally, ours.tally, 0.9);
        assertThat(same.point()).hasValue(0);
        assertThat(same.lower().orElseThrow()).isEqualTo(-1);
        assertThat(same.note()).contains("sent alike");

        Fixture other = new Fixture().showing("avocet", "PET", 90, 10, 0, 0);
        assertThatThrownBy(() ->
                        new Estimator(ours.showings).difference(DECISION_RECOVERY, alone, ours.tally, other.tally, 0.9))
                .hasMessageContaining("same records");
    }
}
