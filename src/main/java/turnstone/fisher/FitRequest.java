package turnstone.fisher;

import java.util.List;
import java.util.Objects;
import java.util.stream.IntStream;
import turnstone.measure.CountScale;
import turnstone.measure.Tail;

/**
 * Everything that a fit depends on.
 *
 * <p>Made by {@link #of}, then refined by the {@code with} methods, each of which returns another request.
 */
public final class FitRequest {
    /** Largest distance of the sum of the shares from 1: rounding of a few hundred shares written as decimals. */
    static final double SHARE_SUM_TOLERANCE = 1e-9;

    private final List<String> materials;
    private final List<List<Cell>> cells;
    private final CountScale scale;
    private final Tail tail;
    private final Ridge ridge;
    private final double[] betweenShares;
    private final int rank;
    private final RoundedSource roundedSource;
    private final List<String> channelNames;

    private FitRequest(
            List<String> materials,
            List<List<Cell>> cells,
            CountScale scale,
            Tail tail,
            Ridge ridge,
            double[] betweenShares,
            int rank,
            RoundedSource roundedSource,
            List<String> channelNames) {
        this.materials = List.copyOf(materials);
        this.cells = cells.stream().map(List::copyOf).toList();
        this.channelNames = List.copyOf(channelNames);
        this.scale = scale;
        this.tail = tail;
        this.ridge = Objects.requireNonNull(ridge, "ridge");
        this.roundedSource = Objects.requireNonNull(roundedSource, "roundedSource");
        this.rank = rank;
        this.betweenShares = betweenShares == null ? null : betweenShares.clone();
        require(materials.size() == cells.size(), "one list of cells per material");
        require(materials.stream().distinct().count() == materials.size(), "materials named once each");
        require(tail.inputs() == scale.channels(), "a tail that takes the scale's channels");
        require(channelNames.size() == scale.channels(), "one name per channel");
        require(rank >= 0, "a rank of 0 or more");
        for (List<Cell> ofMaterial : cells) {
            for (Cell cell : ofMaterial) {
                require(cell.moments().channels() == scale.channels(), "moments of the scale's channels");
            }
        }
        checkShares(betweenShares, materials.size());
    }

    /** A request with no tail, no ridge, all axes, between shares as counted, lossless counts and channels c1, c2, … */
    public static FitRequest of(List<String> materials, List<List<Cell>> cells, CountScale scale) {
        List<String> names = IntStream.rangeClosed(1, scale.channels())
                .mapToObj(i -> "c" + i)
                .toList();
        Tail tail = Tail.identity(scale.channels());
        return new FitRequest(materials, cells, scale, tail, Ridge.NONE, null, 0, RoundedSource.LOSSLESS, names);
    }

    /** The same with another tail. */
    public FitRequest withTail(Tail other) {
        return new FitRequest(materials, cells, scale, other, ridge, betweenShares, rank, roundedSource, channelNames);
    }

    /** The same with another ridge. */
    public FitRequest withRidge(Ridge other) {
        return new FitRequest(materials, cells, scale, tail, other, betweenShares, rank, roundedSource, channelNames);
    }

    /** The same with given weights of the materials in the between scatter; null for the shares of their records. */
    public FitRequest withBetweenShares(double[] shares) {
        return new FitRequest(materials, cells, scale, tail, ridge, shares, rank, roundedSource, channelNames);
    }

    /** The same with another number of axes kept; 0 for all. */
    public FitRequest withRank(int axes) {
        return new FitRequest(materials, cells, scale, tail, ridge, betweenShares, axes, roundedSource, channelNames);
    }

    /** The same with a statement whether the counts are rounded. */
    public FitRequest withRoundedSource(RoundedSource source) {
        return new FitRequest(materials, cells, scale, tail, ridge, betweenShares, rank, source, channelNames);
    }

    /** The same with names for the channels. */
    public FitRequest withChannelNames(List<String> names) {
        return new FitRequest(materials, cells, scale, tail, ridge, betweenShares, rank, roundedSource, names);
    }

    /** Names, in the order that decides ties and sets the order of all results. */
    public List<String> materials() {
        return materials;
    }

    /** Per material, its cells; the order of cells within a material has no influence on the result. */
    public List<List<Cell>> cells() {
        return cells;
    }

    /** Turns counts into head-output values. */
    public CountScale scale() {
        return scale;
    }

    /** Applied to the sums; its inputs are the scale's channels. */
    public Tail tail() {
        return tail;
    }

    /** See {@link Ridge}. */
    public Ridge ridge() {
        return ridge;
    }

    /** Number of axes kept; 0 for all. */
    public int rank() {
        return rank;
    }

    /** Whether the counts hold the source's values exactly. */
    public RoundedSource roundedSource() {
        return roundedSource;
    }

    /** One per channel of the scale, for messages. */
    public List<String> channelNames() {
        return channelNames;
    }

    /** Weight of each material in the between scatter, summing to 1; null for the share of its records. */
    public double[] betweenShares() {
        return betweenShares == null ? null : betweenShares.clone();
    }

    private static void checkShares(double[] shares, int materials) {
        if (shares == null) {
            return;
        }
        require(shares.length == materials, "one between share per material");
        double sum = 0;
        for (double share : shares) {
            require(share > 0 && !Double.isInfinite(share), "positive between shares");
            sum += share;
        }
        require(Math.abs(sum - 1) <= SHARE_SUM_TOLERANCE, "between shares that sum to 1");
    }

    private static void require(boolean holds, String what) {
        if (!holds) {
            throw new IllegalArgumentException("a fit needs " + what);
        }
    }
}
