package turnstone.spark;

import static org.assertj.core.api.Assertions.assertThat;

import com.fasterxml.jackson.databind.JsonNode;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.SortedMap;
import java.util.TreeMap;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import turnstone.decide.MadeFrom;
import turnstone.decide.Model;
import turnstone.decide.ModelContext;
import turnstone.fisher.Cell;
import turnstone.fisher.Fit;
import turnstone.fisher.FitRequest;
import turnstone.fisher.Ridge;
import turnstone.measure.ReferenceTable;
import turnstone.moments.Moments;
import turnstone.plant.Plant;
import turnstone.sample.SamplePlant;
import turnstone.sample.SampleSize;
import turnstone.trial.Recognition;
import turnstone.trial.ScoreHistogram;
import turnstone.trial.Side;
import turnstone.trial.TallyCell;
import turnstone.trial.TrialForm;
import turnstone.trial.TrialModels;
import turnstone.trial.TrialTally;

/** The invented plant, small: made, found again, folded, tried. */
@ExtendWith(SharedSession.class)
class PlantJobsTest {
    @TempDir
    Path folder;

    private static Model model(FoldResult folded, Plant plant) {
        SortedMap<String, Moments> sums = folded.byMaterial();
        List<String> names = new ArrayList<>(sums.keySet());
        List<List<Cell>> cells =
                sums.values().stream().map(m -> List.of(new Cell(m, 1))).toList();
        Fit fit = Fit.of(FitRequest.of(names, cells, plant.countScale()).withRidge(Ridge.amount(1e-3)));
        List<String> channels = new ArrayList<>();
        for (int c = 1; c <= plant.countScale().channels(); c++) {
            channels.add("c" + c);
        }
        MadeFrom from = new MadeFrom(List.of(), List.of(), Optional.empty(), List.of());
        return Model.of(fit, ModelContext.of("fleet", channels, plant.countScale(), from));
    }

    /** The first bin on the side of what is ejected; docs/trial.md. */
    private static final int NEAREST = 289;

    @Test
    void aNightIsMadeFoldedAndTriedWithEveryRecordCounted(Session session) {
        Path home = folder.resolve("plant");
        SamplePlant sample = SamplePlant.of(new SampleSize(3, 2, 2, 6, 24), 20_260_301);
        List<LocalDate> nights = sample.nights();
        long made = SampleJob.write(session, sample, home);
        Plant plant = Plant.read(home.resolve("plant.yaml"));
        assertThat(SourceDays.of(session, plant)).isEqualTo(nights);
        ReferenceTable references = PlantTables.references(session, plant);
        LocalDate last = nights.get(1);
        RecordSource source = RecordSource.open(session, PlantTables.records(plant, last));
        assertThat(made).isEqualTo(2 * source.rows() - 1);
        assertThat(source.rows()).isEqualTo(3 * plant.materials().size() * 2 * 6 + 1);
        IntakeSpec intake = PlantTables.intake(plant, last, references);
        FoldResult folded = FoldJob.run(source, intake, FoldSettings.usual());
        RecordCounts counts = folded.counts();
        assertThat(counts.read()).isEqualTo(source.rows());
        assertThat(counts.read()).isEqualTo(counts.accepted() + counts.noSignal() + counts.quarantinedTotal());
        assertThat(counts.quarantined()).containsEntry("unknown sorter", 1L);
        assertThat(folded.readPath()).isEqualTo(ReadPath.COLUMN_BATCHES);

        Model model = model(folded, plant);
        TrialModels.Builder builder = TrialModels.builder();
        for (int group = 0; group < 4; group++) {
            builder.thisFleet(group, model, Optional.of(model));
        }
        TrialTallies tallies = TrialJob.run(source, intake, builder.build(), Map.of("PET", Set.of("PET bottle")), 10);
        long judged = counts.accepted() + counts.noSignal();
        TrialTally tally = tallies.tally(TrialForm.THIS_FLEET, Side.CANDIDATE);
        assertThat(tally.records() + tallies.notTried(TrialForm.THIS_FLEET)).isEqualTo(judged);
        assertThat(tally.records()).isPositive();
        assertThat(tallies.tally(TrialForm.THIS_FLEET, Side.IN_SERVICE)).isEqualTo(tally);
        assertThat(tallies.notTried(TrialForm.MACHINE_NOT_SEEN)).isEqualTo(judged);
        // The cut that is the decision for the nearest material ejects just the familiar records decided to be ejected.
        ScoreHistogram scores = tallies.scores("PET", Side.CANDIDATE);
        assertThat(scores.records()).isEqualTo(tally.records());
        assertThat(tallies.scores("PET", Side.IN_SERVICE).json()).isEqualTo(scores.json());
        long ejected = 0;
        for (JsonNode row : scores.json().path("rows")) {
            for (JsonNode bin : row.get(4)) {
                ejected += bin.get(0).intValue() >= NEAREST ? bin.get(1).longValue() : 0;
            }
        }
        long decided = tally.cells().entrySet().stream()
                .filter(cell -> cell.getKey().recognition() == Recognition.FAMILIAR
                        && cell.getKey().decided().equals("PET bottle"))
                .mapToLong(Map.Entry::getValue)
                .sum();
        assertThat(decided).isPositive();
        assertThat(ejected).isEqualTo(decided);
        TreeMap<String, Long> byShowing = new TreeMap<>();
        tally.cells().forEach((TallyCell cell, Long n) -> byShowing.merge(cell.showing(), n, Long::sum));
        byShowing.forEach((showing, n) -> assertThat(n)
                .isEqualTo(folded.showings().get(showing).records()
                        + folded.showings().get(showing).noSignal()));
    }
}
