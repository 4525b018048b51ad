package turnstone.night;

import static org.assertj.core.api.Assertions.assertThat;

import java.nio.file.Path;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import turnstone.sample.SampleSize;

/** With the plant file's defaults the truth, which the invented plant knows, lies in the interval that the trial reports. */
class KnownTruthTest {
    private static final SampleSize SIZE = new SampleSize(6, 3, 4, 12, 64);
    private static final int PLANTS = Integer.getInteger("turnstone.plants", 8);
    private static final int FIRST_SEED = 501;
    private static final int UNSEEN_TRAYS = 40;

    /** Of intervals that are to hold in 90 of 100 plants, two duties each. */
    private static final int LEAST_EIGHTHS = 7;

    @TempDir
    Path folder;

    @Test
    void decisionRecoveryOnTraysNeverShownLiesInTheReportedInterval() {
        List<Map<String, KnownTruth.Answer>> plants = IntStream.range(0, PLANTS)
                .parallel()
                .mapToObj(plant -> KnownTruth.of(SIZE, FIRST_SEED + plant, folder.resolve("p" + plant), UNSEEN_TRAYS))
                .toList();
        int holds = 0;
        for (Map<String, KnownTruth.Answer> plant : plants) {
            for (Map.Entry<String, KnownTruth.Answer> duty : plant.entrySet()) {
                KnownTruth.Answer answer = duty.getValue();
                holds += answer.holds() ? 1 : 0;
                System.out.printf(
                        Locale.ROOT,
                        "%s: truth %.2f, reported %.2f, %.2f to %.2f%n",
                        duty.getKey(),
                        100 * answer.truth(),
                        100 * answer.reported().point().orElseThrow(),
                        100 * answer.reported().lower().orElseThrow(),
                        100 * answer.reported().upper().orElseThrow());
            }
        }
        System.out.println("held " + holds + " of " + 2 * PLANTS);
        assertThat(holds).isGreaterThanOrEqualTo(2 * PLANTS * LEAST_EIGHTHS / 8);
    }
}
