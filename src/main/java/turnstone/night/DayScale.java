package turnstone.night;

import java.time.LocalDate;
import java.util.List;
import java.util.Set;
import java.util.stream.IntStream;
import turnstone.measure.ProposalKind;
import turnstone.measure.ScaleLoss;
import turnstone.plant.Plant;
import turnstone.spark.ScaleJob;
import turnstone.spark.Session;
import turnstone.table.TableScale;

/** Proposes a count scale for what comes out of a plant's head. */
public final class DayScale {
    private DayScale() {}

    /** Two passes over a day's records: one to propose, one to see what it costs. */
    public static TableScale.Finding propose(Session session, Plant plant, LocalDate date, Set<String> without) {
        Day day = Day.open(session, plant, date, without);
        ProposalKind kind = plant.head().computes() ? ProposalKind.COMPUTED : ProposalKind.LOSSLESS;
        ScaleJob.Finding finding = ScaleJob.propose(day.source(), day.intake(), kind);
        ScaleLoss loss = ScaleJob.loss(day.source(), day.intake().withScale(finding.scale()));
        List<String> names = IntStream.rangeClosed(1, finding.scale().channels())
                .mapToObj(channel -> "channel " + channel)
                .toList();
        return new TableScale.Finding(
                finding.scale(), loss, names, finding.counts().accepted());
    }
}
