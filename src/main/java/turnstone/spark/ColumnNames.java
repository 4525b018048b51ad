package turnstone.spark;

import java.io.Serializable;
import java.util.EnumMap;
import java.util.List;
import java.util.Map;
import java.util.Set;

/**
 * Which columns of a table are keys and which are channels.
 *
 * @param keys the name of each key column that the table has
 * @param layout how the channels are laid out
 * @param channels the one array column, or one column per channel in order, or the prefix of numbered ones;
 *     empty for {@link Layout#ALL_OTHERS}
 * @param channelCount the number of channels of an array column; 0 = as the first record has. For columns their number
 * @param others what becomes of the columns that are neither
 */
public record ColumnNames(
        Map<KeyColumn, String> keys, Layout layout, List<String> channels, int channelCount, Others others)
        implements Serializable {

    /** How channels lie in a table. */
    public enum Layout {
        /** One column holds an array of all channels. */
        ARRAY,
        /** One numeric column per channel, by name. */
        COLUMNS,
        /** One numeric column per channel: every column whose name is the one given and digits, in the order of the numbers. */
        NUMBERED,
        /** Every column that is no key is a channel, in the order of the table. */
        ALL_OTHERS
    }

    /** What becomes of columns that are neither key nor channel. */
    public enum Others {
        /** They are not read. */
        LEAVE,
        /** They are read as text and carried through. */
        CARRY
    }

    /** Checks and copies. */
    public ColumnNames {
        Map<KeyColumn, String> sorted = new EnumMap<>(KeyColumn.class);
        sorted.putAll(keys);
        keys = sorted;
        channels = List.copyOf(channels);
        if ((layout == Layout.ARRAY || layout == Layout.NUMBERED) && channels.size() != 1) {
            throw new IllegalArgumentException("one array column or prefix, not " + channels.size());
        }
        if (Set.copyOf(channels).size() != channels.size()) {
            throw new IllegalArgumentException("a channel column is named twice");
        }
    }

    /** Channels in one array column. */
    public static ColumnNames array(Map<KeyColumn, String> keys, String column, int channelCount) {
        return new ColumnNames(keys, Layout.ARRAY, List.of(column), channelCount, Others.LEAVE);
    }

    /** Channels in named columns. */
    public static ColumnNames columns(Map<KeyColumn, String> keys, List<String> channels) {
        return new ColumnNames(keys, Layout.COLUMNS, channels, channels.size(), Others.LEAVE);
    }

    /** Channels in numbered columns. */
    public static ColumnNames numbered(Map<KeyColumn, String> keys, String prefix) {
        return new ColumnNames(keys, Layout.NUMBERED, List.of(prefix), 0, Others.LEAVE);
    }

    /** A plain table: every column but the label is a channel. */
    public static ColumnNames allBut(String label) {
        return new ColumnNames(Map.of(KeyColumn.MATERIAL, label), Layout.ALL_OTHERS, List.of(), 0, Others.LEAVE);
    }

    /** The same, with the columns that are neither key nor channel carried through. */
    public ColumnNames carryingOthers() {
        return new ColumnNames(keys, layout, channels, channelCount, Others.CARRY);
    }
}
