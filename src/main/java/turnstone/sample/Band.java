package turnstone.sample;

import java.util.List;

/**
 * One absorption band of Gaussian form.
 *
 * @param centre_nm where it is highest
 * @param width_nm its standard deviation
 * @param height absorbance there, for a path length of 1
 */
record Band(double centre_nm, double width_nm, double height) {
    /** The heights of the bands on these wavelengths: one row for each band. */
    static double[][] table(List<Band> bands, double[] wavelength_nm) {
        double[][] table = new double[bands.size()][wavelength_nm.length];
        for (int b = 0; b < table.length; b++) {
            Band band = bands.get(b);
            for (int c = 0; c < wavelength_nm.length; c++) {
                double z = (wavelength_nm[c] - band.centre_nm) / band.width_nm;
                table[b][c] = band.height * StrictMath.exp(-0.5 * z * z);
            }
        }
        return table;
    }

    /** All bands together on these wavelengths. */
    static double[] sum(List<Band> bands, double[] wavelength_nm) {
        double[] sum = new double[wavelength_nm.length];
        for (double[] row : table(bands, wavelength_nm)) {
            for (int c = 0; c < sum.length; c++) {
                sum[c] += row[c];
            }
        }
        return sum;
    }
}
