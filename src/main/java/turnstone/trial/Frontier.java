package turnstone.trial;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.OptionalDouble;
import java.util.OptionalInt;
import turnstone.json.Json;
import turnstone.plant.Duty;

/**
 * Decision purity against decision recovery under a duty's infeed mix, as the cut moves over the edges of {@link ScoreBins}.
 *
 * <p>Between two cuts the records of the bin are taken to be spread evenly, so figures at a required value are interpolated: a bin is at most
 * 1/32 of its score wide, or 1/8. Where the frontier crosses a required purity more than once, the crossing with the most recovery counts.
 */
public final class Frontier {
    /**
     * One cut.
     *
     * @param cut as {@link ScoreBins} counts them
     * @param purity NaN where nothing is sent to the product stream
     * @param recovery share of the target's mass sent there
     */
    public record Point(int cut, double purity, double recovery) {}

    private final double[] targetSent;
    private final double[] otherSent;
    private final double targetShare;
    private final Duty.Stream stream;

    /** Masses sent to the product stream at each cut, 0 to {@link ScoreBins#COUNT}. */
    Frontier(Duty.Stream stream, double[] targetSent, double[] otherSent, double targetShare) {
        this.stream = stream;
        this.targetSent = targetSent;
        this.otherSent = otherSent;
        this.targetShare = targetShare;
    }

    /** The frontier of all these showings on the duty's sorters; every material of the mix must be among them. */
    public static Frontier of(Duty duty, ScoreHistogram histogram, Iterable<TrialShowing> showings) {
        Map<String, TrialShowing> known = new HashMap<>();
        showings.forEach(showing -> known.put(showing.showing(), showing));
        FrontierSums sums = FrontierSums.empty(duty);
        histogram.rows().forEach((key, row) -> {
            TrialShowing showing = known.get(key.showing());
            if (showing == null) {
                throw new IllegalArgumentException("a showing that the trial does not know: " + key.showing());
            }
            if (duty.sorters().contains(showing.sorter())) {
                sums.add(key.truth(), row);
            }
        });
        return sums.frontier();
    }

    /** The figures at a cut. */
    public Point at(int cut) {
        double sent = targetSent[cut] + otherSent[cut];
        return new Point(cut, sent == 0 ? Double.NaN : targetSent[cut] / sent, targetSent[cut] / targetShare);
    }

    /** All cuts, from the one that sends most to the product stream to the one that sends least. */
    public List<Point> points() {
        List<Point> points = new ArrayList<>();
        for (int i = 0; i <= ScoreBins.COUNT; i++) {
            points.add(at(cut(i)));
        }
        return points;
    }

    /** The cut with the most recovery among those of at least this purity; empty where none reaches it. */
    public OptionalInt loosestOfPurity(double purity) {
        for (int i = 0; i <= ScoreBins.COUNT; i++) {
            if (at(cut(i)).purity() >= purity) {
                return OptionalInt.of(cut(i));
            }
        }
        return OptionalInt.empty();
    }

    /** The cut that sends least among those of at least this recovery; empty where none reaches it. */
    public OptionalInt tightestOfRecovery(double recovery) {
        OptionalInt tightest = OptionalInt.empty();
        for (int i = 0; i <= ScoreBins.COUNT && at(cut(i)).recovery() >= recovery; i++) {
            tightest = OptionalInt.of(cut(i));
        }
        return tightest;
    }

    /** Recovery where purity is this; empty where no cut reaches it. */
    public OptionalDouble recoveryAtPurity(double purity) {
        OptionalInt loosest = loosestOfPurity(purity);
        if (loosest.isEmpty()) {
            return OptionalDouble.empty();
        }
        int cut = loosest.getAsInt();
        int looser = looser(cut);
        if (looser < 0 || looser > ScoreBins.COUNT) {
            return OptionalDouble.of(targetSent[cut] / targetShare);
        }
        double target = targetSent[looser] - targetSent[cut];
        double all = target + otherSent[looser] - otherSent[cut];
        // (A + f·a) = P·(A + C + f·(a + o)); the looser cut is under P, so the denominator is positive.
        double fraction = (targetSent[cut] - purity * (targetSent[cut] + otherSent[cut])) / (purity * all - target);
        return OptionalDouble.of((targetSent[cut] + Math.min(1, fraction) * target) / targetShare);
    }

    /** Purity where recovery is this; empty where no cut reaches it. */
    public OptionalDouble purityAtRecovery(double recovery) {
        OptionalInt tightest = tightestOfRecovery(recovery);
        if (tightest.isEmpty()) {
            return OptionalDouble.empty();
        }
        int cut = tightest.getAsInt();
        int tighter = cut - (looser(cut) - cut);
        if (tighter < 0 || tighter > ScoreBins.COUNT) {
            return OptionalDouble.of(at(cut).purity());
        }
        double wanted = recovery * targetShare;
        double fraction = (wanted - targetSent[tighter]) / (targetSent[cut] - targetSent[tighter]);
        double other = otherSent[tighter] + fraction * (otherSent[cut] - otherSent[tighter]);
        return OptionalDouble.of(wanted / (wanted + other));
    }

    private int looser(int cut) {
        return stream == Duty.Stream.EJECTED ? cut - 1 : cut + 1;
    }

    private int cut(int fromLoosest) {
        return stream == Duty.Stream.EJECTED ? fromLoosest : ScoreBins.COUNT - fromLoosest;
    }

    /** {@code [[cut, purity, recovery], …]} where the figures change, loosest first; purity is null where nothing is sent. */
    public ObjectNode json() {
        ObjectNode node = Json.object();
        ArrayNode list = node.putArray("frontier");
        Point last = null;
        for (Point point : points()) {
            boolean moved = last == null || last.recovery() != point.recovery() || last.purity() != point.purity();
            if (moved && !(Double.isNaN(point.purity()) && last != null && Double.isNaN(last.purity()))) {
                ArrayNode line = list.addArray().add(point.cut());
                if (Double.isNaN(point.purity())) {
                    line.addNull();
                } else {
                    line.add(point.purity());
                }
                line.add(point.recovery());
            }
            last = point;
        }
        return node;
    }
}
