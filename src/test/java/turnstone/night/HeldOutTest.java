package turnstone.night;

import static org.assertj.core.api.Assertions.assertThat;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.time.LocalDate;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.SplittableRandom;
import java.util.TreeSet;
import java.util.function.Predicate;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import turnstone.decide.Judgement;
import turnstone.decide.Model;
import turnstone.decide.Projector;
import turnstone.ledger.DayEntry;
import turnstone.ledger.DayMoments;
import turnstone.ledger.Ledger;
import turnstone.ledger.ShowingSums;
import turnstone.plant.Plant;
import turnstone.refit.HeldOut;
import turnstone.refit.ModelMaker;
import turnstone.refit.Recipe;
import turnstone.refit.Recipes;
import turnstone.refit.Window;
import turnstone.refit.WindowSums;
import turnstone.sample.SampleShowing;
import turnstone.spark.SharedSession;
import turnstone.trial.TrialForm;
import turnstone.trial.TrialModels;

/** What a trial holds out is as if it had never been folded, to the last bit, and alike on both sides. */
@ExtendWith({SharedSession.class, SharedPlant.class})
class HeldOutTest {
    private static final int CANDIDATE_DAYS = 2;
    private static final int PROBES = 200;
    private static final int LARGEST_PROBE = 400_000;

    /** The days before the last night that the candidate is made from. */
    private static WindowSums candidateSums(SmallPlant small, Plant plant) {
        Ledger ledger = Places.ledger(plant);
        return WindowSums.read(ledger, Window.before(ledger, small.lastNight(), CANDIDATE_DAYS));
    }

    /** What is in service is made from one night before those. */
    private static WindowSums inServiceSums(SmallPlant small, Plant plant) {
        Ledger ledger = Places.ledger(plant);
        return WindowSums.read(ledger, Window.between(ledger, small.night(1), small.night(1)));
    }

    /** A ledger into which showings like these were never folded. */
    private static Plant neverFolded(SmallPlant small, Predicate<ShowingSums> left, Plant whole) {
        Plant plant = small.empty(text -> text);
        Ledger ledger = Places.ledger(whole);
        for (int night : List.of(1, 2, 3)) {
            Set<String> without = new TreeSet<>();
            DayEntry entry = ledger.day(small.night(night)).orElseThrow();
            ledger.showings(entry).values().stream().filter(left).forEach(showing -> without.add(showing.showing()));
            assertThat(without).isNotEmpty();
            small.post(plant, small.night(night), without);
        }
        return plant;
    }

    /** Everything of a model but where it came from. */
    private static ObjectNode content(Model model) {
        ObjectNode content = model.json();
        content.remove(List.of("fingerprint", "madeFrom", "recipe"));
        return content;
    }

    private static void assertSameDecisions(Projector pair, Model alone) {
        Projector other = Projector.of(alone);
        SplittableRandom random = new SplittableRandom(5);
        double[] counts = new double[pair.channels()];
        double[] ours = new double[pair.rank()];
        double[] theirs = new double[other.rank()];
        Judgement mine = new Judgement();
        Judgement judged = new Judgement();
        for (int probe = 0; probe < PROBES; probe++) {
            Arrays.setAll(counts, c -> random.nextInt(-LARGEST_PROBE, LARGEST_PROBE));
            pair.judge(counts, 0, ours, mine);
            other.judge(counts, 0, theirs, judged);
            assertThat(ours).containsExactly(theirs);
            assertThat(mine.material()).isEqualTo(judged.material());
            assertThat(mine.distance()).isEqualTo(judged.distance());
            assertThat(mine.unfamiliar()).isEqualTo(judged.unfamiliar());
        }
    }

    @Test
    void thePairOfARecordIsWhatALedgerWithoutItsTraysAndItsMachineWouldGive(@Coarse SmallPlant small) {
        Plant whole = small.morning();
        ShowingSums judged = Figures.showings(whole, small.lastNight()).stream()
                .filter(showing -> showing.sorter().equals("curlew"))
                .findFirst()
                .orElseThrow();
        int group = judged.trayGroup();
        Recipe recipe = Recipes.of(whole).get(0);
        Recipe before = recipe.withRank(4);
        ModelMaker maker = new ModelMaker(whole.materialNames(), whole.head(), whole.countScale());
        TrialModels models = TrialPairs.make(
                        maker,
                        new TrialPairs.Maker(recipe, candidateSums(small, whole)),
                        Optional.of(new TrialPairs.Maker(before, inServiceSums(small, whole))),
                        List.of(judged))
                .models();
        assertThat(models.size()).isEqualTo(2);

        Plant withoutGroup = neverFolded(small, showing -> showing.trayGroup() == group, whole);
        TrialModels.Pair fleet =
                models.find(TrialForm.THIS_FLEET, group, judged.instrument()).orElseThrow();
        compare(small, maker, recipe, before, whole, withoutGroup, HeldOut.group(group), fleet);

        Plant withoutBoth = neverFolded(
                small,
                showing -> showing.trayGroup() == group || showing.sorter().equals(judged.sorter()),
                whole);
        TrialModels.Pair machine = models.find(TrialForm.MACHINE_NOT_SEEN, group, judged.instrument())
                .orElseThrow();
        HeldOut both = HeldOut.groupAndInstrument(group, judged.instrument());
        compare(small, maker, recipe, before, whole, withoutBoth, both, machine);
        assertThat(models.find(TrialForm.THIS_FLEET, (group + 1) % 8, judged.instrument()))
                .isEmpty();
    }

    private static void compare(
            SmallPlant small,
            ModelMaker maker,
            Recipe recipe,
            Recipe before,
            Plant whole,
            Plant never,
            HeldOut heldOut,
            TrialModels.Pair pair) {
        Model candidate =
                maker.make(recipe, candidateSums(small, never), HeldOut.NOTHING).model();
        Model inService =
                maker.make(before, inServiceSums(small, never), HeldOut.NOTHING).model();
        assertThat(content(
                        maker.make(recipe, candidateSums(small, whole), heldOut).model()))
                .isEqualTo(content(candidate));
        assertThat(content(
                        maker.make(before, inServiceSums(small, whole), heldOut).model()))
                .isEqualTo(content(inService));
        // The other way round: with nothing held out it is another model.
        assertThat(content(maker.make(recipe, candidateSums(small, whole), HeldOut.NOTHING)
                        .model()))
                .isNotEqualTo(content(candidate));
        assertSameDecisions(pair.candidate(), candidate);
        assertSameDecisions(pair.inService().orElseThrow(), inService);
    }

    @Test
    void aDayPostedWithoutAMislabelledShowingIsADayThatNeverHadIt(@Coarse SmallPlant small) {
        LocalDate last = small.lastNight();
        SampleShowing wrong = small.sample().showings(last).stream()
                .filter(showing -> !showing.material().equals(showing.trueMaterial()))
                .findFirst()
                .orElseThrow();
        Plant plant = small.morning();
        Ledger ledger = Places.ledger(plant);
        DayMoments full = ledger.load(ledger.day(last).orElseThrow());
        DayEntry revised = small.post(plant, last, Set.of(wrong.id())).entry();
        assertThat(revised.revision()).isEqualTo(2);
        assertThat(revised.without()).containsExactly(wrong.id());
        assertThat(ledger.revisions(last)).hasSize(2);

        String source = "never-" + wrong.sorter();
        var spark = small.session().spark();
        spark.read()
                .parquet(
                        small.home().resolve("records").resolve(last.toString()).toString())
                .where("showing <> '" + wrong.id() + "'")
                .write()
                .parquet(small.home().resolve(source).resolve(last.toString()).toString());
        Plant other = small.evening(text -> SmallPlant.replaced(text, "records/{day}", source + "/{day}"));
        DayEntry never = small.post(other, last, Set.of()).entry();
        assertThat(revised.momentsFingerprint()).isEqualTo(never.momentsFingerprint());
        assertThat(revised.fingerprint()).isEqualTo(never.fingerprint());
        DayMoments without = ledger.load(revised);
        assertThat(without.showings()).doesNotContainKey(wrong.id());
        ShowingSums sums = full.showings().get(wrong.id());
        assertThat(without.records()).isEqualTo(full.records() - sums.records());
        full.moments().forEach((key, moments) -> {
            if (!key.equals(sums.key())) {
                assertThat(without.moments().get(key).fingerprint()).isEqualTo(moments.fingerprint());
            }
        });
    }
}
