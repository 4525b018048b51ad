package turnstone.plant;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.DateTimeException;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.HashSet;
import java.util.List;
import java.util.Set;
import java.util.stream.Collectors;
import turnstone.fault.Fault;
import turnstone.measure.Instrument;

/** Reads the axis and the instruments. */
final class OpticsReader {
    private final Path folder;
    private final List<String> sorters;

    OpticsReader(Path folder, List<String> sorters) {
        this.folder = folder;
        this.sorters = sorters;
    }

    /** The plant's wavelength axis in nm; empty where the plant file gives the number of channels only. */
    double[] axis(Entry root) {
        return root.oneOf("axis", "channels").equals("axis") ? wavelengths(root.at("axis")) : new double[0];
    }

    List<Instrument> instruments(Entry root, int channels) {
        List<Instrument> instruments = new ArrayList<>();
        Set<String> names = new HashSet<>();
        for (Entry entry : root.at("instruments").items()) {
            Instrument instrument = instrument(entry, channels);
            if (!names.add(instrument.name())) {
                throw entry.fault("a second instrument of the same sorter since the same day")
                        .found(instrument.name());
            }
            instruments.add(instrument);
        }
        for (String sorter : sorters) {
            if (instruments.stream().noneMatch(instrument -> instrument.sorter().equals(sorter))) {
                throw root.at("instruments")
                        .fault("a sorter without an instrument")
                        .found("sorter " + sorter)
                        .remedy("say what its optics are, and since when");
            }
        }
        return List.copyOf(instruments);
    }

    private Instrument instrument(Entry entry, int channels) {
        String sorter = Known.name(entry.at("sorter"), sorters, "sorter");
        LocalDate since = day(entry.at("since"));
        if (!entry.has("wavelengths")) {
            return entry.checked(() -> Instrument.withoutWavelengths(sorter, since, channels));
        }
        double[] wavelength_nm = wavelengths(entry.at("wavelengths"));
        Set<Integer> dead = entry.optional("deadChannels")
                .map(list -> list.items().stream().map(item -> item.whole() - 1).collect(Collectors.toSet()))
                .orElse(Set.of());
        List<Instrument.Band> bands = new ArrayList<>();
        for (Entry band : entry.optional("bands").map(Entry::items).orElse(List.of())) {
            double[] own = wavelengths(band.at("wavelengths"));
            bands.add(band.checked(() -> new Instrument.Band(
                    band.at("firstColumn").whole(), band.at("lastColumn").whole(), own)));
        }
        return entry.checked(() -> Instrument.of(sorter, since, wavelength_nm, dead, bands));
    }

    private static LocalDate day(Entry entry) {
        try {
            return LocalDate.parse(entry.text());
        } catch (DateTimeException e) {
            throw entry.fault("there is no such day")
                    .found(entry.text())
                    .expected("a date such as 2026-03-01")
                    .because(e);
        }
    }

    /** Ascending wavelengths in nm: evenly spaced, listed, or one on each line of a file. */
    private double[] wavelengths(Entry entry) {
        if (entry.has("at_nm") || entry.has("file")) {
            String key = entry.oneOf("at_nm", "file", "first_nm", "last_nm", "channels");
            Entry from = entry.at(key);
            return ascending(
                    from,
                    key.equals("file")
                            ? file(from)
                            : from.items().stream().mapToDouble(Entry::number).toArray());
        }
        double first = entry.at("first_nm").number();
        double last = entry.at("last_nm").number();
        double[] even = new double[entry.at("channels").whole()];
        for (int c = 0; c < even.length; c++) {
            even[c] = first + (last - first) * c / (even.length - 1);
        }
        return ascending(entry, even);
    }

    private static double[] ascending(Entry entry, double[] wavelength_nm) {
        for (int c = 1; c < wavelength_nm.length; c++) {
            if (!(wavelength_nm[c] > wavelength_nm[c - 1])) {
                throw entry.fault("wavelengths must ascend")
                        .found(wavelength_nm[c] + " nm after " + wavelength_nm[c - 1] + " nm")
                        .expected("the shortest first");
            }
        }
        return wavelength_nm;
    }

    private double[] file(Entry entry) {
        Path file = folder.resolve(entry.text());
        List<String> lines;
        try {
            lines = Files.readAllLines(file);
        } catch (IOException e) {
            throw entry.fault("the wavelength table can't be read")
                    .found(file + " (" + e.getClass().getSimpleName() + ")")
                    .because(e);
        }
        if (lines.size() < 3 || !lines.get(0).strip().equals("wavelength_nm")) {
            throw entry.fault("not a wavelength table: " + file)
                    .found(lines.isEmpty() ? "an empty file" : lines.size() + " lines, the first " + lines.get(0))
                    .expected("the header wavelength_nm and one number on each line");
        }
        double[] wavelength_nm = new double[lines.size() - 1];
        for (int c = 0; c < wavelength_nm.length; c++) {
            wavelength_nm[c] = parsed(lines.get(c + 1), entry, file + " line " + (c + 2));
        }
        return wavelength_nm;
    }

    private static double parsed(String line, Entry entry, String place) {
        try {
            double value = Double.parseDouble(line.strip());
            if (value > 0 && value < Double.POSITIVE_INFINITY) {
                return value;
            }
        } catch (NumberFormatException e) {
            throw notWavelength(line, entry, place).because(e);
        }
        throw notWavelength(line, entry, place);
    }

    private static Fault notWavelength(String line, Entry entry, String place) {
        return entry.fault("not a wavelength: " + place).found(line).expected("a number above 0");
    }
}
