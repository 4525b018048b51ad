package turnstone.cli;

import java.util.List;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.fault.Fault;
import turnstone.plant.Spelling;

/** Reads {@code NAME=KG,NAME=KG}. */
final class Masses {
    private Masses() {}

    /**
     * The masses by name.
     *
     * @param option which option it is, for messages
     * @param names those that may be given
     * @param kind what they are, for messages
     */
    static SortedMap<String, Double> read(String text, String option, List<String> names, String kind) {
        SortedMap<String, Double> masses = new TreeMap<>();
        for (String part : text.split(",", -1)) {
            int equals = part.lastIndexOf('=');
            if (equals < 1) {
                throw Fault.usage("not a name and a mass")
                        .at(option)
                        .found("\"" + part + "\"")
                        .expected("NAME=KG, several with commas between");
            }
            String name = part.substring(0, equals).strip();
            if (!names.contains(name)) {
                throw Spelling.unknown(kind, name, names).at(option);
            }
            if (masses.put(name, mass(part.substring(equals + 1).strip(), name, option)) != null) {
                throw Fault.usage(kind + " `" + name + "` is given twice").at(option);
            }
        }
        return masses;
    }

    private static double mass(String text, String name, String option) {
        Fault refusal = Fault.usage("not a mass")
                .at(option + " " + name)
                .found("\"" + text + "\"")
                .expected("kilograms, such as 812.5");
        // Double.parseDouble takes NaN, hexadecimal and a trailing f as well.
        if (!text.matches("\\d+(\\.\\d+)?")) {
            throw refusal;
        }
        try {
            return Double.parseDouble(text);
        } catch (NumberFormatException e) {
            throw refusal.because(e);
        }
    }
}
