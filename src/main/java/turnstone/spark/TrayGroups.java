package turnstone.spark;

import java.io.Serializable;

/** Which tray group a tray is in, from 0. */
@FunctionalInterface
public interface TrayGroups extends Serializable {
    /** The group of a tray of a material. */
    int of(String material, String tray);
}
