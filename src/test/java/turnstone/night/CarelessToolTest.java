package turnstone.night;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.Locale;
import java.util.Set;
import java.util.function.Predicate;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.junit.jupiter.api.extension.ExtendWith;
import turnstone.decide.Model;
import turnstone.plant.Plant;
import turnstone.refit.HeldOut;
import turnstone.sample.SampleShowing;
import turnstone.spark.SharedSession;
import turnstone.spark.TrialTallies;
import turnstone.trial.Side;
import turnstone.trial.TallyCell;
import turnstone.trial.TrialForm;
import turnstone.trial.TrialModels;
import turnstone.trial.TrialTally;

/**
 * What each shortcut does to decision recovery on the invented plant, in points of the mean over materials unless said otherwise.
 *
 * <p>The bounds leave room to what two seeds gave; {@code docs/sample-plant.md} has the amounts.
 */
@ExtendWith({SharedSession.class, SharedPlant.class})
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class CarelessToolTest {
    private SmallPlant small;
    private Plant plant;
    private TrialModels models;
    private TrialTallies honest;
    private TrialTally heldOut;
    private double recovery;

    @BeforeAll
    void theHonestTrial(SmallPlant shared) {
        small = shared;
        plant = small.morning();
        models = Figures.pairs(plant, small.lastNight()).models();
        honest = Figures.tallies(small, plant, small.lastNight(), models, Set.of());
        heldOut = honest.tally(TrialForm.THIS_FLEET, Side.CANDIDATE);
        recovery = Figures.macro(plant, heldOut);
    }

    /** Careless less honest, in points; printed, so that documents can be held against it. */
    private static double moved(String what, double honestShare, double carelessShare) {
        double points = 100 * (carelessShare - honestShare);
        System.out.printf(
                Locale.ROOT,
                "%s: decision recovery %.2f %% becomes %.2f %%, %+.2f points%n",
                what,
                100 * honestShare,
                100 * carelessShare,
                points);
        return points;
    }

    @Test
    void poolingInstrumentsAsIfTheyHadOneWavelengthAxisCostsRecovery() {
        Plant pooled = small.empty(text -> text.replaceAll(
                "first_nm: [0-9.]+, last_nm: [0-9.]+, channels: 128}}",
                "first_nm: 900, last_nm: 1700, channels: 128}}"));
        assertThat(pooled.instruments())
                .allSatisfy(instrument ->
                        assertThat(instrument.wavelength_nm()).startsWith(900).endsWith(1700));
        small.postEarlierNights(pooled);
        small.post(pooled, small.lastNight(), Set.of());
        TrialModels pairs = Figures.pairs(pooled, small.lastNight()).models();
        TrialTallies careless = Figures.tallies(small, pooled, small.lastNight(), pairs, Set.of());
        double fleet = Figures.macro(plant, careless.tally(TrialForm.THIS_FLEET, Side.CANDIDATE));
        assertThat(moved("one wavelength axis for all", recovery, fleet)).isLessThan(-1.5);
        double unseen = Figures.macro(plant, honest.tally(TrialForm.MACHINE_NOT_SEEN, Side.CANDIDATE));
        double carelessUnseen = Figures.macro(plant, careless.tally(TrialForm.MACHINE_NOT_SEEN, Side.CANDIDATE));
        assertThat(moved("one wavelength axis for all, machine not seen", unseen, carelessUnseen))
                .isLessThan(-1.5);
    }

    @Test
    void judgingOnTraysThatTrainedLooksBetterThanItIs() {
        Model seen =
                SmallPlant.model(plant, Places.ledger(plant), small.lastNight().minusDays(1), HeldOut.NOTHING);
        TrialTallies careless =
                Figures.tallies(small, plant, small.lastNight(), Figures.careless(plant, seen), Set.of());
        TrialTally tally = careless.tally(TrialForm.THIS_FLEET, Side.CANDIDATE);
        assertThat(tally.records()).isEqualTo(heldOut.records());
        assertThat(moved("judged on trays that trained", recovery, Figures.macro(plant, tally)))
                .isGreaterThan(0.15);
    }

    @Test
    void aMachineThatWasNotSeenIsNotJudgedBetterThanOneThatWas() {
        TrialTally unseen = honest.tally(TrialForm.MACHINE_NOT_SEEN, Side.CANDIDATE);
        assertThat(unseen.records()).isEqualTo(heldOut.records());
        assertThat(moved("machine not seen", recovery, Figures.macro(plant, unseen)))
                .isLessThan(0.3);
    }

    @Test
    void leavingBlackPiecesOutOfTheDenominatorLooksBetterThanItIs() {
        double careless = Figures.macro(plant, heldOut, cell -> !cell.decided().equals(TallyCell.NO_SIGNAL));
        assertThat(moved("no signal left out", recovery, careless)).isGreaterThan(1);
    }

    @Test
    void trustingTheStaleWhiteCostsRecoveryOnItsSorter() {
        Plant trusting = small.empty(text -> SmallPlant.replaced(text, "maxAge_hours: 12", "maxAge_hours: 48"));
        TrialTallies careless = Figures.tallies(small, trusting, small.lastNight(), models, Set.of());
        assertThat(honest.counts().quarantined()).containsKey("stale white");
        assertThat(careless.counts().quarantined()).doesNotContainKey("stale white");
        Predicate<TallyCell> knot = cell -> cell.showing().contains(".knot.");
        double with = Figures.macro(plant, careless.tally(TrialForm.THIS_FLEET, Side.CANDIDATE), knot);
        assertThat(moved("stale white trusted, on knot", Figures.macro(plant, heldOut, knot), with))
                .isLessThan(-1.5);
    }

    @Test
    void theMislabelledShowingCountsAgainstTheModelsUntilItIsLeftOut() {
        SampleShowing wrong = small.sample().showings(small.lastNight()).stream()
                .filter(showing -> !showing.material().equals(showing.trueMaterial()))
                .findFirst()
                .orElseThrow();
        Plant mended = small.morning();
        small.post(mended, small.lastNight(), Set.of(wrong.id()));
        TrialTallies without = Figures.tallies(small, mended, small.lastNight(), models, Set.of(wrong.id()));
        TrialTally tally = without.tally(TrialForm.THIS_FLEET, Side.CANDIDATE);
        assertThat(without.counts().leftOut()).isEqualTo(SmallPlant.FINE.recordsPerShowing());
        assertThat(moved("mislabelled showing left in", Figures.macro(plant, tally), recovery))
                .isBetween(-0.5, -0.2);
        Predicate<TallyCell> polypropylene = cell -> cell.truth().equals("PP");
        double lost = moved(
                "mislabelled showing left in, PP",
                Figures.share(tally, polypropylene),
                Figures.share(heldOut, polypropylene));
        assertThat(lost).isBetween(-4.5, -2.5);
    }
}
