package turnstone.trial;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.Map;
import org.junit.jupiter.api.Test;
import turnstone.plant.Requirement;

/** The short form of {@code scripts/soak trial}: fixed seeds, counts to the last one. What it counts at length is in docs/trial-proof.md. */
class TrialProofTest {
    private static final long SEED = 1;

    @Test
    void intervalsHoldTheTruthAsOftenAsTheySay() {
        Map<Requirement.Reach, TrialProof.Coverage> coverage = TrialProof.coverage(SEED, 40);
        coverage.forEach((reach, c) -> System.out.println("coverage, seed " + SEED + ", " + reach.label() + ": " + c));
        assertHeld(coverage.get(Requirement.Reach.THIS_FLEET_TONIGHT), 36, 38);
        assertHeld(coverage.get(Requirement.Reach.MACHINES_LIKE_THESE), 35, 35);
        assertHeld(coverage.get(Requirement.Reach.ONE_NEW_MACHINE), 37, 38);
    }

    private static void assertHeld(TrialProof.Coverage coverage, int purity, int recovery) {
        assertThat(coverage.purityHeld()).isEqualTo(purity);
        assertThat(coverage.recoveryHeld()).isEqualTo(recovery);
    }

    @Test
    void whatIsBetterIsReleasedAndWhatIsWorseIsNot() {
        int[] released = new int[3];
        for (int g = 0; g < 3; g++) {
            TrialProof.Releases releases = TrialProof.releases(SEED, 16, 0.01 * (g - 1));
            System.out.println("releases, seed " + SEED + ", true gain " + (g - 1) + " points: " + releases);
            released[g] = releases.released();
            assertThat(releases.found()).isCloseTo(g - 1, within(0.3));
        }
        assertThat(released).containsExactly(0, 0, 13);
    }

    @Test
    void theNestedFigureDoesNotFlatterTheRungThatWasChosen() {
        TrialProof.Ladders ladders = TrialProof.ladders(SEED, 100);
        System.out.println("ladders, seed " + SEED + ": " + ladders);
        assertThat(ladders.plainMiss()).isGreaterThan(ladders.nestedMiss() + 0.2);
        assertThat(ladders.nestedMiss()).isCloseTo(0, within(3 * ladders.nestedError()));
    }
}
