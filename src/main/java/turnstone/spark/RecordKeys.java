package turnstone.spark;

/** The key texts of a record; null where missing. */
record RecordKeys(String day, String sorter, String showing, String tray, String material) {
    /** The same texts as the same objects: quick, and enough where it says yes. */
    boolean isSame(String otherDay, String otherSorter, String otherShowing, String otherTray, String otherMaterial) {
        return day == otherDay
                && sorter == otherSorter
                && showing == otherShowing
                && tray == otherTray
                && material == otherMaterial;
    }
}
