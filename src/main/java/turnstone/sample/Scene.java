package turnstone.sample;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;

/** Makes the records of one showing: pieces on the belt, light on them, counts of the detector. */
final class Scene {
    /** The largest count of the 14-bit detector; what is brighter reads this. */
    static final int LARGEST_COUNT = 16_383;

    private static final long RECORD_MS = 4;
    private static final double READ_NOISE_COUNTS = 8;
    private static final double SHOT_NOISE_VARIANCE_PER_COUNT = 0.12;
    private static final double BLACK_REFLECTANCE = 0.022;

    private final SampleShowing showing;
    private final int records;
    private final Optics optics;
    private final Transmittance transmittance;
    private final List<Piece> pieces;
    private final double[][] bands;
    private final Chance chance;
    private final double[] drift;
    private final double[] noise;

    Scene(long seed, SampleShowing showing, int records, Optics optics) {
        SampleShowing.Place place = showing.place();
        int channels = optics.across.length;
        this.showing = showing;
        this.records = records;
        this.optics = optics;
        this.transmittance = new Transmittance(channels);
        this.pieces = Piece.onTray(seed, place.material(), place.tray());
        this.bands = optics.bands(place.material());
        this.drift = new double[channels];
        this.noise = new double[channels];
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
        for (int c = 0; c < channels; c++) {
            drift[c] = level + tilt * optics.across[c];
        }
    }

    List<SampleRecord> records() {
        List<SampleRecord> made = new ArrayList<>(records);
        double[] reflectance = new double[drift.length];
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
        if (piece.black()) {
            Arrays.fill(reflectance, dark);
        } else {
            absorb(base, slope, wet, heights, reflectance);
            transmittance.apply(reflectance);
        }
        mix(reflectance, labelled, beside, gloss);
    }

    // The loops below run over plain arrays from 0, one thing at a time, so that compilers make vector code of them.

    private void absorb(double base, double slope, double wet, double[] heights, double[] absorbance) {
        double[] across = optics.across;
        double[] water = optics.water;
        for (int c = 0; c < absorbance.length; c++) {
            absorbance[c] = base + slope * across[c] + wet * water[c];
        }
        for (int b = 0; b < bands.length; b++) {
            double height = heights[b];
            double[] band = bands[b];
            for (int c = 0; c < absorbance.length; c++) {
                absorbance[c] += height * band[c];
            }
        }
    }

    private void mix(double[] reflectance, double labelled, double beside, double gloss) {
        double[] paper = optics.paper;
        double[] belt = optics.belt;
        for (int c = 0; c < reflectance.length; c++) {
            double own = reflectance[c];
            own += labelled * (paper[c] - own);
            own += beside * (belt[c] - own);
            reflectance[c] = own + gloss;
        }
    }

    private int[] detect(double[] reflectance, int beltColumn) {
        for (int c = 0; c < noise.length; c++) {
            noise[c] = chance.pixelNoise();
        }
        expose(reflectance, optics.light.white[beltColumn], optics.light.dark[beltColumn]);
        int[] counts = new int[reflectance.length];
        for (int c = 0; c < counts.length; c++) {
            counts[c] = (int) Math.max(1, Math.min(LARGEST_COUNT, Math.rint(reflectance[c])));
        }
        return counts;
    }

    /** Reflectance to what the detector sees, noise included, in place. */
    private void expose(double[] values, double[] white, double[] dark) {
        double stray = optics.light.stray;
        for (int c = 0; c < values.length; c++) {
            double signal = white[c] * drift[c] * (values[c] + stray) / (1 + stray);
            double deviation =
                    Math.sqrt(READ_NOISE_COUNTS * READ_NOISE_COUNTS + SHOT_NOISE_VARIANCE_PER_COUNT * signal);
            values[c] = dark[c] + signal + deviation * noise[c];
        }
    }
}
