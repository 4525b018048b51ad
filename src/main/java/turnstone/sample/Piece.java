package turnstone.sample;

import java.util.ArrayList;
import java.util.List;

/**
 * One item on a tray: the same wherever and whenever the tray is shown.
 *
 * @param name unique in the fleet
 * @param black coloured with carbon black
 * @param label covered in part by a paper label
 * @param path path length of light in it, about 1
 * @param base absorbance by scatter
 * @param slope of the scatter along the axis, absorbance over 400 nm
 * @param moisture water on it, about 0 to 0.3
 * @param bandFactors how high each band of the material is on this piece, about 1
 */
record Piece(
        String name,
        boolean black,
        boolean label,
        double path,
        double base,
        double slope,
        double moisture,
        List<Double> bandFactors) {
    /** Pieces on a tray. */
    static final int ON_TRAY = 12;

    private static final double LABEL_SHARE = 0.15;
    private static final double TRAY_SPREAD = 0.05;
    private static final double PIECE_SPREAD = 0.08;

    static List<Piece> onTray(long seed, int material, long tray) {
        Substance substance = Substance.ALL.get(material);
        int bands = substance.bands().size();
        Chance batch = Chance.of(seed, Fleet.Stream.TRAY, material, tray);
        double[] trayFactors = new double[bands];
        for (int b = 0; b < bands; b++) {
            trayFactors[b] = 1 + TRAY_SPREAD * batch.normal();
        }
        List<Piece> pieces = new ArrayList<>();
        for (int p = 0; p < ON_TRAY; p++) {
            pieces.add(piece(substance, tray, p, trayFactors, Chance.of(seed, Fleet.Stream.PIECE, material, tray, p)));
        }
        return pieces;
    }

    private static Piece piece(Substance substance, long tray, int number, double[] trayFactors, Chance chance) {
        List<Double> factors = new ArrayList<>();
        for (double trayFactor : trayFactors) {
            factors.add(trayFactor * (1 + PIECE_SPREAD * chance.normal()));
        }
        boolean plastic = !substance.name().equals("fibre") && !substance.name().equals("belt");
        return new Piece(
                substance.slug() + "-" + tray + "/" + (number + 1),
                chance.share() < substance.blackShare(),
                plastic && chance.share() < LABEL_SHARE,
                StrictMath.exp(0.28 * chance.normal()),
                substance.base() + 0.05 * chance.normal(),
                0.05 * chance.normal(),
                (plastic ? 0.04 : 0.10) * -StrictMath.log(1 - chance.share()),
                List.copyOf(factors));
    }
}
