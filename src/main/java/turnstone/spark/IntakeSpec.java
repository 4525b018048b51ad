package turnstone.spark;

import java.io.Serializable;
import java.time.LocalDate;
import java.util.HashMap;
import java.util.HashSet;
import java.util.Map;
import java.util.Set;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.Instrument;
import turnstone.measure.ReferenceTable;

/**
 * What makes a record acceptable and how it becomes counts: the known names, the pretreatment head, the count scale. Immutable.
 *
 * <p>Made by {@link #day} for records of a plant, by {@link #table} for a plain table.
 */
public final class IntakeSpec implements Serializable {
    private static final long serialVersionUID = 1L;

    /** Name of the one instrument of a plain table. */
    public static final String TABLE = "table";

    private static final LocalDate TABLE_SINCE = LocalDate.EPOCH;

    private final String day;
    private final OtherDays otherDays;
    private final HashSet<String> materials;
    private final HashMap<String, Instrument> instruments;
    private final TrayGroups trayGroups;
    private final HeadSpec head;
    private final ReferenceTable references;
    private final CountScale scale;
    private final HashSet<String> without;

    /** What becomes of records of another day. */
    public enum OtherDays {
        /** They don't belong in these files: quarantined as {@code wrong day}. */
        QUARANTINE,
        /** The files hold many days: they are passed over, and counted as such. */
        PASS_OVER
    }

    private IntakeSpec(
            String day,
            OtherDays otherDays,
            Set<String> materials,
            Map<String, Instrument> instruments,
            TrayGroups trayGroups,
            HeadSpec head,
            ReferenceTable references,
            CountScale scale,
            Set<String> without) {
        this.day = day;
        this.otherDays = otherDays;
        this.materials = new HashSet<>(materials);
        this.instruments = new HashMap<>(instruments);
        this.trayGroups = trayGroups;
        this.head = head;
        this.references = references;
        this.scale = scale;
        this.without = new HashSet<>(without);
        if (scale != null && head.outputs() != scale.channels()) {
            throw new IllegalArgumentException(
                    "the head gives " + head.outputs() + " channels, the count scale has " + scale.channels());
        }
    }

    /**
     * Records of a day of a plant.
     *
     * @param materials the names known
     * @param instruments by sorter, those of that day
     * @param references null where the head needs none
     * @param scale null where one is yet to be proposed: nothing can be folded then
     */
    public static IntakeSpec day(
            LocalDate day,
            OtherDays otherDays,
            Set<String> materials,
            Map<String, Instrument> instruments,
            TrayGroups trayGroups,
            HeadSpec head,
            ReferenceTable references,
            CountScale scale) {
        return new IntakeSpec(
                day.toString(), otherDays, materials, instruments, trayGroups, head, references, scale, Set.of());
    }

    /** Records of a plain table: no day, no sorter, no showing; any label. */
    public static IntakeSpec table(HeadSpec head, CountScale scale) {
        Instrument instrument = Instrument.withoutWavelengths(TABLE, TABLE_SINCE, head.channels());
        return new IntakeSpec(
                null,
                OtherDays.QUARANTINE,
                Set.of(),
                Map.of(TABLE, instrument),
                (material, tray) -> 0,
                head,
                null,
                scale,
                Set.of());
    }

    /** The same with showings left out on purpose; their records are counted apart. */
    public IntakeSpec without(Set<String> showings) {
        return new IntakeSpec(day, otherDays, materials, instruments, trayGroups, head, references, scale, showings);
    }

    /** The same with another count scale. */
    public IntakeSpec withScale(CountScale other) {
        return new IntakeSpec(day, otherDays, materials, instruments, trayGroups, head, references, other, without);
    }

    /** Whether the records have no keys but a label. */
    boolean isTable() {
        return day == null;
    }

    /** The count scale. */
    public CountScale scale() {
        return scale;
    }

    /** The pretreatment head. */
    public HeadSpec head() {
        return head;
    }

    String day() {
        return day;
    }

    OtherDays otherDays() {
        return otherDays;
    }

    boolean knowsMaterial(String material) {
        return materials.contains(material);
    }

    Instrument instrument(String sorter) {
        return instruments.get(sorter);
    }

    int trayGroup(String material, String tray) {
        return trayGroups.of(material, tray);
    }

    ReferenceTable references() {
        return references;
    }

    boolean leavesOut(String showing) {
        return without.contains(showing);
    }
}
