package turnstone.table;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.decide.MadeFrom;
import turnstone.decide.Model;
import turnstone.decide.ModelContext;
import turnstone.fault.Fault;
import turnstone.fisher.Cell;
import turnstone.fisher.Fit;
import turnstone.fisher.FitRequest;
import turnstone.fisher.Ridge;
import turnstone.fisher.RoundedSource;
import turnstone.json.Json;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.ScaleLoss;
import turnstone.measure.TailSpec;
import turnstone.moments.Moments;
import turnstone.spark.FoldJob;
import turnstone.spark.FoldResult;
import turnstone.spark.FoldSettings;
import turnstone.spark.IntakeSpec;
import turnstone.spark.ProjectJob;
import turnstone.spark.RecordCounts;
import turnstone.spark.RecordSource;
import turnstone.spark.ScaleJob;
import turnstone.spark.Session;

/** Fits a table once: count scale, exact sums by label, projection. */
public final class TableFit {
    private static final String SCOPE = "table";
    /** Labels order by code points, which for a pair of surrogates is not the order of Java's chars. */
    private static final Comparator<String> CODE_POINTS =
            Comparator.comparing(text -> text.codePoints().toArray(), java.util.Arrays::compare);

    private TableFit() {}

    /**
     * What to fit, and how.
     *
     * @param table the table, with a label
     * @param ridge a share of the mean diagonal of the within scatter; empty for analytic shrinkage, which counts records here
     * @param axes kept; 0 keeps all
     * @param mix weights of the between scatter and decision prior
     * @param scale the count scale; empty for the largest powers of ten that lose nothing
     * @param unfamiliarShare the share of good records that may be flagged
     * @param mostQuarantined the largest share of quarantined records, 0 to 1
     */
    public record Order(
            Table table,
            OptionalDouble ridge,
            int axes,
            Mix mix,
            Optional<CountScale> scale,
            double unfamiliarShare,
            double mostQuarantined) {}

    /**
     * A fitted table.
     *
     * @param model the model
     * @param counts what became of the records
     * @param loss what the count scale cost
     * @param momentsFingerprint of the sums, over labels in order
     */
    public record Result(Model model, RecordCounts counts, ScaleLoss loss, String momentsFingerprint) {}

    /**
     * Fits.
     *
     * @throws Fault of kind input where too much is quarantined or the sums can't be fitted
     */
    public static Result run(Session session, Order order) {
        RecordSource source = order.table().open(session);
        CountScale scale =
                order.scale().orElseGet(() -> ScaleJob.propose(source).scale());
        if (scale.channels() != source.channels()) {
            throw Fault.input("the count scale is for another number of channels")
                    .at(order.table().path())
                    .found(scale.channels() + " in the scale")
                    .expected(source.channels() + ", as in the table");
        }
        IntakeSpec intake = IntakeSpec.table(HeadSpec.none(source.channels()), scale);
        ScaleLoss loss = ScaleJob.loss(source, intake);
        FoldResult fold = FoldJob.run(source, intake, FoldSettings.usual());
        ProjectJob.requireFew(fold.counts(), order.mostQuarantined());
        TreeMap<String, Moments> byLabel = new TreeMap<>(CODE_POINTS);
        byLabel.putAll(fold.byMaterial());
        if (byLabel.size() < 2) {
            throw Fault.input("a projection needs records of at least two labels")
                    .at(order.table().path())
                    .found(byLabel.isEmpty() ? "none" : byLabel.firstKey() + " only");
        }
        Model model = model(source, order, scale, loss, byLabel);
        return new Result(model, fold.counts(), loss, fingerprint(byLabel));
    }

    private static Model model(
            RecordSource source, Order order, CountScale scale, ScaleLoss loss, SortedMap<String, Moments> byLabel) {
        List<String> labels = List.copyOf(byLabel.keySet());
        List<List<Cell>> cells = new ArrayList<>();
        byLabel.values().forEach(moments -> cells.add(List.of(Cell.asCounted(moments))));
        long[] records = byLabel.values().stream().mapToLong(Moments::records).toArray();
        long total = java.util.Arrays.stream(records).sum();
        double[] shares = order.mix().shares(labels, records);
        Fit fit = Fit.of(FitRequest.of(labels, cells, scale)
                .withRidge(
                        order.ridge().isPresent() ? Ridge.amount(order.ridge().getAsDouble()) : Ridge.analytic(total))
                .withRank(order.axes())
                .withBetweenShares(order.mix() instanceof Mix.AsCounted ? null : shares)
                .withRoundedSource(loss.isLossless() ? RoundedSource.LOSSLESS : RoundedSource.ROUNDED)
                .withChannelNames(source.channelNames()));
        ModelContext context = ModelContext.of(SCOPE, source.channelNames(), scale, madeFrom(source, byLabel))
                .withPretreatment(pretreatment(source.channels()))
                .withBalance(Json.object().put("materials", word(order.mix())))
                .withDecisionPriors(shares)
                .withUnfamiliarShare(order.unfamiliarShare());
        return Model.of(fit, loss.isLossless() ? context : context.withScaleLoss(loss.largestDistance()));
    }

    private static String word(Mix mix) {
        return mix instanceof Mix.AsCounted ? "as counted" : mix instanceof Mix.Equal ? "equal" : "listed";
    }

    private static ObjectNode pretreatment(int channels) {
        ObjectNode node = Json.object();
        node.set("head", HeadSpec.none(channels).json());
        node.set("tail", TailSpec.none().json());
        return node;
    }

    private static MadeFrom madeFrom(RecordSource source, SortedMap<String, Moments> byLabel) {
        List<MadeFrom.Part> parts = new ArrayList<>();
        byLabel.forEach((label, moments) -> parts.add(new MadeFrom.Part("", label, moments.records(), 0)));
        List<String> inputs = source.files().stream().map(file -> file.path()).toList();
        return new MadeFrom(List.of(), parts, Optional.of(fingerprint(byLabel)), inputs);
    }

    private static String fingerprint(SortedMap<String, Moments> byLabel) {
        ObjectNode node = Json.object();
        byLabel.forEach((label, moments) -> node.put(label, moments.fingerprint()));
        return Json.fingerprint(node);
    }
}
