package turnstone.sample;

import java.time.LocalDate;

/**
 * One tray on one sorter, once.
 *
 * @param id unique in the fleet
 * @param day the night it belongs to
 * @param sorter where it was shown
 * @param tray the tray's name as it was noted
 * @param material the material as it was noted
 * @param trueMaterial what the pieces are
 * @param start_ms time of its first record, milliseconds since 1970-01-01T00:00Z
 * @param place what its chance numbers hang on
 */
public record SampleShowing(
        String id,
        LocalDate day,
        String sorter,
        String tray,
        String material,
        String trueMaterial,
        long start_ms,
        Place place) {
    /**
     * Where a showing stands in the sample.
     *
     * @param night from 0
     * @param sorter index of the sorter
     * @param material index of the true material
     * @param tray number of the tray whose pieces were shown, from 1
     * @param showing number in the night, from 0
     */
    record Place(int night, int sorter, int material, long tray, long showing) {}
}
