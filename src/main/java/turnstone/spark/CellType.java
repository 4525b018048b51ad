package turnstone.spark;

import java.time.Instant;
import java.time.LocalDate;
import org.apache.spark.sql.catalyst.InternalRow;
import org.apache.spark.sql.catalyst.util.ArrayData;
import org.apache.spark.sql.types.ArrayType;
import org.apache.spark.sql.types.BooleanType;
import org.apache.spark.sql.types.ByteType;
import org.apache.spark.sql.types.DataType;
import org.apache.spark.sql.types.DateType;
import org.apache.spark.sql.types.DoubleType;
import org.apache.spark.sql.types.FloatType;
import org.apache.spark.sql.types.IntegerType;
import org.apache.spark.sql.types.LongType;
import org.apache.spark.sql.types.ShortType;
import org.apache.spark.sql.types.StringType;
import org.apache.spark.sql.types.TimestampNTZType;
import org.apache.spark.sql.types.TimestampType;
import turnstone.fault.Fault;
import turnstone.measure.SourceType;

/** The types of cells that are read, and how. */
enum CellType {
    TEXT,
    BOOLEAN,
    DATE,
    TIMESTAMP,
    BYTE,
    SHORT,
    INT,
    LONG,
    FLOAT,
    DOUBLE;

    private static final long MICROSECONDS = 1000;

    /** The type of a column, or of the elements of an array column. */
    static CellType of(DataType type, String column, String place) {
        if (type instanceof StringType) {
            return TEXT;
        } else if (type instanceof BooleanType) {
            return BOOLEAN;
        } else if (type instanceof DateType) {
            return DATE;
        } else if (type instanceof TimestampType || type instanceof TimestampNTZType) {
            return TIMESTAMP;
        } else if (type instanceof ByteType) {
            return BYTE;
        } else if (type instanceof ShortType) {
            return SHORT;
        } else if (type instanceof IntegerType) {
            return INT;
        } else if (type instanceof LongType) {
            return LONG;
        } else if (type instanceof FloatType) {
            return FLOAT;
        } else if (type instanceof DoubleType) {
            return DOUBLE;
        }
        throw wrong(type, column, place, "text, a number, a date or a time");
    }

    /** The type of a channel: a number. */
    static CellType ofChannel(DataType type, String column, String place) {
        CellType cell = of(type, column, place);
        if (cell == TEXT || cell == BOOLEAN || cell == DATE || cell == TIMESTAMP) {
            throw wrong(type, column, place, "float, double, short or int");
        }
        return cell;
    }

    /** The type of the elements of an array of channels. */
    static CellType ofElements(DataType type, String column, String place) {
        if (!(type instanceof ArrayType array)) {
            throw wrong(type, column, place, "an array of float, double, short or int");
        }
        return ofChannel(array.elementType(), column, place);
    }

    private static Fault wrong(DataType type, String column, String place, String expected) {
        return Fault.input("column \"" + column + "\" has the wrong type")
                .at(place)
                .found(type.simpleString())
                .expected(expected);
    }

    /** A number as a double. Longs beyond 2^53 are off every count scale, so their rounding here is harmless. */
    double number(InternalRow row, int ordinal) {
        return switch (this) {
            case BYTE -> row.getByte(ordinal);
            case SHORT -> row.getShort(ordinal);
            case INT -> row.getInt(ordinal);
            case LONG -> (double) row.getLong(ordinal);
            case FLOAT -> row.getFloat(ordinal);
            case DOUBLE -> row.getDouble(ordinal);
            default -> throw new IllegalStateException("not a number: " + this);
        };
    }

    /** The n elements of an array into a buffer; null elements must have been excluded. */
    void numbers(ArrayData array, double[] into, int n) {
        switch (this) {
            case FLOAT -> {
                float[] values = array.toFloatArray();
                for (int i = 0; i < n; i++) {
                    into[i] = values[i];
                }
            }
            case DOUBLE -> System.arraycopy(array.toDoubleArray(), 0, into, 0, n);
            case SHORT -> {
                short[] values = array.toShortArray();
                for (int i = 0; i < n; i++) {
                    into[i] = values[i];
                }
            }
            case INT -> {
                int[] values = array.toIntArray();
                for (int i = 0; i < n; i++) {
                    into[i] = values[i];
                }
            }
            default -> {
                for (int i = 0; i < n; i++) {
                    into[i] = element(array, i);
                }
            }
        }
    }

    /** One element of an array. */
    double element(ArrayData array, int i) {
        return switch (this) {
            case BYTE -> array.getByte(i);
            case SHORT -> array.getShort(i);
            case INT -> array.getInt(i);
            case LONG -> (double) array.getLong(i);
            case FLOAT -> array.getFloat(i);
            case DOUBLE -> array.getDouble(i);
            default -> throw new IllegalStateException("not a number: " + this);
        };
    }

    /** A cell as text, the same on every JVM. */
    String text(InternalRow row, int ordinal) {
        return switch (this) {
            case TEXT -> row.getUTF8String(ordinal).toString();
            case BOOLEAN -> Boolean.toString(row.getBoolean(ordinal));
            case DATE -> LocalDate.ofEpochDay(row.getInt(ordinal)).toString();
            case TIMESTAMP ->
                Instant.ofEpochMilli(Math.floorDiv(row.getLong(ordinal), MICROSECONDS))
                        .toString();
            case BYTE -> Byte.toString(row.getByte(ordinal));
            case SHORT -> Short.toString(row.getShort(ordinal));
            case INT -> Integer.toString(row.getInt(ordinal));
            case LONG -> Long.toString(row.getLong(ordinal));
            case FLOAT -> Numerals.shortest(row.getFloat(ordinal));
            case DOUBLE -> Numerals.shortest(row.getDouble(ordinal));
        };
    }

    /** A cell as a whole number; a time as milliseconds since 1970. */
    long whole(InternalRow row, int ordinal) {
        return switch (this) {
            case BYTE -> row.getByte(ordinal);
            case SHORT -> row.getShort(ordinal);
            case INT, DATE -> row.getInt(ordinal);
            case LONG -> row.getLong(ordinal);
            case TIMESTAMP -> Math.floorDiv(row.getLong(ordinal), MICROSECONDS);
            case TEXT -> parsed(row.getUTF8String(ordinal).toString());
            default -> RecordCursor.NO_NUMBER;
        };
    }

    /** As what its numbers were recorded. */
    SourceType sourceType() {
        return switch (this) {
            case BYTE, SHORT -> SourceType.SHORT;
            case INT, LONG -> SourceType.INT;
            case FLOAT -> SourceType.FLOAT;
            case DOUBLE -> SourceType.DOUBLE;
            default -> throw new IllegalStateException("not a number: " + this);
        };
    }

    private static long parsed(String text) {
        try {
            return Long.parseLong(text);
        } catch (NumberFormatException e) {
            return RecordCursor.NO_NUMBER;
        }
    }
}
