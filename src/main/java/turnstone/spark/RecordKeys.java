package turnstone.spark;

import java.util.Objects;

/** The key texts of a record; null where missing. */
record RecordKeys(String day, String sorter, String showing, String tray, String material) {
    /** Whether the keys are these; quick where the texts are the same objects. */
    boolean isSame(String otherDay, String otherSorter, String otherShowing, String otherTray, String otherMaterial) {
        return Objects.equals(showing, otherShowing)
                && Objects.equals(tray, otherTray)
                && Objects.equals(material, otherMaterial)
                && Objects.equals(sorter, otherSorter)
                && Objects.equals(day, otherDay);
    }
}
