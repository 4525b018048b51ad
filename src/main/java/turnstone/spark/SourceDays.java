package turnstone.spark;

import java.io.IOException;
import java.time.LocalDate;
import java.time.format.DateTimeParseException;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.TreeSet;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.apache.hadoop.conf.Configuration;
import org.apache.hadoop.fs.FileStatus;
import org.apache.hadoop.fs.Path;
import turnstone.fault.Fault;
import turnstone.plant.Plant;

/** Which days a plant's source has. */
public final class SourceDays {
    private static final String DAY = "{day}";
    private static final String DAY_GLOB = "[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]";
    private static final String DAY_PATTERN = "([0-9]{4}-[0-9]{2}-[0-9]{2})";

    private SourceDays() {}

    /**
     * The days, oldest first: by the names of files and folders where the path has the day in it, else by reading the day column.
     *
     * @throws Fault of kind storage where the source can't be listed or read
     */
    public static List<LocalDate> of(Session session, Plant plant) {
        String path = plant.records().path();
        if (plant.records().pathByDay()) {
            return byName(path, session.spark().sparkContext().hadoopConfiguration());
        }
        RecordSource source = RecordSource.open(session, PlantTables.records(plant, LocalDate.EPOCH));
        int at = source.columns().index(KeyColumn.DAY);
        List<String> found = SparkTrouble.guard(
                "looking for days",
                () -> source.over(cursor -> {
                            Set<String> days = new TreeSet<>();
                            while (cursor.next()) {
                                String day = cursor.text(at);
                                if (day != null) {
                                    days.add(day);
                                }
                            }
                            return days.iterator();
                        })
                        .collect());
        return dates(found);
    }

    /** What is no date is left for the intake to quarantine. */
    private static List<LocalDate> dates(Iterable<String> texts) {
        TreeSet<LocalDate> days = new TreeSet<>();
        for (String text : texts) {
            date(text).ifPresent(days::add);
        }
        return List.copyOf(days);
    }

    private static Optional<LocalDate> date(String text) {
        try {
            return Optional.of(LocalDate.parse(text));
        } catch (DateTimeParseException notADay) {
            return Optional.empty();
        }
    }

    /** Looks only at the part of the path that has the day in it; what lies below is read when the day is. */
    static List<LocalDate> byName(String path, Configuration configuration) {
        int slash = path.indexOf('/', path.indexOf(DAY));
        String upToDay = slash < 0 ? path : path.substring(0, slash);
        String name = upToDay.substring(upToDay.lastIndexOf('/') + 1);
        Pattern pattern = Pattern.compile(expression(name));
        List<String> found = new ArrayList<>();
        try {
            Path glob = new Path(upToDay.replace(DAY, DAY_GLOB));
            FileStatus[] matches = glob.getFileSystem(configuration).globStatus(glob);
            for (FileStatus match : matches == null ? new FileStatus[0] : matches) {
                Matcher matcher = pattern.matcher(match.getPath().getName());
                if (matcher.matches()) {
                    found.add(matcher.group(1));
                }
            }
        } catch (IOException | IllegalArgumentException e) {
            throw Fault.storage("the days of the source can't be listed")
                    .at(path)
                    .found(e.getMessage())
                    .because(e);
        }
        return dates(found);
    }

    private static String expression(String name) {
        StringBuilder expression = new StringBuilder();
        int day = name.indexOf(DAY);
        literal(expression, name.substring(0, day));
        expression.append(DAY_PATTERN);
        literal(expression, name.substring(day + DAY.length()).replace(DAY, "*"));
        return expression.toString();
    }

    private static void literal(StringBuilder expression, String text) {
        for (int i = 0; i < text.length(); i++) {
            char c = text.charAt(i);
            expression.append(c == '*' ? ".*" : c == '?' ? "." : Pattern.quote(String.valueOf(c)));
        }
    }
}
