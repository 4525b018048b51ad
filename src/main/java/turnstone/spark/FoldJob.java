package turnstone.spark;

import java.util.Iterator;
import java.util.List;
import java.util.Map;
import java.util.SortedMap;
import java.util.TreeMap;
import org.apache.spark.HashPartitioner;
import org.apache.spark.api.java.JavaPairRDD;
import org.apache.spark.api.java.JavaSparkContext;
import org.apache.spark.broadcast.Broadcast;
import scala.Tuple2;
import turnstone.fault.Fault;
import turnstone.ledger.LedgerKey;
import turnstone.ledger.ShowingSums;
import turnstone.moments.Moments;

/** Folds records into exact moments by key, in one pass and one small shuffle. */
public final class FoldJob {
    private FoldJob() {}

    /**
     * Folds all records of a source.
     *
     * @throws Fault of kind input where a showing has two days, sorters, trays or materials; of kind storage where records were read
     *     that were not counted apart, or the engine failed; of kind usage where the bound on a task is too small to work under
     */
    public static FoldResult run(RecordSource source, IntakeSpec spec, FoldSettings settings) {
        requireBound(spec, settings);
        JavaSparkContext context = source.session().context();
        Broadcast<IntakeSpec> shared = context.broadcast(spec);
        TableColumns columns = source.columns();
        int reducers =
                settings.reducers() > 0 ? settings.reducers() : source.session().slots();
        List<Tuple2<String, byte[]>> gathered = SparkTrouble.guard("folding records", () -> {
            JavaPairRDD<String, byte[]> partials = source.over(cursor ->
                            (Iterator<Tuple2<String, byte[]>>) new FoldTask(cursor, columns, shared.value(), settings))
                    .mapToPair(partial -> partial);
            return partials.repartitionAndSortWithinPartitions(new HashPartitioner(reducers))
                    .mapPartitions(sorted -> (Iterator<Tuple2<String, byte[]>>)
                            new FoldGather(sorted, new FoldShape(shared.value().scale(), settings)))
                    .collect();
        });
        shared.unpersist(false);
        return result(source, spec, gathered);
    }

    private static void requireBound(IntakeSpec spec, FoldSettings settings) {
        long least = FoldShape.least_bytes(spec.scale(), settings);
        if (settings.task_bytes() < least) {
            throw Fault.usage("the bound on a task's memory is too small for one key")
                    .found(settings.task_bytes() + " bytes")
                    .expected("at least " + least + " bytes for " + spec.scale().channels() + " channels");
        }
    }

    private static FoldResult result(RecordSource source, IntakeSpec spec, List<Tuple2<String, byte[]>> gathered) {
        TreeMap<LedgerKey, Moments> moments = new TreeMap<>();
        TreeMap<String, ShowingMerge.Result> showings = new TreeMap<>();
        FoldSummary summary = new FoldSummary(new RecordCounts(0), 0, 0, 0, 0);
        for (Tuple2<String, byte[]> part : gathered) {
            String key = part._1();
            if (FoldKeys.isMoments(key)) {
                moments.put(FoldKeys.ledgerKey(key), Moments.fromBytes(part._2()));
            } else if (FoldKeys.isShowing(key)) {
                String showing = FoldKeys.showing(key);
                showings.put(showing, ShowingMerge.result(showing, part._2()));
            } else {
                summary = Payloads.read(part._2(), FoldSummary::read);
            }
        }
        requireOneIdentity(showings);
        source.requireAll(summary.counts().read());
        return new FoldResult(moments, sums(showings, spec.day()), summary, source.files(), source.readPath());
    }

    private static void requireOneIdentity(SortedMap<String, ShowingMerge.Result> showings) {
        for (Map.Entry<String, ShowingMerge.Result> showing : showings.entrySet()) {
            if (!showing.getValue().conflict().isEmpty()) {
                throw Fault.input("the records of a showing disagree about what it is")
                        .at("showing " + showing.getKey())
                        .found(showing.getValue().conflict())
                        .expected("one day, sorter, tray and material")
                        .remedy("give every showing an id of its own");
            }
        }
    }

    /** The showings of the day; those met only on records of other days or left out are not among them. */
    private static SortedMap<String, ShowingSums> sums(SortedMap<String, ShowingMerge.Result> showings, String day) {
        TreeMap<String, ShowingSums> sums = new TreeMap<>();
        showings.forEach((name, result) -> {
            ShowingSums showing = result.sums();
            boolean any = showing.records() + showing.noSignal() + showing.quarantined() > 0;
            if (any && result.day().equals(day)) {
                sums.put(name, showing);
            }
        });
        return sums;
    }
}
