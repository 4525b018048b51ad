package turnstone.trial;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.Test;
import turnstone.plant.Duty;

class RungChoiceTest {
    private static final Duty DUTY = Fixture.duty(Duty.Stream.EJECTED, Map.of("PET", 1.0));
    private static final List<String> SORTERS = List.of("avocet", "curlew", "dunlin");
    private static final RungChoice.Rung SMALL = new RungChoice.Rung("small", 1e-6, 10);
    private static final RungChoice.Rung LARGE = new RungChoice.Rung("large", 1e-4, 10);
    private static final RungChoice.Rung LARGE_FEW = new RungChoice.Rung("large, few axes", 1e-4, 6);

    private final Map<RungChoice.Rung, TrialTally> ladder = new LinkedHashMap<>();
    private List<TrialShowing> showings;

    /** Records of 1000 sent on each sorter. */
    private void rung(RungChoice.Rung rung, long... sent) {
        Fixture fixture = new Fixture();
        for (int s = 0; s < sent.length; s++) {
            fixture.showing(SORTERS.get(s), "PET", sent[s], 1000 - sent[s], 0, 0);
        }
        ladder.put(rung, fixture.tally);
        showings = fixture.showings;
    }

    private RungChoice choice() {
        return RungChoice.ofTallies(DUTY, ladder, showings);
    }

    @Test
    void tiesWithinATenthOfAPointGoToMoreRidgeThenFewerAxes() {
        rung(SMALL, 900, 900, 902);
        rung(LARGE, 900, 900, 900);
        rung(LARGE_FEW, 900, 900, 900);
        assertThat(choice().chosen()).isEqualTo(LARGE_FEW);
        rung(SMALL, 904, 903, 902);
        assertThat(choice().chosen()).isEqualTo(SMALL);
        assertThat(choice().plain()).isCloseTo(0.903, within(1e-15));
    }

    @Test
    void everySorterIsJudgedByWhatTheOthersChoose() {
        rung(SMALL, 990, 900, 900);
        rung(LARGE, 900, 920, 920);
        RungChoice choice = choice();
        // All: 930 against 913.3. Without avocet the others choose large; without curlew or dunlin small.
        assertThat(choice.chosen()).isEqualTo(SMALL);
        assertThat(choice.chosenWithout())
                .containsExactly(Map.entry("avocet", LARGE), Map.entry("curlew", SMALL), Map.entry("dunlin", SMALL));
        assertThat(choice.nested().orElseThrow()).isCloseTo(0.9, within(1e-15));
        assertThat(choice.nestedScores().records()).isEqualTo(3000);
        assertThat(choice.agreement()).isEqualTo("small, chosen without each sorter in turn 2 of 3 times; else large");
    }

    @Test
    void oneSorterLeavesNobodyToChoose() {
        rung(SMALL, 900);
        assertThat(choice().nested()).isEmpty();
        assertThat(choice().plain()).isEqualTo(0.9);
    }
}
