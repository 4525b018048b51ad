package turnstone.table;

import java.util.List;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.ScaleLoss;
import turnstone.spark.IntakeSpec;
import turnstone.spark.RecordSource;
import turnstone.spark.ScaleJob;
import turnstone.spark.Session;

/** Proposes a count scale for a plain table. */
public final class TableScale {
    private TableScale() {}

    /**
     * A proposal and its cost.
     *
     * @param scale the proposal
     * @param loss what it costs on the records that were looked at
     * @param channelNames one per channel
     * @param records that were looked at
     */
    public record Finding(CountScale scale, ScaleLoss loss, List<String> channelNames, long records) {}

    /** Two passes: one to propose, one to see what it costs. */
    public static Finding propose(Session session, Table table) {
        RecordSource source = table.open(session);
        ScaleJob.Finding finding = ScaleJob.propose(source);
        IntakeSpec intake = IntakeSpec.table(HeadSpec.none(source.channels()), finding.scale());
        ScaleLoss loss = ScaleJob.loss(source, intake);
        return new Finding(
                finding.scale(), loss, source.channelNames(), finding.counts().accepted());
    }
}
