package turnstone.plant;

import java.nio.file.Path;
import java.util.Optional;

/** Reads where tables are and how they are laid out. */
final class SourceReader {
    private static final double MS_PER_HOUR = 3_600_000;

    private final Path folder;

    SourceReader(Path folder) {
        this.folder = folder;
    }

    /** A path beside the plant file as an absolute one; a URI as it is. */
    String resolved(String path) {
        boolean uri = path.matches("[A-Za-z][A-Za-z0-9+.-]*:.*");
        // Not by Path.resolve: braces and globs are no file names on every system.
        return uri || path.startsWith("/") ? path : folder.toAbsolutePath().normalize() + "/" + path;
    }

    SourceSpec source(Entry entry) {
        return new SourceSpec(
                resolved(entry.at("path").text()),
                TableFormat.of(entry.at("format").text()),
                layout(entry.at("layout")));
    }

    private static ChannelLayout layout(Entry entry) {
        return switch (entry.oneOf("array", "columns", "prefix")) {
            case "array" -> new ChannelLayout.OneArray(entry.at("array").text());
            case "columns" ->
                new ChannelLayout.Listed(Known.once(entry.at("columns").items(), "column"));
            default -> new ChannelLayout.Numbered(entry.at("prefix").text());
        };
    }

    RecordColumns recordColumns(Entry records) {
        Optional<Entry> columns = records.optional("columns");
        return new RecordColumns(
                named(columns, "day", "day"),
                named(columns, "sorter", "sorter"),
                named(columns, "showing", "showing"),
                named(columns, "tray", "tray"),
                named(columns, "material", "material"),
                columns.flatMap(entry -> entry.text("piece")),
                columns.flatMap(entry -> entry.text("beltColumn")),
                columns.flatMap(entry -> entry.text("time_ms")));
    }

    ReferenceSpec references(Entry entry) {
        SourceSpec source = source(entry);
        if (source.pathByDay()) {
            throw entry.at("path")
                    .fault("references have one path for all days")
                    .found(entry.at("path").text())
                    .remedy(
                            "use a glob such as references/*.parquet: the newest white before midnight serves the next day");
        }
        Optional<Entry> columns = entry.optional("columns");
        ReferenceSpec.Columns names = new ReferenceSpec.Columns(
                named(columns, "kind", "kind"),
                named(columns, "sorter", "sorter"),
                named(columns, "beltColumn", "belt_column"),
                named(columns, "time_ms", "time_ms"));
        String dark = entry.text("dark", "dark");
        String white = entry.text("white", "white");
        if (dark.equals(white)) {
            throw entry.fault("dark and white need words of their own").found(dark + " for both");
        }
        long age_ms = Math.round(entry.at("maxAge_hours").number() * MS_PER_HOUR);
        return new ReferenceSpec(source, names, dark, white, age_ms);
    }

    private static String named(Optional<Entry> columns, String key, String otherwise) {
        return columns.flatMap(entry -> entry.text(key)).orElse(otherwise);
    }
}
