package turnstone.trial;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import turnstone.plant.Duty;
import turnstone.plant.DutyTerms;
import turnstone.plant.GainRule;
import turnstone.plant.Required;
import turnstone.plant.Requirement;

class FrontierTest {
    private static final Map<String, Double> MIX = Map.of("PET", 0.5, "PP", 0.5);
    private final List<TrialShowing> showings = new ArrayList<>();
    private final ScoreHistogram histogram = ScoreHistogram.empty();

    private static Duty duty(Duty.Stream stream, DutyTerms.CutRule rule, Requirement.Figure figure, double share) {
        DutyTerms terms = new DutyTerms(
                Map.of(),
                Optional.empty(),
                Optional.of(new Required(figure, share)),
                rule,
                GainRule.standard(),
                List.of(),
                List.of());
        return Fixture.duty(stream, MIX).with(terms);
    }

    private String show(int day, String sorter, String material) {
        String id = "s" + (100 + showings.size());
        showings.add(new TrialShowing(id, LocalDate.of(2026, 3, day), sorter, sorter, material + "-1", 1, material));
        return id;
    }

    /** PET: 10 records in the bin below 0, 80 in that from 0, 10 in that from 1/8; PP: 90, 8, 2; one PET unfamiliar of 100 more. */
    private void small() {
        String pet = show(1, "avocet", "PET");
        String pp = show(1, "avocet", "PP");
        int at = ScoreBins.NEAREST;
        histogram.add(pet, "PET", at - 1, 10);
        histogram.add(pet, "PET", at, 70);
        histogram.add(pet, "PET", at + 1, 10);
        histogram.addUnfamiliar(pet, "PET", 6);
        histogram.addNoSignal(pet, "PET", 4);
        histogram.add(pp, "PP", at - 1, 90);
        histogram.add(pp, "PP", at, 8);
        histogram.add(pp, "PP", at + 1, 2);
    }

    @Test
    void purityAndRecoveryFollowTheCut() {
        small();
        Frontier frontier = Frontier.of(Fixture.duty(Duty.Stream.EJECTED, MIX), histogram, showings);
        // Unfamiliar and no signal stay in the denominators: 80 of 100 of PET, 10 of 100 of PP from 0 on.
        assertThat(frontier.at(ScoreBins.NEAREST).recovery()).isCloseTo(0.80, within(1e-15));
        assertThat(frontier.at(ScoreBins.NEAREST).purity()).isCloseTo(80 / 90.0, within(1e-15));
        assertThat(frontier.at(ScoreBins.NEAREST + 1).recovery()).isCloseTo(0.10, within(1e-15));
        assertThat(frontier.at(0).recovery()).isCloseTo(0.90, within(1e-15));
        assertThat(frontier.at(ScoreBins.COUNT).purity()).isNaN();
    }

    @Test
    void atARequiredPurityTheRecordsOfABinAreSpreadEvenly() {
        small();
        Frontier frontier = Frontier.of(Fixture.duty(Duty.Stream.EJECTED, MIX), histogram, showings);
        // Between the cuts at −1/8 (90 and 100 sent) and 0 (80 and 10): (80 + 10f)/(90 + 100f) = 0.8, f = 8/70.
        assertThat(frontier.recoveryAtPurity(0.8).orElseThrow()).isCloseTo((80 + 80 / 70.0) / 100, within(1e-12));
        assertThat(frontier.loosestOfPurity(0.8)).hasValue(ScoreBins.NEAREST);
        assertThat(frontier.recoveryAtPurity(0.95)).isEmpty();
        // Recovery 0.45 is half way between 80 and 10: other mass half way between 10 and 2.
        assertThat(frontier.purityAtRecovery(0.45).orElseThrow()).isCloseTo(45 / 51.0, within(1e-12));
        assertThat(frontier.tightestOfRecovery(0.45)).hasValue(ScoreBins.NEAREST);
        assertThat(frontier.purityAtRecovery(0.95)).isEmpty();
    }

    @Test
    void theFileHasTheCutsWhereFiguresChange() {
        small();
        Frontier frontier = Frontier.of(Fixture.duty(Duty.Stream.EJECTED, MIX), histogram, showings);
        assertThat(frontier.json().toString())
                .startsWith(
                        "{\"frontier\":[[0,0.4736842105263158,0.9],[289,0.888888888888889,0.8],[290,0.8333333333333333,0.1")
                .endsWith("],[291,null,0.0]]}");
    }

    @Test
    void wherePassedIsTheProductTheCutWorksTheOtherWay() {
        small();
        Frontier frontier = Frontier.of(Fixture.duty(Duty.Stream.PASSED, MIX), histogram, showings);
        // The scores are now those of ejecting PP: from 0 on 80 of PET are ejected, 20 pass, and 90 of PP pass.
        assertThat(frontier.at(ScoreBins.NEAREST).recovery()).isCloseTo(0.20, within(1e-15));
        assertThat(frontier.at(ScoreBins.NEAREST).purity()).isCloseTo(20 / 110.0, within(1e-15));
        assertThat(frontier.points().get(0).recovery()).isEqualTo(1);
        assertThat(frontier.recoveryAtPurity(0.5)).hasValue(1);
    }

    @Test
    void aCutNeedsThreeDaysBeforeThoseItIsJudgedOn() {
        Duty duty = duty(Duty.Stream.EJECTED, DutyTerms.CutRule.POINT, Requirement.Figure.DECISION_PURITY, 0.85);
        days(2);
        CutChoice early = CutChoice.of(duty, histogram, showings, LocalDate.of(2026, 3, 20));
        assertThat(early.cut()).isEmpty();
        assertThat(early.note()).isEqualTo("1 more days before 2026-03-20 are needed to set a cut");
        days(1);
        assertThat(CutChoice.of(duty, histogram, showings, LocalDate.of(2026, 3, 20))
                        .cut())
                .hasValue(ScoreBins.NEAREST);
        assertThat(CutChoice.of(duty, histogram, showings, LocalDate.of(2026, 3, 3))
                        .cut())
                .isEmpty();
    }

    @Test
    void aCutByTheLowerEndIsTighterAndOneForRecoveryLooser() {
        days(4);
        LocalDate judged = LocalDate.of(2026, 3, 20);
        Duty point = duty(Duty.Stream.EJECTED, DutyTerms.CutRule.POINT, Requirement.Figure.DECISION_PURITY, 0.868);
        Duty lower = duty(Duty.Stream.EJECTED, DutyTerms.CutRule.LOWER, Requirement.Figure.DECISION_PURITY, 0.868);
        assertThat(CutChoice.of(point, histogram, showings, judged).cut()).hasValue(ScoreBins.NEAREST);
        assertThat(CutChoice.of(lower, histogram, showings, judged).cut()).hasValue(ScoreBins.NEAREST + 1);
        Duty recovery = duty(Duty.Stream.EJECTED, DutyTerms.CutRule.LOWER, Requirement.Figure.DECISION_RECOVERY, 0.799);
        assertThat(CutChoice.of(recovery, histogram, showings, judged).cut()).hasValue(ScoreBins.NEAREST - 1);
    }

    private int day;

    private void days(int more) {
        for (int i = 0; i < more; i++) {
            day++;
            for (int k = 0; k < 2; k++) {
                String pet = show(day, "avocet", "PET");
                String pp = show(day, "avocet", "PP");
                int at = ScoreBins.NEAREST;
                histogram.add(pet, "PET", at - 1, 20 - 5L * k);
                histogram.add(pet, "PET", at, 8 + 4L * k);
                histogram.add(pet, "PET", at + 1, 70);
                histogram.addNoSignal(pet, "PET", 2L + k);
                histogram.add(pp, "PP", at - 1, 86 + 4L * k);
                histogram.add(pp, "PP", at, 8 - 2L * k);
                histogram.add(pp, "PP", at + 1, 6 - 2L * k);
            }
        }
    }
}
