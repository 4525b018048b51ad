package turnstone.sample;

import java.time.LocalDate;
import java.time.ZoneOffset;
import java.util.ArrayList;
import java.util.List;
import turnstone.measure.ReferenceKind;

/** Lamp, window and detector of each sorter: what a channel reads of the dark and of the white tile. */
final class Light {
    /** Pixels across the belt, binned. */
    static final int BELT_COLUMNS = 16;

    /** The white tile at its brightest channel in the middle of the belt, counts. */
    private static final double WHITE_COUNTS = 10_500;

    private static final double DARK_COUNTS = 620;
    private static final long MS_PER_MINUTE = 60_000;
    private static final long REFERENCE_MINUTE = 30;
    private static final double REFERENCE_STEPS = 16;
    private static final double REFERENCE_NOISE_COUNTS = 0.8;
    private static final double FILM_THICKNESS = 1.5;

    private final long seed;
    private final SampleSize size;
    private final Fleet fleet;

    Light(long seed, SampleSize size, Fleet fleet) {
        this.seed = seed;
        this.size = size;
        this.fleet = fleet;
    }

    /** One night of one sorter: wavelengths [channel], dark and white counts [belt column][channel], and the share of stray light. */
    static final class Night {
        final double[] wavelength_nm;
        final double[][] dark;
        final double[][] white;
        final double stray;

        Night(double[] wavelength_nm, double[][] dark, double[][] white, double stray) {
            this.wavelength_nm = wavelength_nm;
            this.dark = dark;
            this.white = white;
            this.stray = stray;
        }
    }

    Night night(int sorter, int night) {
        double[] wavelength_nm = fleet.optics_nm(sorter, night);
        Chance chance = Chance.of(seed, Fleet.Stream.NIGHT, sorter, night);
        boolean ageing = sorter == Traps.AGEING_SORTER;
        double level = WHITE_COUNTS * (1 + 0.02 * chance.normal()) * (ageing ? StrictMath.pow(0.965, night) : 1);
        double tilt = 0.06 * Chance.of(seed, Fleet.Stream.NIGHT, sorter).normal()
                + 0.02 * chance.normal()
                + (ageing ? 0.02 * night : 0);
        double fouling = chance.between(0, 0.08);
        double stray = 0.004 + (ageing ? 0.0015 * night : 0);
        double[] lamp = new double[wavelength_nm.length];
        for (int c = 0; c < lamp.length; c++) {
            double across = (wavelength_nm[c] - 1300) / 400;
            // Dirt scatters short waves more.
            double window = 1 - fouling * (1 - 0.3 * across);
            lamp[c] = level * sensitivity(wavelength_nm[c]) * (1 + tilt * across) * window;
        }
        return new Night(wavelength_nm, dark(sorter), white(sorter, night, wavelength_nm, lamp), stray);
    }

    private static double sensitivity(double wavelength_nm) {
        double rise = 1 / (1 + StrictMath.exp(-(wavelength_nm - 915) / 25));
        double fall = 1 / (1 + StrictMath.exp((wavelength_nm - 1705) / 22));
        return rise * fall;
    }

    private double[][] dark(int sorter) {
        double[][] dark = new double[BELT_COLUMNS][size.channels()];
        for (int column = 0; column < BELT_COLUMNS; column++) {
            Chance chance = Chance.of(seed, Fleet.Stream.PIXELS, sorter, column, 0);
            double level = DARK_COUNTS + 25 * chance.normal();
            for (int c = 0; c < dark[column].length; c++) {
                dark[column][c] = level + 8 * chance.normal();
            }
        }
        return dark;
    }

    /** Counts of the white tile above the dark. */
    private double[][] white(int sorter, int night, double[] wavelength_nm, double[] lamp) {
        double[][] white = new double[BELT_COLUMNS][];
        double[] film = filmTransmittance(wavelength_nm);
        for (int column = 0; column < BELT_COLUMNS; column++) {
            Chance chance = Chance.of(seed, Fleet.Stream.PIXELS, sorter, column, 1);
            double side = (column - (BELT_COLUMNS - 1) / 2.0) / (BELT_COLUMNS / 2.0);
            double vignetting = 1 - 0.22 * side * side;
            boolean behindFilm = night == size.nights() - 2 && Traps.staleColumn(sorter, column);
            white[column] = new double[lamp.length];
            for (int c = 0; c < lamp.length; c++) {
                double pixel = 1 + 0.012 * chance.normal();
                white[column][c] = lamp[c] * vignetting * pixel * (behindFilm ? film[c] : 1);
            }
        }
        return white;
    }

    private static double[] filmTransmittance(double[] wavelength_nm) {
        double[] film = Band.sum(Substance.FILM, wavelength_nm);
        for (int c = 0; c < film.length; c++) {
            film[c] = StrictMath.exp(-StrictMath.log(10) * FILM_THICKNESS * film[c]);
        }
        return film;
    }

    /** Midnight of a night, milliseconds since 1970-01-01T00:00Z. */
    static long midnight_ms(LocalDate day) {
        return day.atStartOfDay().toInstant(ZoneOffset.UTC).toEpochMilli();
    }

    /** Dark and white of all sorters on a night; those that were forgotten are not there. */
    List<SampleReference> references(int night, LocalDate day) {
        long time_ms = midnight_ms(day) + REFERENCE_MINUTE * MS_PER_MINUTE;
        List<SampleReference> references = new ArrayList<>();
        for (int sorter = 0; sorter < size.sorters(); sorter++) {
            Night light = night(sorter, night);
            String name = Fleet.NAMES.get(sorter);
            Chance chance = Chance.of(seed, Fleet.Stream.REFERENCE, sorter, night);
            for (int column = 0; column < BELT_COLUMNS; column++) {
                double[] dark = light.dark[column];
                double[] none = new double[dark.length];
                references.add(
                        new SampleReference(ReferenceKind.DARK, name, column, time_ms, averaged(dark, none, chance)));
                boolean forgotten = night == size.nights() - 1 && night > 0 && Traps.staleColumn(sorter, column);
                if (!forgotten) {
                    double[] white = light.white[column];
                    references.add(new SampleReference(
                            ReferenceKind.WHITE, name, column, time_ms, averaged(dark, white, chance)));
                }
            }
        }
        return references;
    }

    private static double[] averaged(double[] dark, double[] white, Chance chance) {
        double[] mean = new double[dark.length];
        for (int c = 0; c < mean.length; c++) {
            double value = dark[c] + white[c] + REFERENCE_NOISE_COUNTS * chance.pixelNoise();
            mean[c] = Math.rint(value * REFERENCE_STEPS) / REFERENCE_STEPS;
        }
        return mean;
    }
}
