package turnstone.measure;

import java.io.Serializable;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Set;
import java.util.TreeSet;
import turnstone.fault.Fault;

/**
 * A sorter's optics since a date: number of channels, wavelength table(s), channels known to be dead. Immutable.
 *
 * <p>Wavelengths are in nanometres, ascending, one per channel; an instrument of a table without wavelengths has none. Belt columns may be gathered in bands
 * with wavelength tables of their own (the slit image bends over the line of pixels); columns outside every band use the main table.
 */
public final class Instrument implements Serializable {
    private final String sorter;
    private final LocalDate since;
    private final int channels;
    private final double[] wavelength_nm;
    private final TreeSet<Integer> deadChannels;
    private final List<Band> bands;

    /** Belt columns {@code firstColumn} to {@code lastColumn}, both included, and their wavelength table. */
    public static final class Band implements Serializable {
        private final int firstColumn;
        private final int lastColumn;
        private final double[] wavelength_nm;

        /** A band with one wavelength per channel. */
        public Band(int firstColumn, int lastColumn, double[] wavelength_nm) {
            if (firstColumn > lastColumn) {
                throw Fault.usage("a band of belt columns ends before it begins")
                        .found(firstColumn + " to " + lastColumn);
            }
            this.firstColumn = firstColumn;
            this.lastColumn = lastColumn;
            this.wavelength_nm = wavelength_nm.clone();
        }

        boolean holds(int beltColumn) {
            return firstColumn <= beltColumn && beltColumn <= lastColumn;
        }

        /** The first belt column of it. */
        public int firstColumn() {
            return firstColumn;
        }

        /** The last belt column of it. */
        public int lastColumn() {
            return lastColumn;
        }

        /** One wavelength per channel in nm. */
        public double[] wavelength_nm() {
            return wavelength_nm.clone();
        }
    }

    private Instrument(
            String sorter, LocalDate since, int channels, double[] axis, Set<Integer> dead, List<Band> bands) {
        this.sorter = sorter;
        this.since = since;
        this.channels = channels;
        this.wavelength_nm = axis;
        this.deadChannels = new TreeSet<>(dead);
        this.bands = new ArrayList<>(bands);
    }

    /** An instrument with a wavelength table, no dead channels, no bands. */
    public static Instrument of(String sorter, LocalDate since, double[] wavelength_nm) {
        return of(sorter, since, wavelength_nm, Set.of(), List.of());
    }

    /**
     * An instrument with a wavelength table.
     *
     * @param deadChannels known to be dead, 0-based: never looked at, and bridged by resampling
     * @param bands belt columns with tables of their own; they must not overlap
     */
    public static Instrument of(
            String sorter, LocalDate since, double[] wavelength_nm, Set<Integer> deadChannels, List<Band> bands) {
        String place = "instrument " + name(sorter, since);
        checkAscending(wavelength_nm, place);
        for (int dead : deadChannels) {
            if (dead < 0 || dead >= wavelength_nm.length) {
                throw Fault.usage("a dead channel that the instrument does not have")
                        .at(place)
                        .found(dead + 1)
                        .expected("1 to " + wavelength_nm.length);
            }
        }
        for (int b = 0; b < bands.size(); b++) {
            checkBand(bands, b, wavelength_nm.length, place);
        }
        return new Instrument(sorter, since, wavelength_nm.length, wavelength_nm.clone(), deadChannels, bands);
    }

    /** An instrument of which only the number of channels is known. */
    public static Instrument withoutWavelengths(String sorter, LocalDate since, int channels) {
        return new Instrument(sorter, since, channels, new double[0], Set.of(), List.of());
    }

    private static void checkBand(List<Band> bands, int b, int channels, String place) {
        Band band = bands.get(b);
        if (band.wavelength_nm.length != channels) {
            throw Fault.usage("a band of belt columns with another number of wavelengths")
                    .at(place)
                    .found(band.wavelength_nm.length)
                    .expected(channels);
        }
        checkAscending(band.wavelength_nm, place);
        for (Band earlier : bands.subList(0, b)) {
            if (earlier.firstColumn <= band.lastColumn && band.firstColumn <= earlier.lastColumn) {
                throw Fault.usage("bands of belt columns overlap")
                        .at(place)
                        .found("column " + Math.max(earlier.firstColumn, band.firstColumn) + " in two bands");
            }
        }
    }

    static void checkAscending(double[] wavelength_nm, String place) {
        if (wavelength_nm.length == 0) {
            throw Fault.usage("an empty wavelength table").at(place);
        }
        for (int c = 0; c < wavelength_nm.length; c++) {
            boolean ascending = c == 0 || wavelength_nm[c] > wavelength_nm[c - 1];
            if (!ascending || !(wavelength_nm[c] > 0) || Double.isInfinite(wavelength_nm[c])) {
                throw Fault.usage("wavelengths must ascend")
                        .at(place + " channel " + (c + 1))
                        .found(DecimalText.shortest(wavelength_nm[c]) + " nm")
                        .remedy("list the channels from the shortest wavelength to the longest");
            }
        }
    }

    private static String name(String sorter, LocalDate since) {
        return sorter + "@" + since;
    }

    /** {@code avocet@2026-03-01}. */
    public String name() {
        return name(sorter, since);
    }

    /** The machine. */
    public String sorter() {
        return sorter;
    }

    /** The first day of these optics. */
    public LocalDate since() {
        return since;
    }

    /** Channels of a raw record. */
    public int channels() {
        return channels;
    }

    /** Whether there is a wavelength table. */
    public boolean hasWavelengths() {
        return wavelength_nm.length > 0;
    }

    /** One wavelength per channel in nm, or an empty array. */
    public double[] wavelength_nm() {
        return wavelength_nm.clone();
    }

    /** Channels known to be dead, 0-based, ascending. */
    public Set<Integer> deadChannels() {
        return new TreeSet<>(deadChannels);
    }

    /** Belt columns with wavelength tables of their own. */
    public List<Band> bands() {
        return List.copyOf(bands);
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof Instrument instrument
                && name().equals(instrument.name())
                && channels == instrument.channels
                && Arrays.equals(wavelength_nm, instrument.wavelength_nm)
                && deadChannels.equals(instrument.deadChannels);
    }

    @Override
    public int hashCode() {
        return name().hashCode();
    }

    @Override
    public String toString() {
        return name();
    }
}
