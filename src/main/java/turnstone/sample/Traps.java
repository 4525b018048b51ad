package turnstone.sample;

/** Where a careless tool goes wrong; docs/sample-plant.md has the table. Sorters are told by their place in {@link Fleet#NAMES}. */
final class Traps {
    /** The sorter whose lamp ages: dunlin. */
    static final int AGEING_SORTER = 2;

    /** The sorter that gets another camera: godwit. */
    static final int NEW_CAMERA_SORTER = 3;

    /** The night from which on it has it. */
    static final int NEW_CAMERA_NIGHT = 7;

    /** The sorter whose white is stale on the last night: knot. */
    static final int STALE_SORTER = 4;

    /** The belt columns of it that have no white of that night, and looked through a film on the night before. */
    static final int FIRST_STALE_COLUMN = 5;

    static final int LAST_STALE_COLUMN = 6;

    /** The sorter of the mislabelled showing on the last night: curlew. */
    static final int MISLABELLED_SORTER = 1;

    /** What was noted for it, and what was on the tray. */
    static final String NOTED_MATERIAL = "PP";

    static final String SHOWN_MATERIAL = "PS";

    /** A sorter that the plant does not have. */
    static final String UNKNOWN_SORTER = "heron";

    /** The showing of each night in which one record has a dead pixel, and that record. */
    static final int DEAD_PIXEL_SHOWING = 7;

    static final int DEAD_PIXEL_RECORD = 5;

    private Traps() {}

    static boolean newCamera(int sorter, int night) {
        return sorter == NEW_CAMERA_SORTER && night >= NEW_CAMERA_NIGHT;
    }

    static boolean staleColumn(int sorter, int beltColumn) {
        return sorter == STALE_SORTER && beltColumn >= FIRST_STALE_COLUMN && beltColumn <= LAST_STALE_COLUMN;
    }
}
