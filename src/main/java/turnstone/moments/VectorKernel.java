package turnstone.moments;

import com.sun.management.HotSpotDiagnosticMXBean;
import java.lang.management.ManagementFactory;
import java.util.Arrays;
import java.util.concurrent.atomic.AtomicReference;
import jdk.incubator.vector.DoubleVector;
import jdk.incubator.vector.VectorSpecies;

/**
 * The block kernel on the Vector API, packed and register-blocked, in the machine's preferred vector width.
 *
 * <p>Columns are packed in panels two vectors wide, {@code packed[(panel * records + k) * PANEL + c]}, zero past the last column, for at most
 * {@link #PACKED_RECORDS} records at a time: a panel stays in the nearest caches while every tile beside it goes by. A tile is 8 rows of the
 * triangle by one panel: 16 vectors of sums in registers, fed by two vector loads and 8 broadcasts a record. With 32 vector registers it is made in
 * one go; with 16 (256-bit vectors) in two halves of 4 rows. Tiles are made whole, on the diagonal and past the edge too; only entries of the
 * triangle are stored.
 *
 * <p>This class needs the module {@code jdk.incubator.vector}: nothing but {@link BlockKernels} may name it, and that as text.
 */
final class VectorKernel implements BlockKernel {
    private static final VectorSpecies<Double> SPECIES = DoubleVector.SPECIES_PREFERRED;
    private static final int LANES = SPECIES.length();
    private static final int PANEL = 2 * LANES;
    private static final int TILE_ROWS = 8;
    private static final int HALF_ROWS = 4;

    /** Fewest lanes: a tile's 8 rows must lie in one panel. */
    private static final int FEWEST_LANES = 4;

    /** Lanes of a 256-bit vector: such machines have 16 vector registers, too few for 16 sums and their factors. */
    private static final int LANES_OF_16_REGISTERS = 4;

    /** Records packed at a time: 256 records of one 16-column panel are 32 kB. */
    static final int PACKED_RECORDS = 256;

    /** The scratch space, when no fold has it. A thread that finds none makes its own. */
    private final AtomicReference<double[]> scratch = new AtomicReference<>(new double[0]);

    VectorKernel() {
        if (LANES < FEWEST_LANES) {
            throw new UnsupportedOperationException(
                    "vectors of this machine have " + SPECIES.vectorBitSize() + " bits, fewer than 256");
        }
        if (!fusedInHardware()) {
            throw new UnsupportedOperationException("no fused multiply-add in hardware");
        }
    }

    /** Without it the vector form falls back to arbitrary-precision arithmetic, entry by entry. */
    private static boolean fusedInHardware() {
        HotSpotDiagnosticMXBean options = ManagementFactory.getPlatformMXBean(HotSpotDiagnosticMXBean.class);
        return options == null
                || Boolean.parseBoolean(options.getVMOption("UseFMA").getValue());
    }

    @Override
    public String name() {
        return "vector, " + SPECIES.vectorBitSize() + " bits";
    }

    @Override
    public void fold(double[] rows, int rowCount, int channels, double[] triangle) {
        KernelShapes.check(rows, rowCount, channels, triangle);
        int panels = (channels + PANEL - 1) / PANEL;
        int needed = panels * PANEL * Math.min(rowCount, PACKED_RECORDS);
        double[] packed = scratch.getAndSet(null);
        if (packed == null || packed.length < needed) {
            packed = new double[needed];
        }
        double[] tile = new double[TILE_ROWS * PANEL];
        for (int first = 0; first < rowCount; first += PACKED_RECORDS) {
            int records = Math.min(PACKED_RECORDS, rowCount - first);
            pack(rows, first, records, channels, packed);
            for (int panel = 0; panel < panels; panel++) {
                foldPanel(packed, records, channels, panel, tile, triangle);
            }
        }
        scratch.set(packed);
    }

    private static void pack(double[] rows, int first, int records, int channels, double[] packed) {
        int to = 0;
        for (int column = 0; column < channels; column += PANEL) {
            int width = Math.min(PANEL, channels - column);
            int from = first * channels + column;
            if (width == PANEL) {
                for (int k = 0; k < records; k++) {
                    DoubleVector.fromArray(SPECIES, rows, from + k * channels).intoArray(packed, to + k * PANEL);
                    DoubleVector.fromArray(SPECIES, rows, from + k * channels + LANES)
                            .intoArray(packed, to + k * PANEL + LANES);
                }
            } else {
                Arrays.fill(packed, to, to + records * PANEL, 0);
                for (int k = 0; k < records; k++) {
                    System.arraycopy(rows, from + k * channels, packed, to + k * PANEL, width);
                }
            }
            to += records * PANEL;
        }
    }

    /** Every tile of one panel of columns, from the diagonal down. */
    private static void foldPanel(
            double[] packed, int records, int channels, int panel, double[] tile, double[] triangle) {
        int column = panel * PANEL;
        int low = column * records;
        for (int row = column; row < channels; row += TILE_ROWS) {
            int high = row / PANEL * PANEL * records + row % PANEL;
            if (LANES == LANES_OF_16_REGISTERS) {
                halfTile(packed, high, low, records, tile, 0);
                halfTile(packed, high + HALF_ROWS, low, records, tile, HALF_ROWS * PANEL);
            } else {
                wholeTile(packed, high, low, records, tile, 0);
            }
            store(tile, row, column, channels, triangle);
        }
    }

    private static void store(double[] tile, int row, int column, int channels, double[] triangle) {
        int end = Math.min(row + TILE_ROWS, channels);
        for (int i = row, from = 0; i < end; i++, from += PANEL) {
            int to = Bounds.at(i, column);
            int width = Math.min(PANEL, i - column + 1);
            for (int c = 0; c < width; c++) {
                triangle[to + c] += tile[from + c];
            }
        }
    }

    /** 8 rows of the triangle by one panel: {@code tile[to + r * PANEL + c]} becomes the sum of products of the columns of row r and of c. */
    private static void wholeTile(double[] packed, int high, int low, int records, double[] tile, int to) {
        DoubleVector zero = DoubleVector.zero(SPECIES);
        DoubleVector sum0a = zero,
                sum1a = zero,
                sum2a = zero,
                sum3a = zero,
                sum4a = zero,
                sum5a = zero,
                sum6a = zero,
                sum7a = zero;
        DoubleVector sum0b = zero,
                sum1b = zero,
                sum2b = zero,
                sum3b = zero,
                sum4b = zero,
                sum5b = zero,
                sum6b = zero,
                sum7b = zero;
        for (int k = 0; k < records; k++) {
            DoubleVector a = DoubleVector.fromArray(SPECIES, packed, low + k * PANEL);
            DoubleVector b = DoubleVector.fromArray(SPECIES, packed, low + k * PANEL + LANES);
            DoubleVector x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL]);
            sum0a = a.fma(x, sum0a);
            sum0b = b.fma(x, sum0b);
            x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL + 1]);
            sum1a = a.fma(x, sum1a);
            sum1b = b.fma(x, sum1b);
            x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL + 2]);
            sum2a = a.fma(x, sum2a);
            sum2b = b.fma(x, sum2b);
            x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL + 3]);
            sum3a = a.fma(x, sum3a);
            sum3b = b.fma(x, sum3b);
            x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL + 4]);
            sum4a = a.fma(x, sum4a);
            sum4b = b.fma(x, sum4b);
            x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL + 5]);
            sum5a = a.fma(x, sum5a);
            sum5b = b.fma(x, sum5b);
            x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL + 6]);
            sum6a = a.fma(x, sum6a);
            sum6b = b.fma(x, sum6b);
            x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL + 7]);
            sum7a = a.fma(x, sum7a);
            sum7b = b.fma(x, sum7b);
        }
        sum0a.intoArray(tile, to);
        sum0b.intoArray(tile, to + LANES);
        sum1a.intoArray(tile, to + PANEL);
        sum1b.intoArray(tile, to + PANEL + LANES);
        sum2a.intoArray(tile, to + 2 * PANEL);
        sum2b.intoArray(tile, to + 2 * PANEL + LANES);
        sum3a.intoArray(tile, to + 3 * PANEL);
        sum3b.intoArray(tile, to + 3 * PANEL + LANES);
        sum4a.intoArray(tile, to + 4 * PANEL);
        sum4b.intoArray(tile, to + 4 * PANEL + LANES);
        sum5a.intoArray(tile, to + 5 * PANEL);
        sum5b.intoArray(tile, to + 5 * PANEL + LANES);
        sum6a.intoArray(tile, to + 6 * PANEL);
        sum6b.intoArray(tile, to + 6 * PANEL + LANES);
        sum7a.intoArray(tile, to + 7 * PANEL);
        sum7b.intoArray(tile, to + 7 * PANEL + LANES);
    }

    /** The same for 4 rows. */
    private static void halfTile(double[] packed, int high, int low, int records, double[] tile, int to) {
        DoubleVector zero = DoubleVector.zero(SPECIES);
        DoubleVector sum0a = zero, sum1a = zero, sum2a = zero, sum3a = zero;
        DoubleVector sum0b = zero, sum1b = zero, sum2b = zero, sum3b = zero;
        for (int k = 0; k < records; k++) {
            DoubleVector a = DoubleVector.fromArray(SPECIES, packed, low + k * PANEL);
            DoubleVector b = DoubleVector.fromArray(SPECIES, packed, low + k * PANEL + LANES);
            DoubleVector x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL]);
            sum0a = a.fma(x, sum0a);
            sum0b = b.fma(x, sum0b);
            x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL + 1]);
            sum1a = a.fma(x, sum1a);
            sum1b = b.fma(x, sum1b);
            x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL + 2]);
            sum2a = a.fma(x, sum2a);
            sum2b = b.fma(x, sum2b);
            x = DoubleVector.broadcast(SPECIES, packed[high + k * PANEL + 3]);
            sum3a = a.fma(x, sum3a);
            sum3b = b.fma(x, sum3b);
        }
        sum0a.intoArray(tile, to);
        sum0b.intoArray(tile, to + LANES);
        sum1a.intoArray(tile, to + PANEL);
        sum1b.intoArray(tile, to + PANEL + LANES);
        sum2a.intoArray(tile, to + 2 * PANEL);
        sum2b.intoArray(tile, to + 2 * PANEL + LANES);
        sum3a.intoArray(tile, to + 3 * PANEL);
        sum3b.intoArray(tile, to + 3 * PANEL + LANES);
    }
}
