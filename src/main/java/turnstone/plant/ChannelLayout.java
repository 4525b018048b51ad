package turnstone.plant;

import java.util.List;

/** Where a table keeps the channels of a record. */
public sealed interface ChannelLayout {
    /**
     * All channels in one array column.
     *
     * @param column its name
     */
    record OneArray(String column) implements ChannelLayout {}

    /**
     * One numeric column for each channel, in this order.
     *
     * @param columns their names, channel 0 first
     */
    record Listed(List<String> columns) implements ChannelLayout {
        /** Keeps a copy. */
        public Listed {
            columns = List.copyOf(columns);
        }
    }

    /**
     * One numeric column for each channel: every column whose name is the prefix and digits, in the order of the numbers.
     *
     * @param prefix what comes before the digits
     */
    record Numbered(String prefix) implements ChannelLayout {}
}
