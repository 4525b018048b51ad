package turnstone.moments;

import java.util.concurrent.atomic.AtomicReference;

/**
 * The block kernel in plain Java: packed, with tiles of 4 by 4 sums held in locals while the records go by.
 *
 * <p>Columns are packed four by four, {@code packed[(group * records + k) * 4 + c]}, zero past the last column, for at most {@link #PACKED_RECORDS}
 * records at a time; so wide records are no slower than narrow ones. Tiles are made whole, on the diagonal and past the edge too; only entries of
 * the triangle are stored.
 */
final class ScalarKernel implements BlockKernel {
    /** Records packed at a time: 256 records of a group are 8 kB. */
    static final int PACKED_RECORDS = 256;

    private static final int TILE = 4;

    /** The scratch space, when no fold has it. A thread that finds none makes its own. */
    private final AtomicReference<double[]> scratch = new AtomicReference<>(new double[0]);

    @Override
    public String name() {
        return "scalar";
    }

    @Override
    public void fold(double[] rows, int rowCount, int channels, double[] triangle) {
        KernelShapes.check(rows, rowCount, channels, triangle);
        int groups = (channels + TILE - 1) / TILE;
        int needed = groups * TILE * Math.min(rowCount, PACKED_RECORDS);
        double[] packed = scratch.getAndSet(null);
        if (packed == null || packed.length < needed) {
            packed = new double[needed];
        }
        double[] tile = new double[TILE * TILE];
        for (int first = 0; first < rowCount; first += PACKED_RECORDS) {
            int records = Math.min(PACKED_RECORDS, rowCount - first);
            pack(rows, first, records, channels, packed);
            for (int column = 0; column < channels; column += TILE) {
                for (int row = column; row < channels; row += TILE) {
                    multiply(packed, row * records, column * records, records, tile);
                    store(tile, row, column, channels, triangle);
                }
            }
        }
        scratch.set(packed);
    }

    private static void pack(double[] rows, int first, int records, int channels, double[] packed) {
        int to = 0;
        for (int column = 0; column < channels; column += TILE) {
            int width = Math.min(TILE, channels - column);
            for (int k = 0; k < records; k++, to += TILE) {
                int from = (first + k) * channels + column;
                for (int c = 0; c < TILE; c++) {
                    packed[to + c] = c < width ? rows[from + c] : 0;
                }
            }
        }
    }

    private static void store(double[] tile, int row, int column, int channels, double[] triangle) {
        int end = Math.min(row + TILE, channels);
        for (int i = row, from = 0; i < end; i++, from += TILE) {
            int to = Bounds.at(i, column);
            int width = Math.min(TILE, i - column + 1);
            for (int c = 0; c < width; c++) {
                triangle[to + c] += tile[from + c];
            }
        }
    }

    /** {@code tile[r * 4 + c]} becomes the sum of products of the columns of row r and of c. */
    private static void multiply(double[] packed, int high, int low, int records, double[] tile) {
        double s00 = 0, s01 = 0, s02 = 0, s03 = 0;
        double s10 = 0, s11 = 0, s12 = 0, s13 = 0;
        double s20 = 0, s21 = 0, s22 = 0, s23 = 0;
        double s30 = 0, s31 = 0, s32 = 0, s33 = 0;
        for (int k = 0; k < records; k++) {
            double a = packed[low + TILE * k];
            double b = packed[low + TILE * k + 1];
            double c = packed[low + TILE * k + 2];
            double d = packed[low + TILE * k + 3];
            double x = packed[high + TILE * k];
            s00 += x * a;
            s01 += x * b;
            s02 += x * c;
            s03 += x * d;
            x = packed[high + TILE * k + 1];
            s10 += x * a;
            s11 += x * b;
            s12 += x * c;
            s13 += x * d;
            x = packed[high + TILE * k + 2];
            s20 += x * a;
            s21 += x * b;
            s22 += x * c;
            s23 += x * d;
            x = packed[high + TILE * k + 3];
            s30 += x * a;
            s31 += x * b;
            s32 += x * c;
            s33 += x * d;
        }
        put(tile, 0, s00, s01, s02, s03);
        put(tile, TILE, s10, s11, s12, s13);
        put(tile, 2 * TILE, s20, s21, s22, s23);
        put(tile, 3 * TILE, s30, s31, s32, s33);
    }

    private static void put(double[] tile, int at, double a, double b, double c, double d) {
        tile[at] = a;
        tile[at + 1] = b;
        tile[at + 2] = c;
        tile[at + 3] = d;
    }
}
