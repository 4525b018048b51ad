package turnstone.spark;

import java.io.IOException;
import java.util.ArrayList;
import java.util.List;
import org.apache.hadoop.conf.Configuration;
import org.apache.hadoop.fs.Path;
import org.apache.parquet.hadoop.ParquetFileReader;
import org.apache.parquet.hadoop.util.HadoopInputFile;
import org.apache.parquet.schema.MessageType;
import org.apache.spark.sql.execution.datasources.parquet.ParquetToSparkSchemaConverter;
import org.apache.spark.sql.internal.SQLConf;
import org.apache.spark.sql.types.DataType;
import org.apache.spark.sql.types.DataTypes;
import org.apache.spark.sql.types.StructField;
import org.apache.spark.sql.types.StructType;
import turnstone.fault.Fault;

/** The footer of one Parquet file, read on the driver: its records and its columns. */
record ParquetScan(String file, long records, StructType schema) {
    static ParquetScan of(String file, Configuration configuration, SQLConf settings) {
        try (ParquetFileReader reader =
                ParquetFileReader.open(HadoopInputFile.fromPath(new Path(file), configuration))) {
            MessageType columns = reader.getFooter().getFileMetaData().getSchema();
            StructType schema = new ParquetToSparkSchemaConverter(settings).convert(columns);
            return new ParquetScan(file, reader.getRecordCount(), schema);
        } catch (IOException | RuntimeException e) {
            throw Fault.storage("not a readable Parquet file")
                    .at(file)
                    .found(String.valueOf(e.getMessage()).lines().findFirst().orElse(""))
                    .remedy("write the file again, or take it out of the folder")
                    .because(e);
        }
    }

    List<String> names() {
        return List.of(schema.fieldNames());
    }

    /** The columns to read, with the reader's own column for the number of the record. */
    StructType toRead(TableColumns columns) {
        List<StructField> fields = new ArrayList<>();
        for (String name : columns.texts()) {
            fields.add(schema.apply(name));
        }
        for (String name : columns.channels()) {
            fields.add(schema.apply(name));
        }
        fields.add(DataTypes.createStructField(RowLayout.ROW_COLUMN, DataTypes.LongType, true));
        return new StructType(fields.toArray(StructField[]::new));
    }

    /** Refuses a file whose columns have other types than the first file's. */
    void requireSame(ParquetScan first, TableColumns columns) {
        List<String> names = new ArrayList<>(columns.texts());
        names.addAll(columns.channels());
        for (String name : names) {
            DataType expected = first.schema.apply(name).dataType();
            DataType found = schema.apply(name).dataType();
            if (!found.asNullable().equals(expected.asNullable())) {
                throw Fault.input("column \"" + name + "\" has another type than in the first file")
                        .at(file)
                        .found(found.simpleString())
                        .expected(expected.simpleString());
            }
        }
    }
}
