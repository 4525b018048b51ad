package turnstone.table;

import java.io.IOException;
import java.math.BigDecimal;
import java.nio.file.Files;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import turnstone.fault.Fault;

/** How common each material is taken to be: the weights of the between scatter and the decision prior together. */
public sealed interface Mix {
    /** By records, n_k/n. */
    record AsCounted() implements Mix {
        @Override
        public double[] shares(List<String> materials, long[] records) {
            double total = Arrays.stream(records).sum();
            return Arrays.stream(records).mapToDouble(n -> n / total).toArray();
        }
    }

    /** All alike. */
    record Equal() implements Mix {
        @Override
        public double[] shares(List<String> materials, long[] records) {
            double[] shares = new double[materials.size()];
            Arrays.fill(shares, 1.0 / shares.length);
            return shares;
        }
    }

    /**
     * As listed.
     *
     * @param place the file, for messages
     * @param listed share of each material, above 0
     */
    record Listed(String place, Map<String, Double> listed) implements Mix {
        private static final double SUM_TOLERANCE = 1e-9;

        @Override
        public double[] shares(List<String> materials, long[] records) {
            List<String> missing = new ArrayList<>(materials);
            missing.removeAll(listed.keySet());
            List<String> unknown = new ArrayList<>(listed.keySet());
            unknown.removeAll(materials);
            if (!missing.isEmpty() || !unknown.isEmpty()) {
                throw Fault.input("the mix does not list the materials of the table")
                        .at(place)
                        .found(missing.isEmpty() ? "unknown " + unknown : "none of " + missing)
                        .expected(String.join(", ", materials));
            }
            double[] shares = materials.stream().mapToDouble(listed::get).toArray();
            double sum = 0;
            for (double share : shares) {
                sum += share;
            }
            if (Math.abs(sum - 1) > SUM_TOLERANCE) {
                throw Fault.input("the shares of the mix do not sum to 1")
                        .at(place)
                        .found(sum);
            }
            return shares;
        }
    }

    /**
     * One share for each material, above 0, together 1.
     *
     * @param materials names in the order wanted
     * @param records of each
     */
    double[] shares(List<String> materials, long[] records);

    /**
     * Reads lines of {@code material,share}, without a header; the last comma divides.
     *
     * @throws Fault of kind input, naming the line
     */
    static Mix read(Path file) {
        Map<String, Double> listed = new HashMap<>();
        int number = 0;
        for (String line : lines(file)) {
            number++;
            if (line.isBlank()) {
                continue;
            }
            int comma = line.lastIndexOf(',');
            double share = comma < 0 ? Double.NaN : number(line.substring(comma + 1));
            if (!(share > 0)
                    || Double.isInfinite(share)
                    || listed.put(line.substring(0, comma).strip(), share) != null) {
                throw Fault.input("not a line of a mix")
                        .at(file + " line " + number)
                        .found(line)
                        .expected("material,share with a share above 0, each material once");
            }
        }
        return new Listed(file.toString(), listed);
    }

    private static double number(String text) {
        try {
            return new BigDecimal(text.strip()).doubleValue();
        } catch (NumberFormatException e) {
            return Double.NaN;
        }
    }

    private static List<String> lines(Path file) {
        try {
            return Files.readAllLines(file);
        } catch (NoSuchFileException e) {
            throw Fault.input("there is no such mix")
                    .at(file.toString())
                    .expected("as-counted, equal, or a file of lines material,share")
                    .because(e);
        } catch (IOException e) {
            throw Fault.storage("the mix can't be read")
                    .at(file.toString())
                    .found(e.getClass().getSimpleName())
                    .because(e);
        }
    }
}
