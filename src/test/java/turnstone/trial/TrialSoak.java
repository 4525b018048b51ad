package turnstone.trial;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.Locale;
import java.util.Map;
import turnstone.plant.DutyTerms;
import turnstone.plant.Requirement;

/** The long form of the proof: {@code scripts/soak trial}. Arguments: file to write, plants, ladders, trials, seed. */
final class TrialSoak {
    private static final double[] GAINS = {-0.01, 0, 0.01};
    private static final String[] ASKED = {"at most 12 in 1,000 (1.2 %)", "at most 10 %", "at least 80 %"};

    private final StringBuilder page = new StringBuilder();

    private TrialSoak() {}

    public static void main(String[] arguments) throws IOException {
        TrialSoak soak = new TrialSoak();
        long seed = Long.parseLong(arguments[4]);
        soak.opening(seed);
        soak.coverage(TrialProof.coverage(seed, Integer.parseInt(arguments[1])));
        soak.releases(seed, Integer.parseInt(arguments[3]));
        soak.ladders(TrialProof.ladders(seed, Integer.parseInt(arguments[2])));
        soak.cuts(seed, Integer.parseInt(arguments[1]));
        Files.writeString(Path.of(arguments[0]), soak.page.toString());
        System.out.println(soak.page);
    }

    private void opening(long seed) {
        line("# What the trial's statistics do on invented plants");
        line("");
        line(
                "Written by `scripts/soak trial`, seed %d. Everything here is invented: plants are drawn at tally level, so that the truth is",
                seed);
        line(
                "known, and judged by the code that judges a night. What is drawn is said in `DrawnPlant` and `DrawnLadder` (`src/test/java/turnstone/trial`):");
        line("");
        line(
                "- four materials; the score of a record is normal about a middle that moves by sorter (deviation 0.15 to 0.40 of a record's own), night");
        line(
                "  (0.05 to 0.15) and showing (0.20 to 0.40), each drawn anew for each material; 4 showings of 100 records per sorter, material and night;");
        line(
                "- the candidate's scores share all that and have effects of their own by sorter (0.03 to 0.08), night (0.01 to 0.03) and showing (0.03 to");
        line(
                "  0.10); a record's own terms on the two sides are correlated by 0.96 to 0.99, so that about 3 to 6 % of the records at the cut differ. (On the sample plant's last night counts by");
        line(
                "  showing differ as if 0.1 to 2.5 % of a material's records were decided otherwise: the power there is greater.)");
        line(
                "- the required purity is 94 to 97 %; the candidate is moved until its true gain in recovery there, on this fleet over nights without");
        line("  end, is exactly what the row says.");
        line("");
    }

    private void coverage(Map<Requirement.Reach, TrialProof.Coverage> coverage) {
        line("## How often a 90 % interval holds the truth");
        line("One night of 6, 8, 10 or 12 sorters; decision for the nearest material.");
        line("");
        line("| figure | plants | purity | recovery | asked for | mean width, purity | recovery |");
        line("|---|---|---|---|---|---|---|");
        coverage.forEach((reach, c) -> line(
                "| %s | %d | %.1f %% | %.1f %% | %s | %.1f points | %.1f points |",
                reach.label(),
                c.plants(),
                100.0 * c.purityHeld() / c.plants(),
                100.0 * c.recoveryHeld() / c.plants(),
                switch (reach) {
                    case THIS_FLEET_TONIGHT -> "85–95 %";
                    case MACHINES_LIKE_THESE -> "82–95 %";
                    case ONE_NEW_MACHINE -> "at least 88 %";
                },
                c.purityWidth() / c.plants(),
                c.recoveryWidth() / c.plants()));
        line("");
    }

    private void releases(long seed, int trials) {
        line("## How often a candidate is released");
        line(
                "%d nights × %d sorters × %d showings; released where the one-sided 95 %% lower bound of the gain is above 0.",
                TrialProof.NIGHTS, TrialProof.SORTERS, TrialProof.SHOWINGS);
        line("");
        line(
                "| true gain | trials | released | share | asked for | mean gain found | mean standard error | deviation of what was found |");
        line("|---|---|---|---|---|---|---|---|");
        for (int g = 0; g < GAINS.length; g++) {
            TrialProof.Releases r = TrialProof.releases(seed, trials, GAINS[g]);
            line(
                    "| %+.0f points | %d | %d | %.1f %% | %s | %+.2f | %.2f | %.2f |",
                    100 * GAINS[g],
                    r.trials(),
                    r.released(),
                    100.0 * r.released() / r.trials(),
                    ASKED[g],
                    r.found(),
                    r.error(),
                    r.deviation());
        }
        line("");
        line(
                "The rule is the one that a plant file has by default: both sides' own frontiers are brought to the required purity on the judged");
        line(
                "records, and the pseudo-values of leaving out one block of a sorter on a night give the error, with t(S·L − 1).");
        line("");
    }

    private void ladders(TrialProof.Ladders l) {
        line("## The figure of the rung that was chosen");
        line(
                "A ladder of 8 rungs on one night of 6 to 12 sorters; misses against the chosen rung's true recovery over all machines like these.");
        line("");
        line(
                "| plants | plain maximum misses by | nested by sorter misses by | its standard error | asked for | lost to the best rung |");
        line("|---|---|---|---|---|---|");
        line(
                "| %d | %+.2f points | %+.2f points | %.2f | within 0.2 | %.2f points |",
                l.plants(), l.plainMiss(), l.nestedMiss(), l.nestedError(), l.lost());
    }

    private void cuts(long seed, int plants) {
        line("");
        line("## The purity that a frozen cut keeps");
        line(
                "Cuts set on 3 nights of 6 sorters for nights to come; the fleet's true purity there against the required one.");
        line("");
        line("| cut | plants | set | true purity is what is required |");
        line("|---|---|---|---|");
        for (DutyTerms.CutRule rule : DutyTerms.CutRule.values()) {
            TrialProof.Cuts cuts = TrialProof.cuts(seed, plants, rule);
            line(
                    "| %s | %d | %d | %.1f %% |",
                    rule == DutyTerms.CutRule.POINT ? "point" : "lower end of the 90 % interval",
                    cuts.plants(),
                    cuts.set(),
                    100.0 * cuts.held() / cuts.set());
        }
    }

    private void line(String form, Object... values) {
        page.append(values.length == 0 ? form : String.format(Locale.ROOT, form, values))
                .append('\n');
    }
}
