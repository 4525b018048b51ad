package turnstone.sample;

import java.nio.file.Path;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;

/**
 * The invented demo plant: twelve sorters named for wading birds, ten materials and the belt, raw counts with dark and white. Nothing in it is measured data.
 *
 * <p>Everything is a function of the seed: a showing's records may be made anywhere, in any order, as often as one likes. {@code docs/sample-plant.md} lists
 * the traps. Immutable.
 */
public final class SamplePlant {
    /** Trays of each material; one for each tray group. */
    public static final int TRAYS = 8;

    private static final long STANDARD_SEED = 20_260_301;
    private static final LocalDate FIRST_NIGHT = LocalDate.of(2026, 3, 2);
    private static final long FIRST_SHOWING_MS = 60 * 60_000;
    private static final long SHOWING_MS = 25_000;

    private final long seed;
    private final SampleSize size;
    private final Fleet fleet;
    private final Light light;

    private SamplePlant(SampleSize size, long seed) {
        this.seed = seed;
        this.size = size;
        this.fleet = new Fleet(seed, size);
        this.light = new Light(seed, size, fleet);
    }

    /** The plant that {@code nightly --sample} runs: 13 nights from 2026-03-02, 24,816 records a night and one more on the last. */
    public static SamplePlant standard() {
        return of(SampleSize.standard(), STANDARD_SEED);
    }

    /** A plant of another size or seed. */
    public static SamplePlant of(SampleSize size, long seed) {
        return new SamplePlant(size, seed);
    }

    /** How large it is. */
    public SampleSize size() {
        return size;
    }

    /** What everything is drawn from. */
    public long seed() {
        return seed;
    }

    /** The nights, oldest first. */
    public List<LocalDate> nights() {
        List<LocalDate> nights = new ArrayList<>();
        for (int night = 0; night < size.nights(); night++) {
            nights.add(FIRST_NIGHT.plusDays(night));
        }
        return nights;
    }

    /** The sorters, in the plant file's order. */
    public List<String> sorters() {
        return fleet.names();
    }

    /** The materials, in the plant file's order. */
    public List<String> materials() {
        return Substance.ALL.stream().map(Substance::name).toList();
    }

    /**
     * The showings of a night, by time.
     *
     * @throws IllegalArgumentException for a day that is none of the nights
     */
    public List<SampleShowing> showings(LocalDate night) {
        int number = number(night);
        List<SampleShowing> showings = new ArrayList<>();
        for (int sorter = 0; sorter < size.sorters(); sorter++) {
            for (int material = 0; material < Substance.ALL.size(); material++) {
                for (int turn = 0; turn < size.showingsPerPair(); turn++) {
                    showings.add(planned(number, sorter, material, turn, showings.size()));
                }
            }
        }
        if (number == size.nights() - 1) {
            showings.add(stray(number, showings.size()));
        }
        return showings;
    }

    private int number(LocalDate night) {
        int number = nights().indexOf(night);
        if (number < 0) {
            throw new IllegalArgumentException(night + " is none of the sample's nights");
        }
        return number;
    }

    /** Half of the trays of a material are shown on a sorter one night, the other half the next. */
    private SampleShowing planned(int night, int sorter, int material, int turn, int index) {
        int tray = 1 + (2 * turn + (2 * turn >= TRAYS ? 1 : 0) + night + sorter + material) % TRAYS;
        LocalDate day = FIRST_NIGHT.plusDays(night);
        Substance noted = Substance.ALL.get(material);
        int shown = material;
        if (night == size.nights() - 1
                && sorter == Math.min(Traps.MISLABELLED_SORTER, size.sorters() - 1)
                && turn == 0
                && noted.name().equals(Traps.NOTED_MATERIAL)) {
            shown = Substance.ALL.indexOf(Substance.named(Traps.SHOWN_MATERIAL));
        }
        String name = fleet.names().get(sorter);
        String trayName = noted.slug() + "-" + tray;
        return new SampleShowing(
                day + "." + name + "." + trayName,
                day,
                name,
                trayName,
                noted.name(),
                Substance.ALL.get(shown).name(),
                start_ms(day, index),
                new SampleShowing.Place(night, sorter, shown, tray, index));
    }

    private static long start_ms(LocalDate day, int index) {
        return Light.midnight_ms(day) + FIRST_SHOWING_MS + index * SHOWING_MS;
    }

    /** One record from a sorter that the plant does not have. */
    private SampleShowing stray(int night, int index) {
        LocalDate day = FIRST_NIGHT.plusDays(night);
        Substance substance = Substance.named(Traps.NOTED_MATERIAL);
        String tray = substance.slug() + "-1";
        return new SampleShowing(
                day + "." + Traps.UNKNOWN_SORTER + "." + tray,
                day,
                Traps.UNKNOWN_SORTER,
                tray,
                substance.name(),
                substance.name(),
                start_ms(day, index),
                new SampleShowing.Place(night, 0, Substance.ALL.indexOf(substance), 1, index));
    }

    /**
     * The truth without end: a tray that was shown on none of the nights, shown on the last of them without a trap.
     *
     * @param number any number from 0; each is another tray
     */
    public SampleShowing unseen(String sorter, String material, long number) {
        int machine = fleet.names().indexOf(sorter);
        int substance = materials().indexOf(material);
        if (machine < 0 || substance < 0 || number < 0) {
            throw new IllegalArgumentException("no such showing: " + sorter + ", " + material + ", " + number);
        }
        int night = size.nights() - 1;
        LocalDate day = FIRST_NIGHT.plusDays(night);
        long tray = TRAYS + 1 + number;
        String trayName = Substance.ALL.get(substance).slug() + "-" + tray;
        return new SampleShowing(
                day + "." + sorter + "." + trayName,
                day,
                sorter,
                trayName,
                material,
                material,
                start_ms(day, 0),
                new SampleShowing.Place(night, machine, substance, tray, Integer.MAX_VALUE));
    }

    /** The records of a showing. */
    public List<SampleRecord> records(SampleShowing showing) {
        return maker().records(showing);
    }

    /** What makes the records of many showings quickly. */
    public SampleMaker maker() {
        return new SampleMaker(seed, size, light);
    }

    /** The dark and white references of a night. */
    public List<SampleReference> references(LocalDate night) {
        return light.references(number(night), night);
    }

    /**
     * The text of the plant file, for records in {@code records/DAY} and references in {@code references} below the folder, both Parquet with the channels in
     * an array column {@code counts}.
     *
     * @param folder where records and references are; written into the file as it is given, relative to the plant file or absolute
     */
    public String plantYaml(Path folder) {
        return SamplePlantFile.text(this, fleet, folder);
    }
}
