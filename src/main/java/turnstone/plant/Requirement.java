package turnstone.plant;

/**
 * A written condition on a figure of the trial, whatever is in service.
 *
 * @param figure what is held against it
 * @param unseen what the models of the trial have not seen
 * @param reach what its interval speaks for; it says nothing where the bound is the point
 * @param least the smallest value that meets it, between 0 and 1
 * @param bound the point value or the lower bound of the interval
 * @param confidence of the interval, two-sided, between 0.5 and 1; it says nothing where the bound is the point
 */
public record Requirement(Figure figure, Unseen unseen, Reach reach, double least, Bound bound, double confidence) {
    /** A figure of the trial. */
    public enum Figure {
        /** Of what was sent to the product stream, the mass share that is target. */
        DECISION_PURITY,
        /** Of the target, the mass share sent to the product stream. */
        DECISION_RECOVERY;

        static Figure of(String word) {
            return Words.constant(Figure.class, word);
        }
    }

    /** What an interval speaks for. */
    public enum Reach {
        /** These sorters on these days; showings are the unit of chance. */
        THIS_FLEET_TONIGHT,
        /** The figure over many machines of this kind; sorters are the unit of chance. */
        MACHINES_LIKE_THESE,
        /** The figure of one machine more. */
        ONE_NEW_MACHINE;

        /** The words in the plant file and in verdicts. */
        public String label() {
            return Words.of(this);
        }

        static Reach of(String word) {
            return Words.constant(Reach.class, word);
        }
    }

    /** What is held out of the models that a record is judged by. */
    public enum Unseen {
        /** The tray group of the record. */
        TRAY,
        /** The tray group and the instrument of the record. */
        MACHINE;

        static Unseen of(String word) {
            return Words.constant(Unseen.class, word);
        }
    }

    /** Which value of the figure counts. */
    public enum Bound {
        /** The figure itself. */
        POINT,
        /** The lower end of its interval. */
        LOWER;

        static Bound of(String word) {
            return Words.constant(Bound.class, word);
        }
    }

    /** A condition for this fleet tonight. */
    public Requirement(Figure figure, Unseen unseen, double least, Bound bound, double confidence) {
        this(figure, unseen, Reach.THIS_FLEET_TONIGHT, least, bound, confidence);
    }

    /** For people: {@code decision purity, tray not seen, lower bound}; with the reach where it is not this fleet. */
    public String name() {
        return Words.of(figure)
                + ", "
                + Words.of(unseen)
                + " not seen, "
                + (reach == Reach.THIS_FLEET_TONIGHT ? "" : reach.label() + ", ")
                + (bound == Bound.POINT ? "point" : "lower bound");
    }
}
