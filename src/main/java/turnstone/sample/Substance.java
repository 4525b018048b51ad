package turnstone.sample;

import java.util.List;

/**
 * What a material absorbs. Positions are approximate: common practice, no source, from memory; heights and widths are invented.
 *
 * @param name the material
 * @param slug its name in the names of trays
 * @param grams_per_cm2 mass by area, invented
 * @param base absorbance that scatter alone gives
 * @param blackShare share of pieces coloured with carbon black
 * @param bands absorption bands
 */
record Substance(String name, String slug, String grams_per_cm2, double base, double blackShare, List<Band> bands) {
    /** The materials of the demo plant, belt last. */
    static final List<Substance> ALL = List.of(
            new Substance(
                    "PET bottle",
                    "pet-bottle",
                    "0.045",
                    0.24,
                    0.00,
                    List.of(
                            new Band(1130, 9, 0.220),
                            new Band(1176, 9, 0.080),
                            new Band(1410, 12, 0.200),
                            new Band(1660, 11, 0.550))),
            new Substance(
                    "PET tray",
                    "pet-tray",
                    "0.035",
                    0.22,
                    0.04,
                    List.of(
                            new Band(1130.4, 9.2, 0.212),
                            new Band(1176, 9.2, 0.088),
                            new Band(1411.5, 13, 0.222),
                            new Band(1660.6, 11.6, 0.530))),
            new Substance(
                    "PE-HD",
                    "pe-hd",
                    "0.075",
                    0.22,
                    0.05,
                    List.of(
                            new Band(1155, 9, 0.100),
                            new Band(1210, 11, 0.420),
                            new Band(1392, 10, 0.220),
                            new Band(1413, 10, 0.260),
                            new Band(1535, 16, 0.060),
                            new Band(1728, 14, 0.900))),
            new Substance(
                    "PE-LD",
                    "pe-ld",
                    "0.012",
                    0.26,
                    0.02,
                    List.of(
                            new Band(1155, 9, 0.104),
                            new Band(1209.75, 11.3, 0.416),
                            new Band(1391.5, 10.25, 0.227),
                            new Band(1413, 10.1, 0.255),
                            new Band(1535, 16, 0.060),
                            new Band(1727.7, 14, 0.890))),
            new Substance(
                    "PP",
                    "pp",
                    "0.060",
                    0.23,
                    0.06,
                    List.of(
                            new Band(1152, 9, 0.140),
                            new Band(1192, 10, 0.360),
                            new Band(1214, 10, 0.220),
                            new Band(1396, 13, 0.260),
                            new Band(1452, 18, 0.060),
                            new Band(1704, 12, 0.350))),
            new Substance(
                    "PS",
                    "ps",
                    "0.030",
                    0.20,
                    0.05,
                    List.of(
                            new Band(1143, 8, 0.400),
                            new Band(1209, 12, 0.160),
                            new Band(1413, 12, 0.180),
                            new Band(1681, 10, 0.600))),
            new Substance(
                    "PVC",
                    "pvc",
                    "0.080",
                    0.25,
                    0.02,
                    List.of(new Band(1195, 13, 0.220), new Band(1420, 15, 0.220), new Band(1717, 15, 0.650))),
            new Substance(
                    "ABS",
                    "abs",
                    "0.210",
                    0.27,
                    0.10,
                    List.of(
                            new Band(1143, 8, 0.300),
                            new Band(1203, 13, 0.200),
                            new Band(1412, 13, 0.190),
                            new Band(1680.5, 10, 0.460))),
            new Substance(
                    "PA",
                    "pa",
                    "0.090",
                    0.24,
                    0.04,
                    List.of(
                            new Band(1197, 12, 0.240),
                            new Band(1490, 18, 0.260),
                            new Band(1535, 16, 0.200),
                            new Band(1570, 12, 0.080))),
            new Substance(
                    "fibre",
                    "fibre",
                    "0.030",
                    0.20,
                    0.00,
                    List.of(
                            new Band(1205, 25, 0.120),
                            new Band(1365, 15, 0.080),
                            new Band(1430, 25, 0.220),
                            new Band(1482, 32, 0.450),
                            new Band(1585, 22, 0.220))),
            new Substance(
                    "belt",
                    "belt",
                    "1.200",
                    0.72,
                    0.00,
                    List.of(new Band(1200, 30, 0.050), new Band(1420, 40, 0.080), new Band(1715, 20, 0.100))));

    /** Liquid water on a piece. */
    static final List<Band> WATER =
            List.of(new Band(975, 15, 0.10), new Band(1170, 25, 0.08), new Band(1450, 32, 0.90));

    /** Residue of plastic film that a hot window has picked up. */
    static final List<Band> FILM =
            List.of(new Band(1211, 11, 0.25), new Band(1402, 16, 0.30), new Band(1540, 20, 0.08));

    static Substance named(String name) {
        return ALL.stream()
                .filter(substance -> substance.name.equals(name))
                .findFirst()
                .orElseThrow(() -> new IllegalArgumentException("no material " + name));
    }
}
