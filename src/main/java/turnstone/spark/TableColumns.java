package turnstone.spark;

import java.io.Serializable;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.EnumMap;
import java.util.HashSet;
import java.util.List;
import java.util.Map;
import java.util.Set;
import turnstone.fault.Fault;

/**
 * The columns to read from a table, found by name in what it has.
 *
 * @param texts columns read as text: keys first, then those carried through
 * @param keyIndex where in {@code texts} each key is
 * @param layout array or columns
 * @param channels the array column, or one column per channel
 */
record TableColumns(
        List<String> texts, Map<KeyColumn, Integer> keyIndex, ColumnNames.Layout layout, List<String> channels)
        implements Serializable {

    static TableColumns resolve(ColumnNames names, List<String> available, String place) {
        Set<String> present = new HashSet<>(available);
        List<String> texts = new ArrayList<>();
        Map<KeyColumn, Integer> keyIndex = new EnumMap<>(KeyColumn.class);
        for (Map.Entry<KeyColumn, String> key : names.keys().entrySet()) {
            require(present, key.getValue(), key.getKey().label(), available, place);
            keyIndex.put(key.getKey(), texts.size());
            texts.add(key.getValue());
        }
        List<String> channels = channels(names, available, texts);
        for (String channel : channels) {
            require(present, channel, "channel", available, place);
        }
        if (channels.isEmpty()) {
            throw Fault.input("the table has no column left for channels").at(place);
        }
        if (names.others() == ColumnNames.Others.CARRY) {
            Set<String> used = new HashSet<>(channels);
            used.addAll(texts);
            available.stream().filter(column -> !used.contains(column)).forEach(texts::add);
        }
        ColumnNames.Layout layout =
                names.layout() == ColumnNames.Layout.ARRAY ? ColumnNames.Layout.ARRAY : ColumnNames.Layout.COLUMNS;
        return new TableColumns(List.copyOf(texts), keyIndex, layout, List.copyOf(channels));
    }

    private static List<String> channels(ColumnNames names, List<String> available, List<String> texts) {
        return switch (names.layout()) {
            case ARRAY, COLUMNS -> names.channels();
            case ALL_OTHERS ->
                available.stream().filter(column -> !texts.contains(column)).toList();
            case NUMBERED -> numbered(names.channels().get(0), available);
        };
    }

    private static List<String> numbered(String prefix, List<String> available) {
        return available.stream()
                .filter(column -> column.startsWith(prefix)
                        && column.substring(prefix.length()).matches("[0-9]{1,9}"))
                .sorted(Comparator.comparingInt(column -> Integer.parseInt(column.substring(prefix.length()))))
                .toList();
    }

    private static void require(
            Set<String> present, String column, String meaning, List<String> available, String place) {
        if (!present.contains(column)) {
            throw Fault.input("the " + meaning + " column \"" + column + "\" is missing")
                    .at(place)
                    .found("columns " + abridged(available))
                    .remedy("map the column by its name in the file");
        }
    }

    private static String abridged(List<String> names) {
        int shown = 12;
        return names.size() <= shown
                ? String.join(", ", names)
                : String.join(", ", names.subList(0, shown)) + ", … (" + names.size() + ")";
    }

    /** Where in the texts a key is, or -1. */
    int index(KeyColumn key) {
        return keyIndex.getOrDefault(key, -1);
    }
}
