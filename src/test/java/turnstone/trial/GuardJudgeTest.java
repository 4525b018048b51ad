package turnstone.trial;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import turnstone.plant.Duty;
import turnstone.plant.DutyTerms;
import turnstone.plant.Guard;
import turnstone.plant.PpmLimit;
import turnstone.plant.Required;
import turnstone.plant.Requirement;

class GuardJudgeTest {
    private static final Map<String, Double> MIX = Map.of("PET", 0.6, "PP", 0.4);

    private static Guard guard(Guard.Kind kind, double limit, Requirement.Bound bound) {
        return new Guard(kind, limit, bound, 0.95);
    }

    private static Guard guard(Guard.Kind kind, double limit) {
        return guard(kind, limit, Requirement.Bound.POINT);
    }

    private static Verdict verdict(
            NightFacts facts, Optional<String> inService, List<PpmLimit> limits, Guard... guards) {
        DutyTerms usual = DutyTerms.standard();
        Duty duty = Fixture.duty(Duty.Stream.EJECTED, MIX)
                .with(new DutyTerms(
                        Map.of(),
                        Optional.of(new DutyTerms.Costs(100, 50)),
                        usual.required(),
                        usual.cut(),
                        usual.gain(),
                        List.of(guards),
                        limits));
        Fixture ours = Fixture.fleet(2, new long[] {0, 1, 3, 0, 2}, 5);
        Fixture theirs = Fixture.fleet(4, new long[] {0, 1, 2, 1, 1, 0, 2}, 5);
        TrialResult.Builder result = TrialResult.of("c0ffee", inService)
                .showings(ours.showings)
                .facts(facts)
                .tally(TrialForm.THIS_FLEET, Side.CANDIDATE, ours.tally);
        if (inService.isPresent()) {
            result.tally(TrialForm.THIS_FLEET, Side.IN_SERVICE, theirs.tally);
        }
        return Judge.verdict(result.build(), List.of(duty));
    }

    private static List<RequirementResult> guards(Verdict verdict) {
        List<RequirementResult> list = new ArrayList<>(verdict.duties().get(0).requirements());
        list.removeIf(one -> !one.name().startsWith("guard"));
        return list;
    }

    @Test
    void factsAreHeldAgainstTheirSideOfTheLimit() {
        NightFacts facts = NightFacts.none()
                .with(Guard.Kind.QUARANTINED_SHARE, 0.03)
                .with(Guard.Kind.RECIPROCAL_CONDITION, 1e-9)
                .with(Guard.Kind.DAYS_SINCE_RELEASE, 2);
        Verdict verdict = verdict(
                facts,
                Optional.of("f00d"),
                List.of(),
                guard(Guard.Kind.QUARANTINED_SHARE, 0.02),
                guard(Guard.Kind.RECIPROCAL_CONDITION, 1e-12),
                guard(Guard.Kind.DAYS_SINCE_RELEASE, 3),
                guard(Guard.Kind.SHOWINGS, 120));
        assertThat(guards(verdict)).extracting(RequirementResult::met).containsExactly(false, true, false, true);
        assertThat(verdict.decision()).isEqualTo(Decision.HOLD);
        // A day of three is missed by a third, the quarantine by one point.
        assertThat(verdict.mainReason()).isEqualTo("PET out: guard: days since release is 2 days, required 3 days");
        assertThat(verdict.text())
                .contains("found 3.00 %, required at most 2.00 %, margin -1.00 points (point)")
                .contains("astray, candidate: ");
    }

    @Test
    void whatTheNightDidNotFindOutHoldsAndSaysWhatWouldLetItBeJudged() {
        Verdict verdict =
                verdict(NightFacts.none(), Optional.of("f00d"), List.of(), guard(Guard.Kind.BOARD_LOSS, 0.002));
        assertThat(verdict.decision()).isEqualTo(Decision.HOLD);
        assertThat(verdict.mainReason())
                .contains("guard: board loss could not be judged")
                .contains("integer form");
        assertThatThrownBy(() -> NightFacts.none().with(Guard.Kind.SORTER_LOSS, 0))
                .hasMessageContaining("judged from tallies");
    }

    @Test
    void aLossIsHeldAtItsUpperBoundAndTheWorstSorterIsNamed() {
        Verdict verdict = verdict(
                NightFacts.none(),
                Optional.of("f00d"),
                List.of(),
                guard(Guard.Kind.SORTER_LOSS, 0.03, Requirement.Bound.LOWER),
                guard(Guard.Kind.PURITY_LOSS, 0.0001, Requirement.Bound.LOWER));
        RequirementResult sorter = guards(verdict).get(0);
        assertThat(sorter.name()).isEqualTo("guard: sorter loss, upper bound");
        assertThat(sorter.met()).isTrue();
        assertThat(sorter.why()).startsWith("on ");
        RequirementResult purity = guards(verdict).get(1);
        assertThat(purity.met()).isFalse();
        assertThat(purity.bound()).isEqualTo("one-sided 95 % upper bound");
        Verdict alone = verdict(NightFacts.none(), Optional.empty(), List.of(), guard(Guard.Kind.SORTER_LOSS, 0.03));
        assertThat(alone.decision()).isEqualTo(Decision.RELEASE);
    }

    @Test
    void aLimitIsAReportUnlessTheDutyMakesItARequirement() {
        PpmLimit report = new PpmLimit("PP", 50, PpmLimit.Use.REPORT, 0.95);
        Verdict shown = verdict(NightFacts.none(), Optional.of("f00d"), List.of(report));
        assertThat(shown.decision()).isEqualTo(Decision.RELEASE);
        assertThat(shown.text().replaceAll("\\s+", " ")).contains("PP in the product: by showings alone no more than ");
        assertThat(shown.json()
                        .path("duties")
                        .path(0)
                        .path("limits")
                        .path(0)
                        .path("nights")
                        .asInt())
                .isEqualTo(5);
        PpmLimit required = new PpmLimit("PP", 50, PpmLimit.Use.REQUIREMENT, 0.95);
        Verdict held = verdict(NightFacts.none(), Optional.of("f00d"), List.of(required));
        assertThat(held.mainReason())
                .contains("limit: PP in the product could not be judged")
                .contains("needs 2 more nights");
    }

    @Test
    void aDutyThatFixesAFigureIsNotComparedWithoutScores() {
        Fixture ours = Fixture.fleet(2, new long[] {0, 1, 3, 0, 2}, 5);
        Duty duty = Fixture.duty(Duty.Stream.EJECTED, MIX)
                .with(DutyTerms.standard().requiring(new Required(Requirement.Figure.DECISION_PURITY, 0.95)));
        TrialResult.Builder result = TrialResult.of("c0ffee", Optional.of("f00d"))
                .showings(ours.showings)
                .tally(TrialForm.THIS_FLEET, Side.CANDIDATE, ours.tally)
                .tally(TrialForm.THIS_FLEET, Side.IN_SERVICE, ours.tally);
        assertThat(Judge.verdict(result.build(), List.of(duty)).mainReason()).contains("scores were not binned");
        DrawnPlant plant = new DrawnPlant(3, 6);
        plant.gain(0.03);
        DrawnPlant.Nights nights = plant.show(5, 4, 40);
        Verdict verdict = Judge.verdict(
                TrialResult.of("c0ffee", Optional.of("f00d"))
                        .showings(nights.showings)
                        .scores("PET out", TrialForm.THIS_FLEET, Side.CANDIDATE, nights.candidate)
                        .scores("PET out", TrialForm.THIS_FLEET, Side.IN_SERVICE, nights.inService)
                        .cut("PET out", TrialForm.THIS_FLEET, Side.CANDIDATE, ScoreBins.NEAREST + 3)
                        .build(),
                List.of(plant.duty));
        assertThat(verdict.decision()).as(verdict.text()).isEqualTo(Decision.RELEASE);
        assertThat(verdict.duties().get(0).requirements().get(0).name())
                .startsWith("gain in decision recovery at purity 9");
        assertThat(verdict.duties().get(0).figures()).hasSize(2);
    }
}
