package turnstone.night;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.TreeSet;
import java.util.stream.Stream;
import org.apache.spark.sql.functions;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.ledger.Ledger;
import turnstone.ledger.PostOutcome;
import turnstone.plant.Plant;
import turnstone.refit.HeldOut;
import turnstone.sample.SampleShowing;
import turnstone.shelf.Shelf;
import turnstone.spark.SharedSession;
import turnstone.spark.SourceDays;
import turnstone.trial.Decision;
import turnstone.trial.DutyVerdict;
import turnstone.trial.RequirementResult;
import turnstone.trial.TrialTally;

/** When a night may release, when it must hold, and that it comes out the same again. */
@ExtendWith({SharedSession.class, SharedPlant.class})
class NightRulesTest {
    private static final String ONE_GROUP =
            "trayGroups: {count: 8, listed: {PVC: {pvc-1: 0, pvc-2: 0, pvc-3: 0, pvc-4: 0, pvc-5: 0, pvc-6: 0, pvc-7: 0, pvc-8: 0}}}";

    private static String file(Night.Result result, String name) throws IOException {
        return Files.readString(result.run().path(name));
    }

    private static TrialTally candidate(Night.Result result, String form) throws IOException {
        var tally = Json.read(file(result, "trial.json").getBytes(StandardCharsets.UTF_8), "trial.json")
                .required("forms")
                .required(form)
                .required("candidate");
        return TrialTally.read(tally, "trial.json");
    }

    private static void assertSame(Night.Result again, Night.Result first) throws IOException {
        assertThat(again.entry().fingerprint()).isEqualTo(first.entry().fingerprint());
        assertThat(again.entry().momentsFingerprint()).isEqualTo(first.entry().momentsFingerprint());
        assertThat(again.candidate().fingerprint()).isEqualTo(first.candidate().fingerprint());
        for (String name : List.of("trial.json", "verdict.json", "verdict.txt")) {
            assertThat(file(again, name)).as(name).isEqualTo(file(first, name));
        }
    }

    @Test
    void aNightComesOutTheSameAgainAndInOtherFilesInAnotherOrder(@Coarse SmallPlant small) throws IOException {
        LocalDate last = small.lastNight();
        Plant plant = small.evening();
        Night.Result first = small.nightOf(plant).run(last);
        Night.Result again = small.nightOf(plant).run(last);
        assertThat(first.outcome()).isEqualTo(PostOutcome.POSTED);
        assertThat(again.outcome()).isEqualTo(PostOutcome.SAME_RECORDS);
        assertThat(candidate(first, "this fleet").records()).isPositive();
        assertSame(again, first);

        for (LocalDate day : SourceDays.of(small.session(), plant)) {
            shuffle(small, day);
        }
        Plant shuffled = small.evening(text -> SmallPlant.replaced(text, "records/{day}", "shuffled/{day}"));
        Night.Result other = small.nightOf(shuffled).run(last);
        assertThat(other.entry().inputs())
                .hasSizeGreaterThan(first.entry().inputs().size());
        assertSame(other, first);
    }

    private static void shuffle(SmallPlant small, LocalDate day) {
        small.session()
                .spark()
                .read()
                .parquet(small.home().resolve("records").resolve(day.toString()).toString())
                .repartition(7, functions.col("piece"), functions.col("belt_column"))
                .sortWithinPartitions(
                        functions.col("belt_column"), functions.col("time_ms").desc())
                .write()
                .parquet(
                        small.home().resolve("shuffled").resolve(day.toString()).toString());
    }

    @Test
    void anEarlierNightWhoseRecordsAreGoneIsNotJudgedAndOneWhoseRecordsChangedIsRefused(@Coarse SmallPlant small)
            throws IOException {
        LocalDate last = small.lastNight();
        LocalDate before = last.minusDays(1);
        copy(small, last, "gone", 9);
        Plant gone = small.evening(text -> SmallPlant.replaced(text, "records/{day}", "gone/{day}"));
        assertThat(small.nightOf(gone).run(last).verdict().days()).containsExactly(last);

        copy(small, last, "changed", 9);
        copy(small, before, "changed", 1);
        Plant changed = small.evening(text -> SmallPlant.replaced(text, "records/{day}", "changed/{day}"));
        assertThatThrownBy(() -> small.nightOf(changed).run(last))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("the records of " + before + " are no longer those that were posted");
    }

    /** The first files of a day, into a place of their own. */
    private static void copy(SmallPlant small, LocalDate day, String place, int most) throws IOException {
        Path target = Files.createDirectories(small.home().resolve(place).resolve(day.toString()));
        try (Stream<Path> files = Files.list(small.home().resolve("records").resolve(day.toString()))) {
            List<Path> first = files.filter(file -> file.toString().endsWith(".parquet"))
                    .sorted()
                    .limit(most)
                    .toList();
            assertThat(first).isNotEmpty();
            for (Path file : first) {
                Files.copy(file, target.resolve(file.getFileName()));
            }
        }
    }

    @Test
    void withNothingInServiceTheVerdictRestsOnTheRequirementsAloneAndNothingIsReleased(@Coarse SmallPlant small)
            throws IOException {
        Plant plant = small.evening(text -> SmallPlant.replaced(
                        SmallPlant.replaced(text, "shelf: shelf\n", "shelf: bare-shelf\n"),
                        "release: by hand",
                        "release: automatic")
                .replaceAll("least: 0\\.[0-9]+", "least: 0.01"));
        Night.Result result = small.nightOf(plant).run(small.lastNight());
        assertThat(result.verdict().inService()).isEmpty();
        assertThat(result.verdict().text().replace('\n', ' ')).contains("nothing is in service to compare with");
        assertThat(file(result, "verdict.json")).contains("requirements alone: nothing is in service");
        assertThat(result.verdict().duties())
                .flatExtracting(DutyVerdict::requirements)
                .extracting(RequirementResult::name)
                .hasSize(5)
                .noneMatch(name -> name.startsWith("gain in "));
        assertThat(result.verdict().decision()).isEqualTo(Decision.RELEASE);
        assertThat(result.released()).isEmpty();
        assertThat(Places.shelf(plant).inService()).isEmpty();
    }

    @Test
    void aNightWithoutAnEarlierDayHolds(@Coarse SmallPlant small) throws IOException {
        Plant plant = small.empty(text -> text);
        Night.Result result = small.nightOf(plant).run(small.night(0));
        assertThat(result.outcome()).isEqualTo(PostOutcome.POSTED);
        assertThat(result.verdict().decision()).isEqualTo(Decision.HOLD);
        assertThat(result.verdict().mainReason())
                .contains("no day before " + small.night(0) + " is posted")
                .contains("post an earlier day");
        assertThat(file(result, "verdict.json")).contains("\"hold\"");
    }

    @Test
    void aModelInServiceThatWasMadeFromTheDayItselfCannotBeComparedOnIt(@Coarse SmallPlant small) {
        Plant plant = small.morning();
        Ledger ledger = Places.ledger(plant);
        Model seen = SmallPlant.model(plant, ledger, small.lastNight(), HeldOut.NOTHING);
        Shelf shelf = Places.shelf(plant);
        shelf.put(seen.json());
        shelf.release(seen.fingerprint(), Optional.empty(), "made from the day", "test");
        Night.Result result = small.nightOf(plant).run(small.lastNight());
        assertThat(result.verdict().decision()).isEqualTo(Decision.HOLD);
        assertThat(result.verdict().mainReason())
                .contains("what is in service was made from " + small.lastNight())
                .contains("only a later day can judge it");
        assertThat(result.verdict().duties())
                .flatExtracting(DutyVerdict::requirements)
                .allSatisfy(requirement ->
                        assertThat(requirement.outcome()).isEqualTo(RequirementResult.Outcome.NOT_JUDGED));
    }

    @Test
    void aMaterialWhoseTraysLieInOneGroupIsNotTriedAndHolds(@Coarse SmallPlant small) throws IOException {
        Plant plant = small.empty(text -> SmallPlant.replaced(text, "trayGroups: {count: 8}", ONE_GROUP)
                .replaceAll("least: 0\\.[0-9]+", "least: 0.01"));
        small.post(plant, small.night(3), Set.of());
        Night.Result result = small.nightOf(plant).run(small.lastNight());
        assertThat(result.verdict().decision()).isEqualTo(Decision.HOLD);
        assertThat(result.verdict().duties())
                .allSatisfy(duty ->
                        assertThat(duty.mainReason()).contains("PVC was not tried: all its trays lie in one group"));
        for (String form : List.of("this fleet", "machine not seen")) {
            assertThat(candidate(result, form).cells().keySet())
                    .as(form)
                    .isNotEmpty()
                    .noneMatch(cell -> cell.truth().equals("PVC"));
        }
    }

    @Test
    void aMaterialOnOneSorterOnlyIsNotTriedForAMachineNotSeenAndThatRequirementHolds(@Coarse SmallPlant small)
            throws IOException {
        Plant plant = small.empty(text -> text.replaceAll("least: 0\\.[0-9]+", "least: 0.01"));
        for (LocalDate night : List.of(small.night(3), small.lastNight())) {
            Set<String> others = new TreeSet<>();
            for (SampleShowing showing : small.sample().showings(night)) {
                if (showing.material().equals("PVC") && !showing.sorter().equals("avocet")) {
                    others.add(showing.id());
                }
            }
            small.post(plant, night, others);
        }
        Night.Result result = small.nightOf(plant).run(small.lastNight());
        assertThat(result.outcome()).isEqualTo(PostOutcome.SAME_RECORDS);
        assertThat(candidate(result, "this fleet").cells().keySet())
                .anyMatch(cell -> cell.truth().equals("PVC"));
        assertThat(candidate(result, "machine not seen").cells().keySet())
                .noneMatch(cell -> cell.truth().equals("PVC"));
        assertThat(result.verdict().decision()).isEqualTo(Decision.HOLD);
        DutyVerdict bottles = result.verdict().duties().get(0);
        assertThat(bottles.requirements())
                .extracting(RequirementResult::outcome)
                .containsExactly(
                        RequirementResult.Outcome.MET,
                        RequirementResult.Outcome.MET,
                        RequirementResult.Outcome.NOT_JUDGED);
        assertThat(bottles.mainReason())
                .contains("PVC was not tried on a machine not seen: without one machine no other tray of it is left");
    }
}
