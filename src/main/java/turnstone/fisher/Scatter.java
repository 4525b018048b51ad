package turnstone.fisher;

import turnstone.measure.Tail;

/**
 * The sums of a request made ready: scatter and means in pretreated units, from which fits of several ridges and ranks are made.
 *
 * <p>Immutable; making it is about half the cost of a fit. {@link #through} gives the same sums through another tail.
 */
public final class Scatter {
    private final FitRequest request;
    private final HeadScatter head;
    private final TailMatrix tail;
    private final ExtendedMatrix within;

    private Scatter(FitRequest request, HeadScatter head) {
        this.request = request;
        this.head = head;
        tail = new TailMatrix(request.tail());
        within = tail.sandwich(head.within());
    }

    /**
     * Forms the scatter.
     *
     * @throws turnstone.fault.Fault of kind input where there are fewer than two materials or one has no records
     */
    public static Scatter of(FitRequest request) {
        return of(request, ScatterMemo.nothing());
    }

    /**
     * Forms the scatter, that of cells met before taken from a memo.
     *
     * @throws turnstone.fault.Fault as {@link #of(FitRequest)}
     */
    public static Scatter of(FitRequest request, ScatterMemo memo) {
        return new Scatter(request, HeadScatter.of(request.scale(), Parts.of(request, memo), memo));
    }

    /** The same sums through another tail. */
    public Scatter through(Tail other) {
        return new Scatter(request.withTail(other), head);
    }

    /**
     * Fits.
     *
     * @param rank number of axes kept; 0 for all
     * @throws turnstone.fault.Fault as {@link Fit#of}
     */
    public Fit fit(Ridge ridge, int rank) {
        FitRequest asked = request.withRidge(ridge).withRank(rank);
        return new Fit(asked, new Solver(asked, this).solve());
    }

    HeadScatter head() {
        return head;
    }

    TailMatrix tail() {
        return tail;
    }

    /** W in pretreated units, p × p, symmetric and full; not to be changed. */
    ExtendedMatrix within() {
        return within;
    }

    FitRequest request() {
        return request;
    }

    long degreesOfFreedom() {
        return head.parts().total().records() - head.parts().materials();
    }
}
