package turnstone.spark;

import java.io.Serializable;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.EnumMap;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Set;
import turnstone.fault.Fault;
import turnstone.measure.Instrument;
import turnstone.measure.ReferenceKind;
import turnstone.measure.ReferenceTable;
import turnstone.plant.ChannelLayout;
import turnstone.plant.Plant;
import turnstone.plant.RecordColumns;
import turnstone.plant.ReferenceSpec;
import turnstone.plant.SourceSpec;
import turnstone.plant.TableFormat;
import turnstone.plant.TrayDeal;

/** The tables that a plant file names, in the terms of this package. */
public final class PlantTables {
    private PlantTables() {}

    /** Where a day's records are and what their columns mean. */
    public static TableSpec records(Plant plant, LocalDate day) {
        RecordColumns names = plant.recordColumns();
        Map<KeyColumn, String> keys = new EnumMap<>(KeyColumn.class);
        keys.put(KeyColumn.DAY, names.day());
        keys.put(KeyColumn.SORTER, names.sorter());
        keys.put(KeyColumn.SHOWING, names.showing());
        keys.put(KeyColumn.TRAY, names.tray());
        keys.put(KeyColumn.MATERIAL, names.material());
        names.piece().ifPresent(name -> keys.put(KeyColumn.PIECE, name));
        names.beltColumn().ifPresent(name -> keys.put(KeyColumn.BELT_COLUMN, name));
        names.time_ms().ifPresent(name -> keys.put(KeyColumn.TIME, name));
        SourceSpec source = plant.records();
        return table(source, source.pathOf(day), columns(source.layout(), keys, plant.channels()));
    }

    private static TableSpec table(SourceSpec source, String path, ColumnNames columns) {
        TableSpec.Form form = source.format() == TableFormat.CSV ? TableSpec.Form.CSV : TableSpec.Form.PARQUET;
        return new TableSpec(List.of(path), form, columns);
    }

    private static ColumnNames columns(ChannelLayout layout, Map<KeyColumn, String> keys, int channels) {
        if (layout instanceof ChannelLayout.OneArray array) {
            return ColumnNames.array(keys, array.column(), channels);
        } else if (layout instanceof ChannelLayout.Listed listed) {
            return ColumnNames.columns(keys, listed.columns());
        } else if (layout instanceof ChannelLayout.Numbered numbered) {
            return ColumnNames.numbered(keys, numbered.prefix());
        }
        throw new IllegalStateException("a layout of channels that is not known: " + layout);
    }

    /**
     * How a day's records become counts.
     *
     * @param references those of {@link #references}, or null where the plant has none
     */
    public static IntakeSpec intake(Plant plant, LocalDate day, ReferenceTable references) {
        Map<String, Instrument> instruments = new HashMap<>();
        for (String sorter : plant.sorters()) {
            plant.instrument(sorter, day).ifPresent(instrument -> instruments.put(sorter, instrument));
        }
        int groups = plant.trayDeal().count();
        HashMap<String, Map<String, Integer>> listed =
                new HashMap<>(plant.trayDeal().listed());
        return IntakeSpec.day(
                day,
                plant.records().pathByDay() ? IntakeSpec.OtherDays.QUARANTINE : IntakeSpec.OtherDays.PASS_OVER,
                Set.copyOf(plant.materialNames()),
                instruments,
                (material, tray) -> new TrayDeal(groups, listed).group(material, tray),
                plant.head(),
                references,
                plant.countScale());
    }

    /** One reference on its way to the driver. */
    private static final class Reference implements Serializable {
        private static final long serialVersionUID = 1L;

        final String origin;
        final String kind;
        final String sorter;
        final long beltColumn;
        final long time_ms;
        final double[] values;

        Reference(RecordCursor cursor, TableColumns columns) {
            if (cursor.defect() != null) {
                throw Fault.input("a reference can't be read")
                        .at(cursor.file() + " row " + cursor.row())
                        .found(cursor.defect().label() + " " + cursor.defectText());
            }
            origin = cursor.file() + " row " + cursor.row();
            kind = cursor.text(columns.index(KeyColumn.KIND));
            sorter = cursor.text(columns.index(KeyColumn.SORTER));
            beltColumn = cursor.whole(columns.index(KeyColumn.BELT_COLUMN));
            time_ms = cursor.whole(columns.index(KeyColumn.TIME));
            values = java.util.Arrays.copyOf(cursor.channels(), cursor.channelCount());
        }
    }

    /**
     * The plant's dark and white references, brought to the driver; null where it has none.
     *
     * @throws Fault of kind input where one is not dark or white or lacks a key, naming it
     */
    public static ReferenceTable references(Session session, Plant plant) {
        if (plant.references().isEmpty()) {
            return null;
        }
        ReferenceSpec spec = plant.references().get();
        Map<KeyColumn, String> keys = new EnumMap<>(KeyColumn.class);
        keys.put(KeyColumn.KIND, spec.columns().kind());
        keys.put(KeyColumn.SORTER, spec.columns().sorter());
        keys.put(KeyColumn.BELT_COLUMN, spec.columns().beltColumn());
        keys.put(KeyColumn.TIME, spec.columns().time_ms());
        TableSpec table =
                table(spec.source(), spec.source().path(), columns(spec.source().layout(), keys, plant.channels()));
        RecordSource source = RecordSource.open(session, table);
        TableColumns columns = source.columns();
        List<Reference> read = SparkTrouble.guard(
                "reading references",
                () -> source.over(cursor -> {
                            List<Reference> found = new ArrayList<>();
                            while (cursor.next()) {
                                found.add(new Reference(cursor, columns));
                            }
                            return found.iterator();
                        })
                        .collect());
        source.requireAll(read.size());
        ReferenceTable.Builder builder = ReferenceTable.builder();
        for (Reference reference : read) {
            add(builder, reference, spec);
        }
        return builder.build();
    }

    private static void add(ReferenceTable.Builder builder, Reference reference, ReferenceSpec spec) {
        if (reference.sorter == null
                || reference.beltColumn != (int) reference.beltColumn
                || reference.time_ms == RecordCursor.NO_NUMBER) {
            throw Fault.input("a reference lacks its sorter, belt column or time")
                    .at(reference.origin);
        }
        ReferenceKind kind;
        if (spec.dark().equals(reference.kind)) {
            kind = ReferenceKind.DARK;
        } else if (spec.white().equals(reference.kind)) {
            kind = ReferenceKind.WHITE;
        } else {
            throw Fault.input("a reference of neither kind")
                    .at(reference.origin)
                    .found(reference.kind)
                    .expected(spec.dark() + " or " + spec.white());
        }
        builder.add(kind, reference.sorter, (int) reference.beltColumn, reference.time_ms, reference.values);
    }
}
