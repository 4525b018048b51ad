package turnstone.fisher;

import com.fasterxml.jackson.databind.JsonNode;
import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.math.BigDecimal;
import java.math.BigInteger;
import java.math.RoundingMode;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
import turnstone.json.Json;
import turnstone.measure.ChannelScale;
import turnstone.measure.CountScale;
import turnstone.measure.Precision;
import turnstone.moments.BlockKernels;
import turnstone.moments.KernelChoice;
import turnstone.moments.Moments;
import turnstone.moments.RowFolder;

/** Labelled records as exact decimals, on a count scale that loses nothing; the check data of src/test/resources/checks. */
record CheckTable(List<String> labels, List<List<BigDecimal>> records, CountScale scale) {
    static CheckTable of(List<String> labels, List<List<BigDecimal>> records) {
        int d = records.get(0).size();
        List<ChannelScale> channels = new ArrayList<>();
        for (int c = 0; c < d; c++) {
            channels.add(lossless(column(records, c)));
        }
        return new CheckTable(labels, records, CountScale.of(channels));
    }

    static CheckTable csv(String name) {
        List<String> lines = lines(name);
        List<String> labels = new ArrayList<>();
        List<List<BigDecimal>> records = new ArrayList<>();
        for (String line : lines.subList(1, lines.size())) {
            List<String> fields = List.of(line.split(",", -1));
            labels.add(fields.get(0));
            records.add(fields.stream().skip(1).map(BigDecimal::new).toList());
        }
        return of(labels, records);
    }

    static List<String> lines(String name) {
        return new String(bytes(name), StandardCharsets.UTF_8).lines().toList();
    }

    static JsonNode json(String name) {
        return Json.read(bytes(name), name);
    }

    private static byte[] bytes(String name) {
        try (InputStream in = CheckTable.class.getResourceAsStream("/checks/" + name)) {
            return in.readAllBytes();
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    CheckTable relabelled(List<String> others) {
        return new CheckTable(others, records, scale);
    }

    CheckTable only(List<String> materials) {
        List<Integer> kept = IntStream.range(0, labels.size())
                .filter(i -> materials.contains(labels.get(i)))
                .boxed()
                .toList();
        return of(
                kept.stream().map(labels::get).toList(),
                kept.stream().map(records::get).toList());
    }

    private static List<BigDecimal> column(List<List<BigDecimal>> records, int c) {
        return records.stream().map(record -> record.get(c)).toList();
    }

    /** Largest power-of-ten step that loses nothing, offset mid-range rounded to the step. */
    private static ChannelScale lossless(List<BigDecimal> values) {
        int places = values.stream()
                .mapToInt(v -> Math.max(0, v.stripTrailingZeros().scale()))
                .max()
                .orElseThrow();
        BigDecimal least = values.stream().min(BigDecimal::compareTo).orElseThrow();
        BigDecimal most = values.stream().max(BigDecimal::compareTo).orElseThrow();
        BigDecimal offset = least.add(most).divide(BigDecimal.valueOf(2)).setScale(places, RoundingMode.HALF_EVEN);
        BigDecimal step = BigDecimal.ONE.movePointLeft(places);
        BigDecimal steps = most.subtract(least).movePointRight(places);
        if (steps.compareTo(BigDecimal.valueOf(1L << 43)) >= 0) {
            return new ChannelScale(least, commonStep(values, places), Precision.FINE);
        }
        boolean coarse = steps.compareTo(BigDecimal.valueOf(1L << 21)) < 0;
        return new ChannelScale(offset, step, coarse ? Precision.COARSE : Precision.FINE);
    }

    /** Largest step that all values are multiples of, for values with many decimals. */
    private static BigDecimal commonStep(List<BigDecimal> values, int places) {
        BigInteger common = BigInteger.ZERO;
        for (BigDecimal value : values) {
            common = common.gcd(value.movePointRight(places).toBigIntegerExact());
        }
        return new BigDecimal(common).movePointLeft(places);
    }

    /** Names of the materials in code-point order. */
    List<String> materials() {
        return labels.stream().distinct().sorted().toList();
    }

    double[] counts(int record) {
        double[] counts = new double[scale.channels()];
        for (int c = 0; c < counts.length; c++) {
            ChannelScale channel = scale.channel(c);
            BigDecimal count =
                    records.get(record).get(c).subtract(channel.offset()).divide(channel.step());
            counts[c] = count.longValueExact();
        }
        return counts;
    }

    double[] values(int record) {
        return records.get(record).stream().mapToDouble(BigDecimal::doubleValue).toArray();
    }

    /** Exact sums of the records given. */
    Moments moments(int... rows) {
        RowFolder folder =
                new RowFolder(scale.channels(), scale.fineChannels(), BlockKernels.choose(KernelChoice.SCALAR), 64);
        for (int row : rows) {
            folder.add(counts(row), 0);
        }
        return folder.snapshot();
    }

    Moments moments(String material) {
        return moments(rows(material));
    }

    int[] rows(String material) {
        return IntStream.range(0, labels.size())
                .filter(i -> labels.get(i).equals(material))
                .toArray();
    }

    FitRequest request() {
        List<List<Cell>> cells = materials().stream()
                .map(m -> List.of(Cell.asCounted(moments(m))))
                .toList();
        return FitRequest.of(materials(), cells, scale);
    }

    /** Records by truth and nearest material with −2·ln(n_k/n), on the first axes of a fit; ties to the first material. */
    int[][] tally(Fit fit, int axes) {
        List<String> materials = materials();
        int[][] tally = new int[materials.size()][materials.size()];
        double[][] rows = fit.axes();
        double[][] means = fit.positions();
        double[] centre = fit.centre();
        for (int i = 0; i < labels.size(); i++) {
            double[] x = values(i);
            double[] position = new double[axes];
            for (int a = 0; a < axes; a++) {
                for (int c = 0; c < x.length; c++) {
                    position[a] += rows[a][c] * (x[c] - centre[c]);
                }
            }
            int decided = 0;
            double least = Double.POSITIVE_INFINITY;
            for (int k = 0; k < means.length; k++) {
                double distance = -2 * StrictMath.log(fit.recordsPerMaterial()[k] / (double) labels.size());
                for (int a = 0; a < axes; a++) {
                    double apart = position[a] - means[k][a];
                    distance += apart * apart;
                }
                // Equal to within rounding is a tie, which the first material takes.
                if (distance < least - 1e-9) {
                    least = distance;
                    decided = k;
                }
            }
            tally[materials.indexOf(labels.get(i))][decided]++;
        }
        return tally;
    }
}
