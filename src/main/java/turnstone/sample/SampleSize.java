package turnstone.sample;

import java.io.Serializable;

/**
 * How large a sample is.
 *
 * @param sorters 1 to 12
 * @param nights at least 1
 * @param showingsPerPair showings a night for each sorter and material, 1 to 8
 * @param recordsPerShowing at least 1
 * @param channels of each sorter and of the plant's axis, at least 16
 */
public record SampleSize(int sorters, int nights, int showingsPerPair, int recordsPerShowing, int channels)
        implements Serializable {
    /** Checks the ranges. */
    public SampleSize {
        check("sorters", sorters, 1, Fleet.NAMES.size());
        check("nights", nights, 1, 366);
        check("showingsPerPair", showingsPerPair, 1, SamplePlant.TRAYS);
        check("recordsPerShowing", recordsPerShowing, 1, 100_000);
        check("channels", channels, 16, 4096);
    }

    private static void check(String name, int value, int least, int most) {
        if (value < least || value > most) {
            throw new IllegalArgumentException(name + " is " + value + ", not " + least + " to " + most);
        }
    }

    /** 12 sorters, 13 nights, 4 showings of 47 records for each sorter and material: 24,816 records a night; 128 channels. */
    public static SampleSize standard() {
        return new SampleSize(12, 13, 4, 47, 128);
    }
}
