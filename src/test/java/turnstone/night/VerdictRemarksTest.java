package turnstone.night;

import static org.assertj.core.api.Assertions.assertThat;

import java.nio.file.Path;
import java.time.Instant;
import java.time.LocalDate;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.OptionalLong;
import java.util.TreeMap;
import java.util.TreeSet;
import org.junit.jupiter.api.Test;
import turnstone.audit.Audit;
import turnstone.audit.Found;
import turnstone.audit.Valves;
import turnstone.plant.Plant;
import turnstone.plant.Requirement;
import turnstone.shelf.Service;
import turnstone.trial.Decision;
import turnstone.trial.DutyVerdict;
import turnstone.trial.Estimate;
import turnstone.trial.FigureLine;
import turnstone.trial.Side;
import turnstone.trial.TrialForm;
import turnstone.trial.Verdict;

class VerdictRemarksTest {
    private static final String DUTY = "PET bottles to bale";
    private static final String FLEET = "a".repeat(64);
    private static final String OTHER = "b".repeat(64);

    private final Plant plant = Plant.read(Path.of(System.getProperty("turnstone.basedir", "."), "conf", "plant.yaml"));

    private static FigureLine figure(TrialForm form, Requirement.Figure figure, double value) {
        OptionalDouble none = OptionalDouble.empty();
        return new FigureLine(
                form,
                Side.CANDIDATE,
                figure,
                Requirement.Reach.THIS_FLEET_TONIGHT,
                new Estimate(OptionalDouble.of(value), none, none, 0.95, none, 4, ""));
    }

    private static Verdict verdict() {
        List<FigureLine> figures = List.of(
                figure(TrialForm.MACHINE_NOT_SEEN, Requirement.Figure.DECISION_PURITY, 0.5),
                figure(TrialForm.THIS_FLEET, Requirement.Figure.DECISION_PURITY, 0.9),
                figure(TrialForm.THIS_FLEET, Requirement.Figure.DECISION_RECOVERY, 0.8));
        DutyVerdict duty =
                new DutyVerdict(DUTY, Decision.HOLD, "because", List.of(), figures, List.of(), List.of(), List.of());
        return new Verdict(
                Decision.HOLD,
                "because",
                List.of(duty),
                List.of(LocalDate.of(2026, 3, 14)),
                4,
                OTHER,
                Optional.of(FLEET));
    }

    private static Audit audit(long number, Map<String, Double> mass_kg, Optional<Valves> valves) {
        Found found = new Found(
                LocalDate.of(2026, 3, 14),
                DUTY,
                Found.Method.HAND_SORT,
                Found.Stream.PRODUCT,
                new TreeMap<>(mass_kg),
                valves,
                new TreeSet<>(List.of(FLEET)),
                OptionalLong.empty(),
                "");
        return new Audit(number, Instant.EPOCH, "lab", found);
    }

    private String remarks(Optional<Service> running, List<Audit> audits) {
        List<String> lines = VerdictRemarks.of(plant, running, audits, verdict());
        assertThat(lines).allSatisfy(line -> assertThat(line.length()).isLessThanOrEqualTo(80));
        return String.join(" ", lines).replaceAll(" +", " ");
    }

    @Test
    void withoutAnAuditNoBaleFigureIsGivenAndThePageSaysWhy() {
        assertThat(remarks(Optional.empty(), List.of()))
                .contains("No bale figure is given")
                .doesNotContain("predicted")
                .doesNotContain("model of their own");
    }

    @Test
    void whatWasFoundStandsBesideWhatWasPredicted() {
        String page =
                remarks(Optional.empty(), List.of(audit(1, Map.of("PET bottle", 97.5, "PVC", 2.5), Optional.empty())));
        assertThat(page)
                .contains("predicted of candidate: decision purity 90.00 %, decision recovery 80.00 %")
                .contains("found: purity 97.50 % over 1 audit, 100.0 kg, 2026-03-14")
                .contains("2026-03-14 hand sort 97.50 % 100.0 kg model aaaaaaaaaaaa")
                .contains("A bale figure is not given")
                .doesNotContain("bale purity to expect");
    }

    /** Of 100 kg with 45 kg target: sent 36 and 4; with e = 0.9 and c = 0.1: 36·0.9 + 9·0.1 = 33.3 and 4·0.9 + 51·0.1 = 8.7. */
    @Test
    void aBaleFigureComesWithTheMeasuredValves() {
        String page = remarks(Optional.empty(), List.of(audit(1, Map.of(), Optional.of(new Valves(100, 90, 100, 10)))));
        assertThat(page).contains("bale purity to expect of candidate: 79.29 %");
    }

    @Test
    void sortersThatRunAnotherModelAreNamed() {
        Service split = new Service(FLEET, new TreeMap<>(Map.of("curlew", OTHER, "avocet", OTHER)));
        assertThat(remarks(Optional.of(split), List.of()))
                .contains("avocet, curlew: model bbbbbbbbbbbb")
                .contains("compared with the fleet's model aaaaaaaaaaaa on every sorter")
                .contains("releases nothing while sorters differ");
        assertThat(remarks(Optional.of(new Service(FLEET, new TreeMap<>())), List.of()))
                .doesNotContain("model of their own");
    }
}
