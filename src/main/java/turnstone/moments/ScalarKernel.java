package turnstone.moments;

/**
 * The block kernel in plain Java: tiles of 4 by 4 entries held in locals while the records of the block go by.
 *
 * <p>Tiles on the diagonal compute some entries above it and don't store them. A last tile that would run over the edge is handled entry by entry.
 */
final class ScalarKernel implements BlockKernel {
    private static final int TILE = 4;

    @Override
    public String name() {
        return "scalar";
    }

    @Override
    public void fold(double[] rows, int rowCount, int channels, double[] triangle) {
        KernelShapes.check(rows, rowCount, channels, triangle);
        int whole = channels - channels % TILE;
        for (int i = 0; i < whole; i += TILE) {
            for (int j = 0; j <= i; j += TILE) {
                tile(rows, rowCount, channels, triangle, i, j);
            }
        }
        for (int i = whole; i < channels; i++) {
            edge(rows, rowCount, channels, triangle, i);
        }
    }

    private static void edge(double[] rows, int rowCount, int channels, double[] triangle, int i) {
        for (int j = 0; j <= i; j++) {
            double sum = 0;
            for (int k = 0, at = 0; k < rowCount; k++, at += channels) {
                sum += rows[at + i] * rows[at + j];
            }
            triangle[Bounds.at(i, j)] += sum;
        }
    }

    private static void tile(double[] rows, int rowCount, int channels, double[] triangle, int i, int j) {
        double s00 = 0, s01 = 0, s02 = 0, s03 = 0;
        double s10 = 0, s11 = 0, s12 = 0, s13 = 0;
        double s20 = 0, s21 = 0, s22 = 0, s23 = 0;
        double s30 = 0, s31 = 0, s32 = 0, s33 = 0;
        for (int k = 0, at = 0; k < rowCount; k++, at += channels) {
            double x0 = rows[at + j];
            double x1 = rows[at + j + 1];
            double x2 = rows[at + j + 2];
            double x3 = rows[at + j + 3];
            double y = rows[at + i];
            s00 += y * x0;
            s01 += y * x1;
            s02 += y * x2;
            s03 += y * x3;
            y = rows[at + i + 1];
            s10 += y * x0;
            s11 += y * x1;
            s12 += y * x2;
            s13 += y * x3;
            y = rows[at + i + 2];
            s20 += y * x0;
            s21 += y * x1;
            s22 += y * x2;
            s23 += y * x3;
            y = rows[at + i + 3];
            s30 += y * x0;
            s31 += y * x1;
            s32 += y * x2;
            s33 += y * x3;
        }
        boolean diagonal = i == j;
        store(triangle, Bounds.at(i, j), diagonal ? 1 : TILE, s00, s01, s02, s03);
        store(triangle, Bounds.at(i + 1, j), diagonal ? 2 : TILE, s10, s11, s12, s13);
        store(triangle, Bounds.at(i + 2, j), diagonal ? 3 : TILE, s20, s21, s22, s23);
        store(triangle, Bounds.at(i + 3, j), TILE, s30, s31, s32, s33);
    }

    private static void store(double[] triangle, int at, int entries, double a, double b, double c, double d) {
        triangle[at] += a;
        if (entries > 1) {
            triangle[at + 1] += b;
        }
        if (entries > 2) {
            triangle[at + 2] += c;
        }
        if (entries > 3) {
            triangle[at + 3] += d;
        }
    }
}
