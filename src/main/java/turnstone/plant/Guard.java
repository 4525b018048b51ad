package turnstone.plant;

import java.util.Arrays;
import java.util.List;

/**
 * A limit beside the gain, which keeps a release from harm; a margin of non-inferiority belongs here and nowhere else.
 *
 * @param kind what is guarded
 * @param limit the most or the least that will do, see {@link Kind#side}
 * @param bound the figure itself, or {@code LOWER} for the end of its interval that speaks against a release; only for
 *     {@link Kind#hasInterval}
 * @param confidence of that end, one-sided
 */
public record Guard(Kind kind, double limit, Requirement.Bound bound, double confidence) {
    /** Which side of the limit will do. */
    public enum Side {
        /** What is found may be at most the limit. */
        MOST,
        /** What is found must be at least the limit. */
        LEAST;

        /** The key of the limit in the plant file. */
        public String key() {
            return Words.of(this);
        }
    }

    /** What a limit and what is found are counted in. */
    public enum Unit {
        /** A share, shown in per cent. */
        SHARE,
        /** A difference of shares, shown in points. */
        DIFFERENCE,
        /** A plain number. */
        NUMBER,
        /** Degrees of arc. */
        DEGREES,
        /** Days. */
        DAYS
    }

    /** What can be guarded. */
    public enum Kind {
        /** Recovery that the worst sorter loses against what is in service. */
        SORTER_LOSS("sorter loss", Side.MOST, Unit.DIFFERENCE),
        /** Purity that the fleet loses against what is in service. */
        PURITY_LOSS("purity loss", Side.MOST, Unit.DIFFERENCE),
        /** Recovery that the integer form of the board loses. */
        BOARD_LOSS("board loss", Side.MOST, Unit.DIFFERENCE),
        /** Share of the day's records in quarantine. */
        QUARANTINED_SHARE("quarantined share", Side.MOST, Unit.SHARE),
        /** Share of the day's records in quarantine for a stale white. */
        STALE_WHITE_SHARE("stale white share", Side.MOST, Unit.SHARE),
        /** Showings of the material of the infeed with the fewest. */
        SHOWINGS("showings", Side.LEAST, Unit.NUMBER),
        /** Reciprocal condition of the candidate's within scatter. */
        RECIPROCAL_CONDITION("reciprocal condition", Side.LEAST, Unit.NUMBER),
        /** Largest principal angle between the axes of the candidate and of what is in service. */
        PRINCIPAL_ANGLE("principal angle_degrees", Side.MOST, Unit.DEGREES),
        /** Days since the last release. */
        DAYS_SINCE_RELEASE("days since release", Side.LEAST, Unit.DAYS);

        private final String label;
        private final Side side;
        private final Unit unit;

        Kind(String label, Side side, Unit unit) {
            this.label = label;
            this.side = side;
            this.unit = unit;
        }

        /** The name in the plant file and in verdicts. */
        public String label() {
            return label;
        }

        /** Whether the limit is the most or the least that will do. */
        public Side side() {
            return side;
        }

        /** What it is counted in. */
        public Unit unit() {
            return unit;
        }

        /** Whether showings give it an interval. */
        public boolean hasInterval() {
            return this == SORTER_LOSS || this == PURITY_LOSS;
        }

        static List<String> labels() {
            return Arrays.stream(values()).map(Kind::label).toList();
        }

        static Kind of(String label) {
            return Arrays.stream(values())
                    .filter(kind -> kind.label.equals(label))
                    .findFirst()
                    .orElseThrow(() -> new IllegalArgumentException("no such guard: " + label));
        }
    }

    /** For people and files: {@code guard: sorter loss, upper bound}. */
    public String name() {
        if (!kind.hasInterval()) {
            return "guard: " + kind.label();
        }
        return "guard: " + kind.label() + ", " + (bound == Requirement.Bound.POINT ? "point" : "upper bound");
    }
}
