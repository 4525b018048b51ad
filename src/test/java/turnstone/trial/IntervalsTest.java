package turnstone.trial;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;
import static turnstone.plant.Requirement.Figure.DECISION_PURITY;
import static turnstone.plant.Requirement.Figure.DECISION_RECOVERY;
import static turnstone.plant.Requirement.Reach.MACHINES_LIKE_THESE;
import static turnstone.plant.Requirement.Reach.ONE_NEW_MACHINE;

import java.util.HashMap;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.Test;
import turnstone.plant.Duty;
import turnstone.plant.DutyTerms;
import turnstone.plant.GainRule;
import turnstone.plant.PpmLimit;

/** Intervals worked by hand. Quantiles of Student's law and Clopper–Pearson bounds from printed tables, from memory. */
class IntervalsTest {
    private static final Duty PET_ALONE = Fixture.duty(Duty.Stream.EJECTED, Map.of("PET", 1.0));
    private static final List<String> SORTERS = List.of("avocet", "curlew", "dunlin", "godwit", "knot", "plover");

    /** One showing on each sorter with these records of 100 sent. */
    private static Fixture sent(long... sent) {
        Fixture fixture = new Fixture();
        for (int s = 0; s < sent.length; s++) {
            fixture.showing(SORTERS.get(s), "PET", sent[s], 100 - sent[s], 0, 0);
        }
        return fixture;
    }

    private static Map<String, TrialShowing> byId(Fixture fixture) {
        Map<String, TrialShowing> map = new HashMap<>();
        fixture.showings.forEach(showing -> map.put(showing.showing(), showing));
        return map;
    }

    @Test
    void machinesLikeTheseAreClusteredBySorter() {
        Fixture f = sent(80, 90, 90, 100);
        Estimate estimate =
                new Estimator(f.showings).estimate(DECISION_RECOVERY, MACHINES_LIKE_THESE, PET_ALONE, f.tally, 0.90);
        // z = ∓10/400: s² = 4/3·2·0.025², s = 0.040825; t(0.95; 3) = 2.3534; reach 2.3534·0.040825/0.09 = 1.06752 about
        // logit 0.9 = 2.19722.
        assertThat(estimate.point()).hasValue(0.9);
        assertThat(estimate.degreesOfFreedom()).hasValue(3);
        assertThat(estimate.lower().orElseThrow()).isCloseTo(1 / (1 + Math.exp(-1.12970)), within(2e-5));
        assertThat(estimate.upper().orElseThrow()).isCloseTo(1 / (1 + Math.exp(-3.26474)), within(2e-5));
    }

    @Test
    void aNewMachineIsPredictedFromTheSpreadOfLogits() {
        Fixture f = sent(80, 80, 80, 90, 90, 90);
        Estimate estimate =
                new Estimator(f.showings).estimate(DECISION_RECOVERY, ONE_NEW_MACHINE, PET_ALONE, f.tally, 0.90);
        // Logits of 80.5/101 and 90.5/101; their half difference h, s = h·√(6/5), t(0.95; 5) = 2.0150.
        double low = Math.log(80.5 / 20.5);
        double high = Math.log(90.5 / 10.5);
        double reach = 2.015048 * (high - low) / 2 * Math.sqrt(6 / 5.0) * Math.sqrt(1 + 1 / 6.0);
        double middle = (low + high) / 2;
        assertThat(estimate.lower().orElseThrow()).isCloseTo(1 / (1 + Math.exp(reach - middle)), within(1e-7));
        assertThat(estimate.upper().orElseThrow()).isCloseTo(1 / (1 + Math.exp(-reach - middle)), within(1e-7));
    }

    @Test
    void withTooFewSortersNothingIsGiven() {
        Fixture three = sent(80, 90, 85);
        assertThat(new Estimator(three.showings)
                        .estimate(DECISION_RECOVERY, MACHINES_LIKE_THESE, PET_ALONE, three.tally, 0.90)
                        .note())
                .isEqualTo("PET was shown on 3 sorters, 4 are needed");
        Fixture five = sent(80, 90, 85, 90, 80);
        Estimate none =
                new Estimator(five.showings).estimate(DECISION_RECOVERY, ONE_NEW_MACHINE, PET_ALONE, five.tally, 0.90);
        assertThat(none.point()).isEmpty();
        assertThat(none.note()).isEqualTo("PET was shown on 5 sorters, 6 are needed");
        Fixture one = sent(80, 90, 85, 90, 80).showing("avocet", "PP", 1, 99, 0, 0);
        Duty both = Fixture.duty(Duty.Stream.EJECTED, Map.of("PET", 0.5, "PP", 0.5));
        assertThat(new Estimator(one.showings)
                        .estimate(DECISION_PURITY, MACHINES_LIKE_THESE, both, one.tally, 0.90)
                        .note())
                .isEqualTo("PP was shown on 1 sorter, 4 are needed");
    }

    @Test
    void anUncertainMixWidensPurityAndNotTheRecoveryOfOneTarget() {
        Fixture f = Fixture.fleet(2, new long[] {0, 1, 3, 0, 2});
        Duty sure = Fixture.duty(Duty.Stream.EJECTED, Map.of("PET", 0.6, "PP", 0.4));
        DutyTerms usual = DutyTerms.standard();
        Duty unsure = sure.with(new DutyTerms(
                Map.of("PP", 0.1),
                usual.costs(),
                usual.required(),
                usual.cut(),
                usual.gain(),
                usual.guards(),
                usual.limits()));
        Estimator estimator = new Estimator(f.showings);
        Estimate narrow = estimator.estimate(DECISION_PURITY, sure, f.tally, 0.9);
        Estimate wide = estimator.estimate(DECISION_PURITY, unsure, f.tally, 0.9);
        assertThat(wide.point()).isEqualTo(narrow.point());
        assertThat(wide.lower().orElseThrow()).isLessThan(narrow.lower().orElseThrow());
        assertThat(wide.degreesOfFreedom().orElseThrow())
                .isGreaterThan(narrow.degreesOfFreedom().orElseThrow());
        assertThat(estimator.estimate(DECISION_RECOVERY, unsure, f.tally, 0.9))
                .isEqualTo(estimator.estimate(DECISION_RECOVERY, sure, f.tally, 0.9));
    }

    @Test
    void theGainRestsOnTheSpreadBetweenBlocks() {
        Fixture ours = sent(92, 91, 90, 93, 91, 89);
        Fixture theirs = sent(90, 90, 90, 90, 90, 90);
        Gain gain = GainEstimator.ofTallies(PET_ALONE, ours.tally, theirs.tally, byId(ours));
        // Blocks of equal size: 2, 1, 0, 3, 1, −1 points; mean 1, deviation √2, over √6; t(0.95; 5) = 2.0150.
        double error = Math.sqrt(2 / 6.0) / 100;
        assertThat(gain.point().orElseThrow()).isCloseTo(0.01, within(1e-14));
        assertThat(gain.standardError().orElseThrow()).isCloseTo(error, within(1e-13));
        assertThat(gain.lower().orElseThrow()).isCloseTo(0.01 - 2.015048 * error, within(1e-8));
        assertThat(gain.blocks()).isEqualTo(6);
        // t(B − 1)·√2/√B falls under 1 from B = 8 on (1.895·0.5 = 0.947; at 7: 1.943·0.5345 = 1.04): the second night.
        assertThat(gain.nightsFor(0)).hasValue(2);
        assertThat(gain.nightsFor(0.02)).isEmpty();
        // P(T > 2.015 − 0.01/error), which is 2.015 − 1.732: about 0.39 for 5 degrees of freedom.
        assertThat(gain.power(0.01).orElseThrow()).isCloseTo(0.394, within(0.002));
    }

    @Test
    void aLimitInPartsPerMillionSaysWhatTheShowingsSupport() {
        Fixture f = new Fixture();
        for (int k = 0; k < 20; k++) {
            f.showing("avocet", "PET", 100, 0, 0, 0);
            f.showing("avocet", "PP", 0, 150, 0, 0);
        }
        Duty duty = Fixture.duty(Duty.Stream.EJECTED, Map.of("PET", 0.5, "PP", 0.5));
        Sendings sendings = Sendings.of(duty, f.tally, byId(f));
        PpmLimit limit = new PpmLimit("PP", 50, PpmLimit.Use.REPORT, 0.95);
        PpmBound bound = PpmBound.of(limit, sendings, 7);
        // None of 3000/1.5 = 2000: 1 − 0.05^(1/2000); none of 20 showings: 1 − 0.05^(1/20) = 0.1391.
        double share = 1 - Math.pow(0.05, 1 / 2000.0);
        assertThat(bound.designEffect()).hasValue(1.5);
        assertThat(bound.byRecords_ppm().orElseThrow()).isCloseTo(1e6 * share / (1 + share), within(1e-3));
        assertThat(bound.byShowings_ppm()).isCloseTo(1e6 * 0.139108 / 1.139108, within(2.0));
        // −ln 0.05/50e-6 = 59915 records of the smaller number, 1.5 times as many, 150 to a showing: 599.1, less 20.
        assertThat(bound.moreShowings()).isBetween(579L, 580L);
        assertThat(bound.text())
                .startsWith("PP in the product: no more than 1495 ppm shown; 50 ppm needs about 5")
                .contains("more showings without error; by showings alone no more than 1221");
        PpmBound early = PpmBound.of(limit, sendings, 3);
        assertThat(early.byRecords_ppm()).isEmpty();
        assertThat(early.text()).contains("needs 4 more nights");
    }

    @Test
    void errorsThatComeByShowingCountForMore() {
        Fixture f = new Fixture();
        for (int k = 0; k < 20; k++) {
            f.showing("avocet", "PET", 100, 0, 0, 0);
            f.showing("avocet", "PP", k == 0 ? 20 : 0, k == 0 ? 80 : 100, 0, 0);
        }
        Duty duty = Fixture.duty(Duty.Stream.EJECTED, Map.of("PET", 0.5, "PP", 0.5));
        PpmBound bound =
                PpmBound.of(new PpmLimit("PP", 50, PpmLimit.Use.REPORT, 0.95), Sendings.of(duty, f.tally, byId(f)), 7);
        // p = 0.01: Σ(x − 1)² = 19² + 19 = 380, times 20/19 = 400, over 2000·0.01·0.99 = 19.8.
        assertThat(bound.designEffect().orElseThrow()).isCloseTo(400 / 19.8, within(1e-12));
    }

    @Test
    void aCloudOfResamplesIsTheSameForTheSameSeedAndAsWideAsTheError() {
        Fixture f = Fixture.fleet(2, new long[] {0, 1, 3, 0, 2});
        Sendings sendings = Sendings.of(PET_ALONE, f.tally, byId(f));
        double[] cloud = Resamples.of(DECISION_RECOVERY, sendings, 4000, 7);
        assertThat(Resamples.of(DECISION_RECOVERY, sendings, 4000, 7)).isEqualTo(cloud);
        double mean = 0;
        double squares = 0;
        for (double value : cloud) {
            mean += value / cloud.length;
        }
        for (double value : cloud) {
            squares += (value - mean) * (value - mean) / cloud.length;
        }
        ClusteredError error = new ClusteredError();
        sendings.parts().get(0).showings().forEach(s -> error.add(s.sorter(), s.sent() / 2400.0));
        assertThat(Math.sqrt(squares)).isCloseTo(Math.sqrt(error.variance()), within(3e-4));
        assertThat(GainRule.standard().days()).isEqualTo(5);
    }
}
