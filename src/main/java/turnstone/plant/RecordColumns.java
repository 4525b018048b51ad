package turnstone.plant;

import java.util.Optional;

/**
 * The names of the key columns of the records.
 *
 * @param day text such as 2026-03-01, or a date
 * @param sorter name of the sorter
 * @param showing id of the showing, unique in the fleet
 * @param tray name of the tray
 * @param material name of the material
 * @param piece the item on the tray, where kept
 * @param beltColumn pixel across the belt, an integer; there whenever references are used
 * @param time_ms milliseconds since 1970-01-01T00:00Z; there whenever references are used
 */
public record RecordColumns(
        String day,
        String sorter,
        String showing,
        String tray,
        String material,
        Optional<String> piece,
        Optional<String> beltColumn,
        Optional<String> time_ms) {}
