package turnstone.spark;

import java.io.Serializable;
import java.util.List;
import org.apache.spark.broadcast.Broadcast;
import turnstone.fault.Fault;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.ProposalKind;
import turnstone.measure.ScaleLoss;
import turnstone.measure.ScaleProposal;
import turnstone.measure.SourceType;

/** Looks at values to propose a count scale, and at what a scale would cost. */
public final class ScaleJob {
    private ScaleJob() {}

    /** What was seen by one task, or by all. */
    private record Seen(ScaleProposal proposal, ScaleLoss loss, RecordCounts counts) implements Serializable {}

    /**
     * A scale and the values behind it.
     *
     * @param scale the proposal
     * @param seen ranges and decimal places by channel
     * @param counts what became of the records that were looked at
     */
    public record Finding(CountScale scale, ScaleProposal seen, RecordCounts counts) {}

    /**
     * Proposes a scale for the values that come out of the head, one pass.
     *
     * @param spec with or without a scale, which is not looked at
     * @throws Fault of kind input where a channel has no value, or can't be held without loss though that is demanded
     */
    public static Finding propose(RecordSource source, IntakeSpec spec, ProposalKind kind) {
        Seen seen = walk(source, spec.withScale(null), null);
        source.requireAll(seen.counts().read());
        return new Finding(seen.proposal().propose(kind), seen.proposal(), seen.counts());
    }

    /** A lossless scale for a plain table. */
    public static Finding propose(RecordSource source) {
        IntakeSpec spec = IntakeSpec.table(HeadSpec.none(source.channels()), null);
        return propose(source, spec, ProposalKind.LOSSLESS);
    }

    /** What the scale of the intake costs on these records, one pass. */
    public static ScaleLoss loss(RecordSource source, IntakeSpec spec) {
        SourceType type = spec.head().computes() ? SourceType.DOUBLE : source.sourceType();
        Seen seen = walk(source, spec, type);
        source.requireAll(seen.counts().read());
        return seen.loss();
    }

    private static Seen walk(RecordSource source, IntakeSpec spec, SourceType type) {
        Broadcast<IntakeSpec> shared = source.session().context().broadcast(spec);
        TableColumns columns = source.columns();
        List<Seen> parts = SparkTrouble.guard(
                "looking at values",
                () -> source.over(cursor -> List.of(look(cursor, columns, shared.value(), type))
                                .iterator())
                        .collect());
        Seen total = empty(spec, type);
        for (Seen part : parts) {
            total.proposal().merge(part.proposal());
            if (total.loss() != null) {
                total.loss().merge(part.loss());
            }
            total.counts().merge(part.counts());
        }
        shared.unpersist(false);
        return total;
    }

    private static Seen empty(IntakeSpec spec, SourceType type) {
        ScaleLoss loss = spec.scale() == null ? null : new ScaleLoss(spec.scale(), type);
        return new Seen(new ScaleProposal(spec.head().outputs()), loss, new RecordCounts(0));
    }

    private static Seen look(RecordCursor cursor, TableColumns columns, IntakeSpec spec, SourceType type) {
        Seen seen = empty(spec, type);
        Intake intake = new Intake(spec, columns, cursor);
        int[] kept = spec.head().kept();
        while (cursor.next()) {
            Intake.Outcome outcome = intake.take();
            seen.counts().count(outcome, intake);
            if (outcome != Intake.Outcome.ACCEPTED) {
                continue;
            }
            if (seen.loss() != null) {
                seen.loss().add(intake.output(), 0, intake.counts(), 0);
            } else {
                for (int c = 0; c < kept.length; c++) {
                    addValue(seen.proposal(), cursor, intake, spec.head(), c, kept[c]);
                }
            }
        }
        return seen;
    }

    /** Recorded values as they were written, computed ones as doubles. */
    private static void addValue(
            ScaleProposal proposal, RecordCursor cursor, Intake intake, HeadSpec head, int output, int input) {
        if (head.computes()) {
            proposal.add(output, intake.output()[output], SourceType.DOUBLE);
            return;
        }
        String text = cursor.channelText(input);
        if (text != null) {
            proposal.add(output, text);
        } else {
            proposal.add(output, intake.output()[output], cursor.type(input));
        }
    }
}
