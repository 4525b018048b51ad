package turnstone.night;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.math.BigInteger;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.EnumMap;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.TreeMap;
import java.util.TreeSet;
import turnstone.decide.Judgement;
import turnstone.decide.Model;
import turnstone.decide.Projector;
import turnstone.ledger.DayCounts;
import turnstone.ledger.DayDraft;
import turnstone.ledger.DayMoments;
import turnstone.ledger.Ledger;
import turnstone.ledger.LedgerKey;
import turnstone.ledger.Replace;
import turnstone.ledger.ShowingSums;
import turnstone.measure.Head;
import turnstone.measure.HeadOutcome;
import turnstone.measure.HeadTrouble;
import turnstone.measure.Instrument;
import turnstone.measure.QuarantineReason;
import turnstone.measure.ReferenceTable;
import turnstone.moments.BlockKernels;
import turnstone.moments.KernelChoice;
import turnstone.moments.Moments;
import turnstone.moments.RowFolder;
import turnstone.plant.Duty;
import turnstone.plant.Plant;
import turnstone.plant.Requirement;
import turnstone.refit.HeldOut;
import turnstone.refit.ModelMaker;
import turnstone.refit.Recipe;
import turnstone.refit.Recipes;
import turnstone.refit.Window;
import turnstone.refit.WindowSums;
import turnstone.sample.SamplePlant;
import turnstone.sample.SampleRecord;
import turnstone.sample.SampleReference;
import turnstone.sample.SampleShowing;
import turnstone.sample.SampleSize;
import turnstone.trial.Estimate;
import turnstone.trial.Estimator;
import turnstone.trial.Recognition;
import turnstone.trial.TallyCell;
import turnstone.trial.TrialForm;
import turnstone.trial.TrialModels;
import turnstone.trial.TrialShowing;
import turnstone.trial.TrialTally;

/** One invented plant in memory, its trial, and the truth that the trial estimates: the same parts as a night, without an engine. */
final class KnownTruth {
    private static final int BLOCK_ROWS = 64;
    private static final double CONFIDENCE = 0.90;

    private final SamplePlant sample;
    private final Plant plant;
    private final ReferenceTable references;
    private final Map<String, Head> heads = new HashMap<>();
    private final HeadTrouble trouble = new HeadTrouble();
    private final double[] output;
    private final double[] counts;

    private KnownTruth(SampleSize size, long seed, Path folder) {
        sample = SamplePlant.of(size, seed);
        Path file = folder.resolve("plant.yaml");
        try {
            Files.createDirectories(folder);
            Files.writeString(file, sample.plantYaml(Path.of("")));
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        plant = Plant.read(file);
        ReferenceTable.Builder builder = ReferenceTable.builder();
        for (LocalDate night : sample.nights()) {
            for (SampleReference one : sample.references(night)) {
                builder.add(one.kind(), one.sorter(), one.beltColumn(), one.time_ms(), one.values());
            }
        }
        references = builder.build();
        output = new double[plant.head().outputs()];
        counts = new double[output.length];
    }

    /** What the trial reports for a duty, and what is true of the candidate on trays without end. */
    record Answer(Estimate reported, double truth) {
        boolean holds() {
            return reported.lower().orElseThrow() <= truth
                    && truth <= reported.upper().orElseThrow();
        }
    }

    /** Answers by duty for one plant. */
    static Map<String, Answer> of(SampleSize size, long seed, Path folder, int unseenTrays) {
        KnownTruth one = new KnownTruth(size, seed, folder);
        return one.answers(unseenTrays);
    }

    private Map<String, Answer> answers(int unseenTrays) {
        List<LocalDate> nights = sample.nights();
        LocalDate last = nights.get(nights.size() - 1);
        Ledger ledger = Places.ledger(plant);
        for (LocalDate night : nights.subList(0, nights.size() - 1)) {
            ledger.post(fold(night), Replace.NO);
        }
        Recipe recipe = Recipes.of(plant).get(0);
        WindowSums sums = WindowSums.read(ledger, Window.before(ledger, last, recipe.window_days()));
        ModelMaker maker = new ModelMaker(plant.materialNames(), plant.head(), plant.countScale());
        Judged trial = trial(last, maker, new TrialPairs.Maker(recipe, sums));
        Judged truth = truth(maker.make(recipe, sums, HeldOut.NOTHING).model(), unseenTrays);
        Map<String, Answer> answers = new TreeMap<>();
        for (Duty duty : plant.duties()) {
            double of = truth.recovery(duty).point().orElseThrow();
            answers.put(duty.name(), new Answer(trial.recovery(duty), of));
        }
        return answers;
    }

    private Judged trial(LocalDate last, ModelMaker maker, TrialPairs.Maker candidate) {
        List<ShowingSums> showings = List.copyOf(fold(last).moments().showings().values());
        TrialModels models =
                TrialPairs.make(maker, candidate, Optional.empty(), showings).models();
        Judged trial = new Judged();
        for (SampleShowing showing : sample.showings(last)) {
            plant.instrument(showing.sorter(), last).ifPresent(instrument -> {
                int group = plant.trayGroup(showing.material(), showing.tray());
                TrialModels.Pair pair = models.find(TrialForm.THIS_FLEET, group, instrument.name())
                        .orElseThrow();
                trial.judge(showing, pair.candidate());
            });
        }
        return trial;
    }

    private Judged truth(Model candidate, int unseenTrays) {
        Judged truth = new Judged();
        Projector projector = Projector.of(candidate);
        Set<String> targets = new TreeSet<>();
        plant.duties().forEach(duty -> targets.addAll(duty.targets()));
        for (String sorter : sample.sorters()) {
            for (String material : sample.materials()) {
                // Recovery rests on the targets alone; the others have only to be there.
                int trays = targets.contains(material) ? unseenTrays : 1;
                for (int tray = 0; tray < trays; tray++) {
                    truth.judge(sample.unseen(sorter, material, tray), projector);
                }
            }
        }
        return truth;
    }

    private HeadOutcome take(SampleRecord record, Instrument instrument) {
        Head head = heads.computeIfAbsent(instrument.name(), name -> Head.of(plant.head(), instrument, references));
        double[] raw = Arrays.stream(record.counts()).asDoubleStream().toArray();
        HeadOutcome outcome = head.apply(raw, 0, record.beltColumn(), record.time_ms(), output, 0, trouble);
        if (outcome == HeadOutcome.ACCEPTED && plant.countScale().toCounts(output, 0, counts, 0) >= 0) {
            throw new IllegalStateException("off the count scale");
        }
        return outcome;
    }

    private DayDraft fold(LocalDate night) {
        Fold fold = new Fold();
        for (SampleShowing showing : sample.showings(night)) {
            List<SampleRecord> records = sample.records(showing);
            plant.instrument(showing.sorter(), night)
                    .ifPresentOrElse(
                            instrument -> fold.add(showing, records, instrument),
                            () -> fold.addUnknownSorter(records.size()));
        }
        return fold.draft(night);
    }

    /** A day on its way to the ledger. */
    private final class Fold {
        private final Map<LedgerKey, RowFolder> folders = new TreeMap<>();
        private final List<ShowingSums> showings = new ArrayList<>();
        private final TreeMap<String, Long> quarantined = new TreeMap<>();
        private final Map<HeadOutcome, Long> total = new EnumMap<>(HeadOutcome.class);

        void addUnknownSorter(long records) {
            quarantined.merge(QuarantineReason.UNKNOWN_SORTER.label(), records, Long::sum);
            total.merge(HeadOutcome.QUARANTINED, records, Long::sum);
        }

        void add(SampleShowing showing, List<SampleRecord> records, Instrument instrument) {
            int group = plant.trayGroup(showing.material(), showing.tray());
            RowFolder folder = folders.computeIfAbsent(
                    new LedgerKey(instrument.name(), showing.material(), group), key -> folder());
            Map<HeadOutcome, Long> outcomes = new EnumMap<>(HeadOutcome.class);
            long[] sums = new long[counts.length];
            for (SampleRecord record : records) {
                HeadOutcome outcome = take(record, instrument);
                outcomes.merge(outcome, 1L, Long::sum);
                total.merge(outcome, 1L, Long::sum);
                if (outcome == HeadOutcome.ACCEPTED) {
                    folder.add(counts, 0);
                    Arrays.setAll(sums, c -> sums[c] + (long) counts[c]);
                } else if (outcome == HeadOutcome.QUARANTINED) {
                    quarantined.merge(trouble.reason().label(), 1L, Long::sum);
                }
            }
            showings.add(new ShowingSums(
                    showing.id(),
                    showing.sorter(),
                    instrument.name(),
                    showing.tray(),
                    group,
                    showing.material(),
                    outcomes.getOrDefault(HeadOutcome.ACCEPTED, 0L),
                    outcomes.getOrDefault(HeadOutcome.NO_SIGNAL, 0L),
                    outcomes.getOrDefault(HeadOutcome.QUARANTINED, 0L),
                    Arrays.stream(sums).mapToObj(BigInteger::valueOf).toList()));
        }

        private RowFolder folder() {
            return new RowFolder(
                    counts.length,
                    plant.countScale().fineChannels(),
                    BlockKernels.choose(KernelChoice.AUTO),
                    BLOCK_ROWS);
        }

        DayDraft draft(LocalDate night) {
            Map<LedgerKey, Moments> moments = new TreeMap<>();
            folders.forEach((key, folder) -> moments.put(key, folder.snapshot()));
            DayCounts dayCounts = new DayCounts(
                    total.values().stream().mapToLong(Long::longValue).sum(),
                    total.getOrDefault(HeadOutcome.ACCEPTED, 0L),
                    total.getOrDefault(HeadOutcome.NO_SIGNAL, 0L),
                    quarantined);
            DayMoments dayMoments = DayMoments.of(counts.length, moments, showings);
            return new DayDraft(night, List.of(), dayCounts, dayMoments, List.of());
        }
    }

    /** Records of showings, judged. */
    private final class Judged {
        private final TrialTally tally = TrialTally.empty();
        private final List<TrialShowing> showings = new ArrayList<>();
        private final Judgement judgement = new Judgement();

        void judge(SampleShowing showing, Projector projector) {
            Instrument instrument =
                    plant.instrument(showing.sorter(), showing.day()).orElseThrow();
            double[] position = new double[projector.rank()];
            for (SampleRecord record : sample.records(showing)) {
                HeadOutcome outcome = take(record, instrument);
                if (outcome == HeadOutcome.NO_SIGNAL) {
                    tally.add(TallyCell.noSignal(showing.id(), showing.material()));
                } else if (outcome == HeadOutcome.ACCEPTED) {
                    projector.judge(counts, 0, position, judgement);
                    tally.add(new TallyCell(
                            showing.id(),
                            showing.material(),
                            projector.material(judgement.material()),
                            judgement.unfamiliar() ? Recognition.UNFAMILIAR : Recognition.FAMILIAR));
                }
            }
            showings.add(new TrialShowing(
                    showing.id(),
                    showing.day(),
                    showing.sorter(),
                    instrument.name(),
                    showing.tray(),
                    0,
                    showing.material()));
        }

        Estimate recovery(Duty duty) {
            return new Estimator(showings).estimate(Requirement.Figure.DECISION_RECOVERY, duty, tally, CONFIDENCE);
        }
    }
}
