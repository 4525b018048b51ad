package turnstone.trial;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import com.fasterxml.jackson.databind.JsonNode;
import java.time.LocalDate;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import turnstone.plant.Duty;
import turnstone.plant.Requirement;

class JudgeTest {
    private static final Map<String, Double> MIX = Map.of("PET", 0.6, "PP", 0.4);
    private static final long[] PATTERN = {0, 1, 3, 0, 2};
    private static final String CANDIDATE = "c0ffee00".repeat(8);
    private static final String IN_SERVICE = "0ddba11a".repeat(8);
    private final Fixture good = Fixture.fleet(2, PATTERN);
    private final Fixture worse = Fixture.fleet(5, PATTERN);

    private static Duty duty(Requirement... requirements) {
        return Fixture.duty(Duty.Stream.EJECTED, MIX, requirements);
    }

    private static TrialResult.Builder result(Optional<String> inService, Fixture candidate) {
        return TrialResult.of(CANDIDATE, inService)
                .showings(candidate.showings)
                .tally(TrialForm.THIS_FLEET, Side.CANDIDATE, candidate.tally);
    }

    private static Verdict verdict(TrialResult result, Duty... duties) {
        return Judge.verdict(result, List.of(duties));
    }

    @Test
    void absoluteFiguresAreOfTheNewestDayAlone() {
        LocalDate earlier = LocalDate.of(2026, 3, 12);
        Fixture twoDays = Fixture.small()
                .showing(earlier, "avocet", "PET", 1, 9, 0, 0)
                .showing(earlier, "avocet", "PVC", 9, 1, 0, 0)
                .showing(earlier, "avocet", "PP", 9, 1, 0, 0);
        Duty duty =
                duty(Fixture.purity(0.10, Requirement.Bound.POINT), Fixture.recovery(0.10, Requirement.Bound.POINT));
        JsonNode tonight =
                verdict(result(Optional.empty(), Fixture.small()).build(), duty).json();
        JsonNode both = verdict(result(Optional.empty(), twoDays).build(), duty).json();
        assertThat(both.path("days")).hasSize(2);
        assertThat(both.path("duties")).isEqualTo(tonight.path("duties"));
        // 17 of 20 records of PET, by hand from the fixture; the mix's share goes in and out again, two roundings.
        assertThat(both.at("/duties/0/requirements/1/found").doubleValue()).isCloseTo(0.85, within(1e-15));
    }

    @Test
    void withNothingInServiceThePlantsRequirementsDecideAlone() {
        Duty duty =
                duty(Fixture.purity(0.95, Requirement.Bound.LOWER), Fixture.recovery(0.95, Requirement.Bound.POINT));
        Verdict verdict = verdict(result(Optional.empty(), good).build(), duty);
        assertThat(verdict.decision()).isEqualTo(Decision.RELEASE);
        JsonNode json = verdict.json();
        assertThat(json.path("inService").isNull()).isTrue();
        assertThat(json.path("restsOn").asText()).contains("requirements alone");
        assertThat(json.path("duties").path(0).path("requirements")).hasSize(2);
        assertThat(verdict.text())
                .startsWith("RELEASE\n")
                .contains("in service  nothing")
                .contains("The verdict rests on the plant's requirements alone: nothing is in service");
    }

    @Test
    void theFileHasTheKeysThatOtherProgramsRelyOn() {
        Duty duty = duty(Fixture.purity(0.95, Requirement.Bound.LOWER));
        TrialResult result = result(Optional.of(IN_SERVICE), good)
                .tally(TrialForm.THIS_FLEET, Side.IN_SERVICE, good.tally)
                .build();
        JsonNode json = verdict(result, duty).json();
        assertThat(json.fieldNames())
                .toIterable()
                .contains("verdict", "duties", "showings", "days", "candidate", "inService");
        assertThat(json.path("verdict").asText()).isIn("release", "hold");
        assertThat(json.path("showings").asInt()).isEqualTo(48);
        assertThat(json.path("days").path(0).asText()).isEqualTo("2026-03-13");
        assertThat(json.path("candidate").asText()).isEqualTo(CANDIDATE);
        assertThat(json.path("inService").asText()).isEqualTo(IN_SERVICE);
        JsonNode first = json.path("duties").path(0);
        assertThat(first.fieldNames()).toIterable().contains("name", "verdict", "mainReason", "requirements");
        assertThat(first.path("requirements").path(0).fieldNames())
                .toIterable()
                .containsExactly("name", "found", "required", "bound", "margin", "met");
        assertThat(first.path("requirements").path(0).path("bound").asText())
                .isEqualTo("lower end of the 90 % interval");
    }

    @Test
    void aMissedRequirementHoldsAndIsTheMainReason() {
        Duty duty =
                duty(Fixture.purity(0.90, Requirement.Bound.POINT), Fixture.recovery(0.99, Requirement.Bound.POINT));
        Verdict verdict = verdict(result(Optional.empty(), good).build(), duty);
        assertThat(verdict.decision()).isEqualTo(Decision.HOLD);
        // 24 showings of PET lose 2 and 0, 1, 3, 0, 2 in turn: 48 + 28 of 2400.
        assertThat(verdict.mainReason())
                .isEqualTo("PET out: decision recovery, tray not seen, point is 96.83 %, required 99.00 %");
        assertThat(verdict.text())
                .contains("margin -2.17 points")
                .contains("lock-out")
                .contains("hand sort");
        assertThat(verdict.text().lines()).allMatch(line -> line.length() <= 80);
    }

    @Test
    void oneNightShowsNoGainAndSaysHowManyMoreItNeeds() {
        TrialResult result = result(Optional.of(IN_SERVICE), good)
                .tally(TrialForm.THIS_FLEET, Side.IN_SERVICE, Fixture.fleet(3, new long[] {0, 1, 2, 1, 1}).tally)
                .build();
        Verdict verdict = verdict(result, duty(Fixture.recovery(0.80, Requirement.Bound.POINT)));
        assertThat(verdict.decision()).isEqualTo(Decision.HOLD);
        assertThat(verdict.mainReason())
                .startsWith("PET out: gain in decision recovery, lower bound could not be judged: "
                        + "not shown: needs about 4 more nights; found 1 day, 6 sorters and 24 showings")
                .contains("required 5 days, 6 sorters and 120 showings; so far +");
        assertThat(verdict.duties().get(0).requirements().get(1).outcome())
                .isEqualTo(RequirementResult.Outcome.NOT_JUDGED);
        assertThat(verdict.text())
                .contains("candidate   c0ffee00c0ff")
                .contains("in service  0ddba11a0ddb")
                .contains("this fleet, candidate")
                .contains("this fleet, in service");
    }

    private static Verdict fiveNights(long lost, long rivalLost, Requirement... requirements) {
        Fixture ours = Fixture.fleet(lost, PATTERN, 5);
        Fixture theirs = Fixture.fleet(rivalLost, new long[] {0, 1, 2, 1, 1, 0, 2}, 5);
        TrialResult result = result(Optional.of(IN_SERVICE), ours)
                .tally(TrialForm.THIS_FLEET, Side.IN_SERVICE, theirs.tally)
                .build();
        return verdict(result, duty(requirements));
    }

    @Test
    void fiveNightsShowAGainAndSayWhatPowerTheyHad() {
        Verdict verdict = fiveNights(2, 4, Fixture.recovery(0.80, Requirement.Bound.POINT));
        assertThat(verdict.decision()).as(verdict.text()).isEqualTo(Decision.RELEASE);
        RequirementResult gain = verdict.duties().get(0).requirements().get(1);
        assertThat(gain.name()).isEqualTo("gain in decision recovery, lower bound");
        assertThat(gain.required()).isZero();
        assertThat(gain.bound()).isEqualTo("one-sided 95 % lower bound");
        assertThat(gain.why()).contains("5 nights of 6 sorters show a true gain of +1.00 points ");
        assertThat(verdict.mainReason()).startsWith("PET out: all 2 requirements are met; closest: ");
        assertThat(verdict.json()
                        .path("duties")
                        .path(0)
                        .path("requirements")
                        .path(1)
                        .path("met")
                        .asBoolean(false))
                .isTrue();
    }

    @Test
    void aLossIsNoGain() {
        Verdict verdict = fiveNights(5, 2);
        assertThat(verdict.decision()).isEqualTo(Decision.HOLD);
        assertThat(verdict.mainReason())
                .startsWith("PET out: gain in decision recovery, lower bound is -3.")
                .contains(" points, required above 0.00 points; no gain was found; found -3.");
        assertThat(verdict.text().lines()).allMatch(line -> line.length() <= 80);
    }

    @Test
    void sortersWithoutShowingsAreNamed() {
        Fixture alone = new Fixture()
                .showing("avocet", "PET", 90, 10, 0, 0)
                .showing("avocet", "PET", 91, 9, 0, 0)
                .showing("curlew", "PP", 0, 99, 0, 0)
                .showing("curlew", "PP", 1, 99, 0, 0);
        Verdict verdict = verdict(
                result(Optional.of(IN_SERVICE), alone)
                        .tally(TrialForm.THIS_FLEET, Side.IN_SERVICE, alone.tally)
                        .build(),
                duty());
        assertThat(verdict.duties().get(0).notes())
                .containsExactly("half of the duty's sorters or more: no showing on dunlin, godwit, knot, plover;"
                        + " nothing here speaks for what was not shown");
        assertThat(verdict.mainReason())
                .contains(
                        "needs 4 more sorters; found 1 day, 2 sorters and 2 showings of the material with the fewest");
        assertThat(verdict.json().path("duties").path(0).path("notes")).hasSize(1);
    }

    @Test
    void theSameDecisionsAreNoGain() {
        Fixture ours = Fixture.fleet(2, PATTERN, 5);
        TrialResult result = result(Optional.of(IN_SERVICE), ours)
                .tally(TrialForm.THIS_FLEET, Side.IN_SERVICE, Fixture.fleet(2, PATTERN, 5).tally)
                .build();
        Verdict verdict = verdict(result, duty());
        RequirementResult gain = verdict.duties().get(0).requirements().get(0);
        assertThat(gain.found()).hasValue(0);
        assertThat(gain.met()).isFalse();
    }

    @Test
    void aMissIsAFirmerReasonThanWhatCouldNotBeJudged() {
        // Five more records lost on every showing: the paired difference has no spread to make an interval of.
        TrialResult result = result(Optional.of(IN_SERVICE), worse)
                .tally(TrialForm.THIS_FLEET, Side.IN_SERVICE, good.tally)
                .build();
        Verdict verdict = verdict(result, duty(Fixture.recovery(0.95, Requirement.Bound.POINT)));
        assertThat(verdict.mainReason()).contains("point is 93.83 %, required 95.00 %");
        assertThat(verdict.duties().get(0).requirements().get(1).outcome())
                .isEqualTo(RequirementResult.Outcome.NOT_JUDGED);
    }

    @Test
    void aMaterialWhoseTraysLieInOneGroupHolds() {
        TrialResult result = result(Optional.empty(), good).oneGroupOnly("PP").build();
        Verdict verdict = verdict(result, duty(Fixture.recovery(0.5, Requirement.Bound.POINT)));
        assertThat(verdict.decision()).isEqualTo(Decision.HOLD);
        assertThat(verdict.mainReason()).contains("PP was not tried: all its trays lie in one group");
        JsonNode requirement =
                verdict.json().path("duties").path(0).path("requirements").path(0);
        assertThat(requirement.path("met").asBoolean(true)).isFalse();
        assertThat(requirement.path("found").isNull()).isTrue();
        assertThat(requirement.path("margin").isNull()).isTrue();
        assertThat(requirement.path("why").asText()).contains("two groups or more");
        TrialResult elsewhere =
                result(Optional.empty(), good).oneGroupOnly("PA").build();
        assertThat(verdict(elsewhere, duty(Fixture.recovery(0.5, Requirement.Bound.POINT)))
                        .decision())
                .isEqualTo(Decision.RELEASE);
    }

    @Test
    void whatWasNotRunHolds() {
        Requirement machine = new Requirement(
                Requirement.Figure.DECISION_RECOVERY, Requirement.Unseen.MACHINE, 0.5, Requirement.Bound.POINT, 0.9);
        Verdict verdict = verdict(result(Optional.empty(), good).build(), duty(machine));
        assertThat(verdict.decision()).isEqualTo(Decision.HOLD);
        assertThat(verdict.mainReason()).contains("\"machine not seen\" was not run");
        TrialResult both = result(Optional.empty(), good)
                .tally(TrialForm.MACHINE_NOT_SEEN, Side.CANDIDATE, worse.tally)
                .build();
        Verdict judged = verdict(both, duty(machine));
        assertThat(judged.decision()).isEqualTo(Decision.RELEASE);
        assertThat(judged.duties().get(0).requirements().get(0).found().orElseThrow())
                .isCloseTo((2400 - 5 * 24 - 28) / 2400.0, within(1e-15));
        TrialResult oneSide = result(Optional.of(IN_SERVICE), good).build();
        assertThat(verdict(oneSide, duty()).mainReason()).contains("not both run");
    }

    @Test
    void onlyAReleaseForEveryDutyIsARelease() {
        Duty easy = duty(Fixture.recovery(0.5, Requirement.Bound.POINT));
        Duty hard = new Duty(
                "PET strict",
                easy.targets(),
                easy.productStream(),
                easy.sorters(),
                MIX,
                List.of(Fixture.recovery(0.999, Requirement.Bound.POINT)));
        Verdict verdict = verdict(result(Optional.empty(), good).build(), easy, hard);
        assertThat(verdict.decision()).isEqualTo(Decision.HOLD);
        assertThat(verdict.mainReason()).startsWith("PET strict: ");
        assertThat(verdict.duties().get(0).decision()).isEqualTo(Decision.RELEASE);
    }

    @Test
    void nothingToJudgeHolds() {
        assertThat(verdict(result(Optional.empty(), good).build()).mainReason()).contains("names no duty");
        Verdict verdict = verdict(result(Optional.empty(), good).build(), duty());
        assertThat(verdict.decision()).isEqualTo(Decision.HOLD);
        assertThat(verdict.mainReason()).contains("no requirement");
    }
}
