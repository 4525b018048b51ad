package turnstone.night;

import java.time.Instant;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import turnstone.fault.Fault;
import turnstone.ledger.DayCounts;
import turnstone.ledger.DayDraft;
import turnstone.ledger.DayEntry;
import turnstone.ledger.DayMoments;
import turnstone.ledger.InputFile;
import turnstone.ledger.Ledger;
import turnstone.ledger.PostOutcome;
import turnstone.ledger.Replace;
import turnstone.plant.Plant;
import turnstone.spark.FoldJob;
import turnstone.spark.FoldResult;
import turnstone.spark.FoldSettings;
import turnstone.spark.RecordCounts;

/** Folds a day's records and posts them to the ledger. */
public final class PostStep {
    private PostStep() {}

    /**
     * A day after its fold.
     *
     * @param fold what the job brought back
     * @param draft the day, ready to be posted
     */
    public record Folded(FoldResult fold, DayDraft draft) {}

    /**
     * A day in the ledger.
     *
     * @param entry its newest revision
     * @param outcome whether this run posted it
     */
    public record Posted(DayEntry entry, PostOutcome outcome) {}

    /**
     * Folds; nothing is written.
     *
     * @throws Fault of kind input where more is quarantined than the plant allows, or a showing disagrees with itself
     */
    public static Folded fold(Plant plant, Day day, Set<String> without) {
        FoldSettings settings = FoldSettings.usual().withTaskBytes(plant.perTask_bytes());
        FoldResult fold = FoldJob.run(day.source(), day.intake(), settings);
        RecordCounts counts = fold.counts();
        long ofTheDay = counts.read() - counts.passedOver() - counts.leftOut();
        DayCounts dayCounts = new DayCounts(ofTheDay, counts.accepted(), counts.noSignal(), counts.quarantined());
        List<InputFile> inputs = fold.files().stream()
                .map(file -> new InputFile(
                        file.path(), file.bytes(), Instant.ofEpochMilli(file.modified_ms()), Optional.empty()))
                .toList();
        DayMoments moments = DayMoments.of(
                plant.countScale().channels(), fold.moments(), fold.showings().values());
        return new Folded(fold, new DayDraft(day.day(), inputs, dayCounts, moments, List.copyOf(without)));
    }

    /** Refuses a day of which more is quarantined than the plant allows, or that has no records at all. */
    public static void requireSound(Plant plant, Day day, RecordCounts counts) {
        if (counts.read() - counts.passedOver() == 0) {
            throw Fault.input("there are no records of " + day.day())
                    .at(plant.records().path())
                    .remedy("check the path in the plant file and the day");
        }
        if (counts.quarantinedShare() > plant.quarantineLimit()) {
            throw Fault.input("more is quarantined than the plant allows; " + day.day() + " is not posted")
                    .at(plant.records().pathOf(day.day()))
                    .found(Words.share(counts.quarantinedShare()) + " (" + reasons(counts.quarantined()) + ")")
                    .expected("at most " + Words.share(plant.quarantineLimit()))
                    .remedy(
                            "look at quarantine.csv of this run; mend the source, or raise the limit in the plant file");
        }
    }

    /** Refuses to leave out a showing that the day does not have: it is most likely misspelt. */
    public static void requireLeftOut(Folded folded, Set<String> without) {
        if (!without.isEmpty() && folded.fold().counts().leftOut() == 0) {
            throw Fault.input("none of the showings to be left out is among the day's records")
                    .at(folded.draft().day().toString())
                    .found(String.join(", ", without))
                    .remedy("check the id of the showing");
        }
    }

    /**
     * Posts.
     *
     * @throws Fault of kind input where the day holds other records already; of kind busy where somebody else was first
     */
    public static Posted post(Ledger ledger, DayDraft draft, Replace replace) {
        PostOutcome outcome = ledger.post(draft, replace);
        DayEntry entry = ledger.day(draft.day()).orElseThrow();
        return new Posted(entry, outcome);
    }

    /** {@code 14 saturated, 1 unknown sorter}. */
    public static String reasons(Map<String, Long> quarantined) {
        return quarantined.entrySet().stream()
                .map(reason -> Words.number(reason.getValue()) + " " + reason.getKey())
                .reduce((a, b) -> a + ", " + b)
                .orElse("none");
    }
}
