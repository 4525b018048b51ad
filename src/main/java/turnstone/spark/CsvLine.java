package turnstone.spark;

import java.util.ArrayList;
import java.util.List;
import turnstone.fault.Fault;

/** Splits one line of comma-separated values as RFC 4180 has it; a field may not run over the end of the line. */
final class CsvLine {
    private CsvLine() {}

    /**
     * The fields of a line.
     *
     * @throws Fault of kind input where a quoted field does not end on the line, or text follows a closing quote
     */
    static List<String> fields(String line, String file, long row) {
        List<String> fields = new ArrayList<>();
        int at = 0;
        while (true) {
            if (at < line.length() && line.charAt(at) == '"') {
                StringBuilder text = new StringBuilder();
                at = quoted(line, at + 1, text, file, row);
                fields.add(text.toString());
            } else {
                int comma = line.indexOf(',', at);
                int end = comma < 0 ? line.length() : comma;
                fields.add(line.substring(at, end));
                at = end;
            }
            if (at >= line.length()) {
                return fields;
            }
            at++;
        }
    }

    private static int quoted(String line, int from, StringBuilder text, String file, long row) {
        int at = from;
        while (true) {
            int quote = line.indexOf('"', at);
            if (quote < 0) {
                throw Fault.input("a quoted field runs over the end of the line")
                        .at(file + " row " + row)
                        .expected("one record on each line")
                        .remedy("write the records without line breaks in fields");
            }
            text.append(line, at, quote);
            if (quote + 1 < line.length() && line.charAt(quote + 1) == '"') {
                text.append('"');
                at = quote + 2;
                continue;
            }
            if (quote + 1 < line.length() && line.charAt(quote + 1) != ',') {
                throw Fault.input("text follows a closing quote").at(file + " row " + row);
            }
            return quote + 1;
        }
    }

    /** One field, quoted where it must be. */
    static String field(String text) {
        boolean plain =
                text.indexOf(',') < 0 && text.indexOf('"') < 0 && text.indexOf('\n') < 0 && text.indexOf('\r') < 0;
        return plain ? text : "\"" + text.replace("\"", "\"\"") + "\"";
    }
}
