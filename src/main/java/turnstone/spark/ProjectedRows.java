package turnstone.spark;

import java.util.ArrayList;
import java.util.Iterator;
import java.util.List;
import java.util.NoSuchElementException;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.RowFactory;
import org.apache.spark.sql.types.DataType;
import org.apache.spark.sql.types.DataTypes;
import org.apache.spark.sql.types.StructField;
import org.apache.spark.sql.types.StructType;
import turnstone.decide.Judgement;
import turnstone.decide.Projector;

/** The rows of a projection, one for each record that is accepted or has no signal, in the order of the partition. */
final class ProjectedRows implements Iterator<Row> {
    /** How numbers go into the table. */
    enum Cells {
        /** As doubles and booleans. */
        TYPED,
        /** As text, the same on every JVM. */
        TEXT
    }

    private final RecordCursor cursor;
    private final Intake intake;
    private final Projector projector;
    private final int texts;
    private final Cells cells;
    private final double[] position;
    private final Judgement judgement = new Judgement();
    private Row ahead;

    ProjectedRows(RecordCursor cursor, Intake intake, Projector projector, int texts, Cells cells) {
        this.cursor = cursor;
        this.intake = intake;
        this.projector = projector;
        this.texts = texts;
        this.cells = cells;
        this.position = new double[projector.rank()];
    }

    static StructType schema(List<String> texts, int rank, Cells cells) {
        List<StructField> fields = new ArrayList<>();
        DataType number = cells == Cells.TYPED ? DataTypes.DoubleType : DataTypes.StringType;
        DataType flag = cells == Cells.TYPED ? DataTypes.BooleanType : DataTypes.StringType;
        texts.forEach(name -> fields.add(DataTypes.createStructField(name, DataTypes.StringType, true)));
        for (int axis = 1; axis <= rank; axis++) {
            fields.add(DataTypes.createStructField("axis_" + axis, number, true));
        }
        fields.add(DataTypes.createStructField("decided", DataTypes.StringType, true));
        fields.add(DataTypes.createStructField("margin", number, true));
        fields.add(DataTypes.createStructField("distance", number, true));
        fields.add(DataTypes.createStructField("unfamiliar", flag, true));
        fields.add(DataTypes.createStructField("no_signal", flag, true));
        return new StructType(fields.toArray(StructField[]::new));
    }

    @Override
    public boolean hasNext() {
        while (ahead == null && cursor.next()) {
            Intake.Outcome outcome = intake.take();
            if (outcome == Intake.Outcome.ACCEPTED) {
                projector.judge(intake.counts(), 0, position, judgement);
                ahead = decided();
            } else if (outcome == Intake.Outcome.NO_SIGNAL) {
                ahead = dark();
            }
        }
        return ahead != null;
    }

    @Override
    public Row next() {
        if (!hasNext()) {
            throw new NoSuchElementException();
        }
        Row row = ahead;
        ahead = null;
        return row;
    }

    private Object[] keys() {
        Object[] row = new Object[texts + position.length + 5];
        for (int i = 0; i < texts; i++) {
            row[i] = cursor.text(i);
        }
        return row;
    }

    private Row decided() {
        Object[] row = keys();
        int at = texts;
        for (double coordinate : position) {
            row[at++] = number(coordinate);
        }
        row[at++] = projector.material(judgement.material());
        row[at++] = number(judgement.margin());
        row[at++] = number(judgement.distance());
        row[at++] = flag(judgement.unfamiliar() ? Boolean.TRUE : Boolean.FALSE);
        row[at] = flag(Boolean.FALSE);
        return RowFactory.create(row);
    }

    private Row dark() {
        Object[] row = keys();
        row[row.length - 1] = flag(Boolean.TRUE);
        return RowFactory.create(row);
    }

    private Object number(double value) {
        return cells == Cells.TYPED ? (Object) value : Numerals.shortest(value);
    }

    private Object flag(Boolean value) {
        return cells == Cells.TYPED ? (Object) value : value.toString();
    }
}
