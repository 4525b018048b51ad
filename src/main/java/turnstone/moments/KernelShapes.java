package turnstone.moments;

/** The check of shapes that every block kernel makes before it touches an array. */
final class KernelShapes {
    private KernelShapes() {}

    static void check(double[] rows, int rowCount, int channels, double[] triangle) {
        if (channels < 1 || channels > 2 * Bounds.MOST_CHANNELS) {
            throw new IllegalArgumentException(
                    "columns must be 1 to " + 2 * Bounds.MOST_CHANNELS + ", not " + channels);
        }
        if (rowCount < 0 || rowCount > Bounds.TRIANGLE_RECORDS) {
            throw new IllegalArgumentException("records must be 0 to " + Bounds.TRIANGLE_RECORDS + ", not " + rowCount);
        }
        if ((long) rowCount * channels > rows.length) {
            throw new IllegalArgumentException(rowCount + " records of " + channels + " need "
                    + (long) rowCount * channels + " numbers, not " + rows.length);
        }
        if (triangle.length < Bounds.triangle(channels)) {
            throw new IllegalArgumentException("a triangle of " + channels + " needs " + Bounds.triangle(channels)
                    + " numbers, not " + triangle.length);
        }
    }
}
