package turnstone.decide;

/** What a {@link Projector} says of one record; a holder that is written over for the next. Not thread-safe. */
public final class Judgement {
    private int material;
    private double margin;
    private double distance;
    private double residual;
    private boolean unfamiliar;

    /** A holder with no meaning until it is written to. */
    public Judgement() {
        material = -1;
    }

    void set(int decided, double marginFound, double distanceFound) {
        material = decided;
        margin = marginFound;
        distance = distanceFound;
        residual = Double.NaN;
        unfamiliar = false;
    }

    void residual(double energy) {
        residual = energy;
    }

    void markUnfamiliar() {
        unfamiliar = true;
    }

    /** Index of the nearest material in the model's order, whatever the flag. */
    public int material() {
        return material;
    }

    /** Second smallest minus smallest squared distance, prior term included; 0 or more. */
    public double margin() {
        return margin;
    }

    /** Distance from the position to the decided material, in within-variance units. */
    public double distance() {
        return distance;
    }

    /** Energy outside the axes; NaN where the model has no residual term or only a position was judged. */
    public double residual() {
        return residual;
    }

    /** Whether the record lies beyond what the model knows, by position or by residual. */
    public boolean unfamiliar() {
        return unfamiliar;
    }
}
