package turnstone.sample;

import java.util.List;

/**
 * The invented sorters and their wavelength axes, which differ by 2 to 4 nm from the nominal 900 to 1700 nm, to one side or the other.
 *
 * <p>Ends are kept in tenths of a nanometre, so that the plant file says them exactly.
 */
final class Fleet {
    /** Wading birds. */
    static final List<String> NAMES = List.of(
            "avocet",
            "curlew",
            "dunlin",
            "godwit",
            "knot",
            "oystercatcher",
            "plover",
            "redshank",
            "sanderling",
            "snipe",
            "stilt",
            "whimbrel");

    private static final int NOMINAL_FIRST_TENTHS = 9000;
    private static final int NOMINAL_LAST_TENTHS = 17000;
    private static final int[] FIRST_TENTHS = {24, -31, 36, -22, 29, -38, 33, -26, 21, -35, 39, -28};
    private static final int[] LAST_TENTHS = {28, -26, 31, -29, 22, -33, 38, -21, 27, -39, 34, -24};

    /** The axis of the camera that took the place of an older one. */
    private static final int[] NEW_CAMERA_TENTHS = {32, 27};

    /** How far a wavelength table may be off the optics, nm: calibration is not perfect either. */
    private static final double CALIBRATION_MISS_NM = 0.1;

    private final long seed;
    private final SampleSize size;

    Fleet(long seed, SampleSize size) {
        this.seed = seed;
        this.size = size;
    }

    List<String> names() {
        return NAMES.subList(0, size.sorters());
    }

    /** First and last wavelength of a sorter's table on a night, in tenths of nm. */
    int[] ends_tenths(int sorter, int night) {
        boolean renewed = Traps.newCamera(sorter, night);
        int first = renewed ? NEW_CAMERA_TENTHS[0] : FIRST_TENTHS[sorter];
        int last = renewed ? NEW_CAMERA_TENTHS[1] : LAST_TENTHS[sorter];
        return new int[] {NOMINAL_FIRST_TENTHS + first, NOMINAL_LAST_TENTHS + last};
    }

    /** Where the channels of a sorter really look on a night, nm. */
    double[] optics_nm(int sorter, int night) {
        int[] ends = ends_tenths(sorter, night);
        double first = ends[0] / 10.0;
        double last = ends[1] / 10.0;
        double miss = CALIBRATION_MISS_NM
                * Chance.of(seed, Stream.CALIBRATION, sorter).normal();
        double[] wavelength_nm = new double[size.channels()];
        for (int c = 0; c < wavelength_nm.length; c++) {
            wavelength_nm[c] = first + (last - first) * c / (wavelength_nm.length - 1) + miss;
        }
        return wavelength_nm;
    }

    /** Which kind of thing chance numbers are for. */
    static final class Stream {
        static final long CALIBRATION = 1;
        static final long PIXELS = 2;
        static final long NIGHT = 3;
        static final long REFERENCE = 4;
        static final long TRAY = 5;
        static final long PIECE = 6;
        static final long RECORDS = 7;

        private Stream() {}
    }
}
