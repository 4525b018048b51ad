package turnstone.sample;

import java.util.ArrayList;
import java.util.List;

/** Makes the records of one showing: pieces on the belt, light on them, counts of the detector. */
final class Scene {
    /** The largest count of the 14-bit detector; what is brighter reads this. */
    static final int LARGEST_COUNT = 16_383;

    private static final long RECORD_MS = 4;
    private static final double READ_NOISE_COUNTS = 8;
    private static final double SHOT_NOISE_VARIANCE_PER_COUNT = 0.12;
    private static final double BLACK_REFLECTANCE = 0.022;
    private static final double LN_10 = StrictMath.log(10);

    private final SampleShowing showing;
    private final int records;
    private final Light.Night light;
    private final Substance substance;
    private final List<Piece> pieces;
    private final double[][] bands;
    private final double[] water;
    private final double[] paper;
    private final double[] belt;
    private final double[] across;
    private final Chance chance;
    private final double[] drift;

    Scene(long seed, SampleShowing showing, int records, Light.Night light) {
        SampleShowing.Place place = showing.place();
        double[] wavelength_nm = light.wavelength_nm;
        this.showing = showing;
        this.records = records;
        this.light = light;
        this.substance = Substance.ALL.get(place.material());
        this.pieces = Piece.onTray(seed, place.material(), place.tray());
        this.bands = Band.table(substance.bands(), wavelength_nm);
        this.water = Band.sum(Substance.WATER, wavelength_nm);
        this.paper = reflectance(Substance.named("fibre"), wavelength_nm);
        this.belt = reflectance(Substance.named("belt"), wavelength_nm);
        this.across = new double[wavelength_nm.length];
        this.drift = new double[wavelength_nm.length];
        this.chance = Chance.of(
                seed,
                Fleet.Stream.RECORDS,
                place.night(),
                place.sorter(),
                place.material(),
                place.tray(),
                place.showing());
        double level = 1 + 0.01 * chance.normal();
        double tilt = 0.012 * chance.normal();
        for (int c = 0; c < across.length; c++) {
            across[c] = (wavelength_nm[c] - 1300) / 400;
            drift[c] = level + tilt * across[c];
        }
    }

    private static double[] reflectance(Substance substance, double[] wavelength_nm) {
        double[] values = Band.sum(substance.bands(), wavelength_nm);
        for (int c = 0; c < values.length; c++) {
            values[c] = StrictMath.exp(-LN_10 * (substance.base() + values[c]));
        }
        return values;
    }

    List<SampleRecord> records() {
        List<SampleRecord> made = new ArrayList<>(records);
        double[] reflectance = new double[across.length];
        for (int r = 0; r < records; r++) {
            Piece piece = pieces.get(r % pieces.size());
            int beltColumn = chance.below(Light.BELT_COLUMNS);
            surface(piece, reflectance);
            int[] counts = detect(reflectance, beltColumn);
            if (showing.place().showing() == Traps.DEAD_PIXEL_SHOWING && r == Traps.DEAD_PIXEL_RECORD) {
                counts[counts.length / 2] = 0;
            }
            made.add(new SampleRecord(showing, piece.name(), beltColumn, showing.start_ms() + r * RECORD_MS, counts));
        }
        return made;
    }

    /** Reflectance of one spot of a piece, its edge and its label included. */
    private void surface(Piece piece, double[] reflectance) {
        double path = piece.path() * StrictMath.exp(0.15 * chance.normal());
        double base = piece.base() + 0.03 * chance.normal();
        double slope = piece.slope() + 0.02 * chance.normal();
        double wet = piece.moisture() * chance.between(0.5, 1.5);
        double dark = BLACK_REFLECTANCE * (1 + 0.15 * chance.normal());
        double labelled = piece.label() && chance.share() < 0.3 ? chance.between(0.1, 0.7) : 0;
        double beside = chance.share() < 0.04 ? chance.between(0.05, 0.5) : 0;
        double gloss = chance.share() < 0.03 ? chance.between(0.02, 0.15) : 0;
        gloss += chance.share() < 0.001 ? 1.5 : 0;
        double[] heights = piece.bandFactors().stream()
                .mapToDouble(factor -> path * factor)
                .toArray();
        for (int c = 0; c < reflectance.length; c++) {
            double own = dark;
            if (!piece.black()) {
                double absorbance = base + slope * across[c] + wet * water[c];
                for (int b = 0; b < bands.length; b++) {
                    absorbance += heights[b] * bands[b][c];
                }
                own = StrictMath.exp(-LN_10 * absorbance);
            }
            own += labelled * (paper[c] - own);
            own += beside * (belt[c] - own);
            reflectance[c] = own + gloss;
        }
    }

    private int[] detect(double[] reflectance, int beltColumn) {
        double[] dark = light.dark[beltColumn];
        double[] white = light.white[beltColumn];
        double stray = light.stray;
        int[] counts = new int[reflectance.length];
        for (int c = 0; c < counts.length; c++) {
            double signal = white[c] * drift[c] * (reflectance[c] + stray) / (1 + stray);
            double noise = Math.sqrt(READ_NOISE_COUNTS * READ_NOISE_COUNTS + SHOT_NOISE_VARIANCE_PER_COUNT * signal);
            double count = Math.rint(dark[c] + signal + noise * chance.pixelNoise());
            counts[c] = (int) Math.max(1, Math.min(LARGEST_COUNT, count));
        }
        return counts;
    }
}
