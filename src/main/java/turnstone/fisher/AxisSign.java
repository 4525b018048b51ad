package turnstone.fisher;

/** The rule that gives an axis its sign. */
final class AxisSign {
    /** Components smaller than this share of the largest may be rounding, and don't decide. */
    private static final double DECIDING_SHARE = 1e-9;

    private AxisSign() {}

    /** 1 where the first component whose size exceeds the share of the largest is positive, or all are zero; −1 otherwise. */
    static double of(double[] axis) {
        double largest = 0;
        for (double component : axis) {
            largest = Math.max(largest, Math.abs(component));
        }
        for (double component : axis) {
            if (Math.abs(component) > DECIDING_SHARE * largest) {
                return component < 0 ? -1 : 1;
            }
        }
        return 1;
    }
}
