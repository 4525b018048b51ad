package turnstone.sample;

/** What a sorter's light and wavelengths of one night make of every substance: shared by all showings there. Not for sharing between threads. */
final class Optics {
    private static final double NOMINAL_MIDDLE_NM = 1300;
    private static final double NOMINAL_HALF_NM = 400;

    final Light.Night light;
    /** Place of each channel along the axis, about -1 to 1. */
    final double[] across;

    final double[] water;
    /** Reflectance of a paper label. */
    final double[] paper;
    /** Reflectance of the belt beside a piece. */
    final double[] belt;

    private final double[][][] bands = new double[Substance.ALL.size()][][];

    Optics(Light.Night light) {
        this.light = light;
        double[] wavelength_nm = light.wavelength_nm;
        across = new double[wavelength_nm.length];
        for (int c = 0; c < across.length; c++) {
            across[c] = (wavelength_nm[c] - NOMINAL_MIDDLE_NM) / NOMINAL_HALF_NM;
        }
        water = Band.sum(Substance.WATER, wavelength_nm);
        paper = reflectance(Substance.named("fibre"), wavelength_nm);
        belt = reflectance(Substance.named("belt"), wavelength_nm);
    }

    /** The bands of a material by its place in {@link Substance#ALL}, [band][channel]. */
    double[][] bands(int material) {
        if (bands[material] == null) {
            bands[material] = Band.table(Substance.ALL.get(material).bands(), light.wavelength_nm);
        }
        return bands[material];
    }

    private static double[] reflectance(Substance substance, double[] wavelength_nm) {
        double[] values = Band.sum(substance.bands(), wavelength_nm);
        for (int c = 0; c < values.length; c++) {
            values[c] += substance.base();
        }
        new Transmittance(values.length).apply(values);
        return values;
    }
}
