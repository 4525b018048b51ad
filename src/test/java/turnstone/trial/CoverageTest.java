package turnstone.trial;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import java.util.Map;
import java.util.Random;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Test;
import turnstone.decide.Quantiles;
import turnstone.plant.Duty;
import turnstone.plant.Requirement;

/** Invented plants at tally level: how often the interval holds the figure that the same sorters would give with showings without end. */
class CoverageTest {
    private static final long SEED = 20261201;
    private static final int PLANTS = 400;
    private static final int RECORDS = 100;
    private static final int SHOWINGS = 4;
    private static final List<String> SORTERS = List.of("avocet", "curlew", "dunlin", "godwit", "knot", "plover");
    private static final Map<String, Double> MIX = Map.of("PET", 0.55, "PP", 0.30, "PVC", 0.15);
    private static final Map<String, Double> SENT_LOGIT = Map.of("PET", 2.6, "PP", -4.2, "PVC", -3.2);
    private static final double SORTER_SPREAD = 0.5;
    private static final double SHOWING_SPREAD = 0.6;
    private static final int QUADRATURE = 200;

    private final Random random = new Random(SEED);

    @Test
    void aNinetyPercentIntervalHoldsTheTruthInAboutNinetyPercentOfPlants() {
        Duty duty = Fixture.duty(Duty.Stream.EJECTED, MIX);
        int purityHeld = 0;
        int recoveryHeld = 0;
        for (int plant = 0; plant < PLANTS; plant++) {
            Fixture fixture = new Fixture();
            double pet = draw(fixture, "PET");
            double other = MIX.get("PP") * draw(fixture, "PP") + MIX.get("PVC") * draw(fixture, "PVC");
            double target = MIX.get("PET") * pet;
            Estimator estimator = new Estimator(fixture.showings);
            purityHeld +=
                    holds(estimator, Requirement.Figure.DECISION_PURITY, duty, fixture, target / (target + other));
            recoveryHeld += holds(estimator, Requirement.Figure.DECISION_RECOVERY, duty, fixture, pet);
        }
        System.out.println("interval coverage of " + PLANTS + " plants, seed " + SEED + ": purity " + purityHeld
                + ", recovery " + recoveryHeld);
        assertThat(purityHeld).isBetween(PLANTS * 85 / 100, PLANTS * 95 / 100);
        assertThat(recoveryHeld).isBetween(PLANTS * 85 / 100, PLANTS * 95 / 100);
    }

    /** Adds this material's showings, and returns the share that these sorters would send on the whole. */
    private double draw(Fixture fixture, String material) {
        double whole = 0;
        for (String sorter : SORTERS) {
            double logit = SENT_LOGIT.get(material) + SORTER_SPREAD * random.nextGaussian();
            for (int q = 0; q < QUADRATURE; q++) {
                double z = NORMAL[q];
                whole += expit(logit + SHOWING_SPREAD * z) / QUADRATURE / SORTERS.size();
            }
            for (int k = 0; k < SHOWINGS; k++) {
                double share = expit(logit + SHOWING_SPREAD * random.nextGaussian());
                int sent = 0;
                for (int i = 0; i < RECORDS; i++) {
                    sent += random.nextDouble() < share ? 1 : 0;
                }
                fixture.showing(sorter, material, sent, RECORDS - sent, 0, 0);
            }
        }
        return whole;
    }

    private static int holds(Estimator estimator, Requirement.Figure figure, Duty duty, Fixture fixture, double truth) {
        Estimate estimate = estimator.estimate(figure, duty, fixture.tally, 0.90);
        return estimate.lower().orElse(1) <= truth && truth <= estimate.upper().orElse(0) ? 1 : 0;
    }

    private static double expit(double logit) {
        return 1 / (1 + StrictMath.exp(-logit));
    }

    private static final double[] NORMAL = IntStream.range(0, QUADRATURE)
            .mapToDouble(q -> Quantiles.normal((q + 0.5) / QUADRATURE))
            .toArray();
}
