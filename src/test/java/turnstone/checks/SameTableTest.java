package turnstone.checks;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import turnstone.spark.Session;
import turnstone.spark.SharedSession;
import turnstone.table.TableFit;

/** The same records in other files, forms and orders give the same model, to the last bit, and the same decisions. */
@ExtendWith(SharedSession.class)
class SameTableTest {
    private static final long SEED = 20260314;

    @TempDir
    Path folder;

    /** The coarse case and one that needs a fine channel. */
    @ParameterizedTest
    @ValueSource(strings = {"penguins", "wine"})
    void filesFormsAndOrdersGiveOneModel(String set, Session session) throws IOException {
        TextTable table = TextTable.resource(set);
        Map<String, Path> forms = new LinkedHashMap<>();
        forms.put("text", table.toCsv(folder.resolve("plain.csv")));
        forms.put("packed text", table.toGzip(folder.resolve("packed.csv.gz")));
        forms.put("Parquet", table.toParquet(session, folder.resolve("parquet")));
        forms.put("shuffled, seed " + SEED, table.shuffled(SEED).toCsv(folder.resolve("shuffled.csv")));
        forms.put("shuffled Parquet", table.shuffled(SEED + 1).toParquet(session, folder.resolve("shuffled-parquet")));
        Path pattern = folder.resolve("seven");
        table.shuffled(SEED + 2).toFiles(pattern, 7);
        forms.put("seven files by pattern", pattern.resolve("records-*.csv"));

        WholePath path = new WholePath(session, folder);
        TableFit.Result first = path.fitted(forms.get("text"), 0, WholePath.ALL_AXES);
        List<String> decisions = decisions(path.project(first.model(), forms.get("text")));
        assertThat(decisions).hasSize(table.rows().size());
        for (Map.Entry<String, Path> form : forms.entrySet()) {
            TableFit.Result again = path.fitted(form.getValue(), 0, WholePath.ALL_AXES);
            assertThat(again.momentsFingerprint()).as(form.getKey()).isEqualTo(first.momentsFingerprint());
            assertThat(again.model().fingerprint())
                    .as(form.getKey())
                    .isEqualTo(first.model().fingerprint());
            assertThat(decisions(path.project(again.model(), form.getValue())))
                    .as(form.getKey())
                    .isEqualTo(decisions);
        }
    }

    /** One value in the last place is another table. */
    @ParameterizedTest
    @ValueSource(strings = "penguins")
    void aChangedValueGivesAnotherModel(String set, Session session) throws IOException {
        TextTable table = TextTable.resource(set);
        List<List<String>> rows = new ArrayList<>(table.rows());
        List<String> changed = new ArrayList<>(rows.get(0));
        changed.set(4, Integer.toString(Integer.parseInt(changed.get(4)) + 1));
        rows.set(0, changed);
        WholePath path = new WholePath(session, folder);
        TableFit.Result first = path.fitted(table.toCsv(folder.resolve("a.csv")), 0, WholePath.ALL_AXES);
        TableFit.Result other =
                path.fitted(new TextTable(table.header(), rows).toCsv(folder.resolve("b.csv")), 0, WholePath.ALL_AXES);
        assertThat(other.momentsFingerprint()).isNotEqualTo(first.momentsFingerprint());
        assertThat(other.model().fingerprint()).isNotEqualTo(first.model().fingerprint());
    }

    private static List<String> decisions(Path projected) throws IOException {
        return WholePath.positions(projected).stream()
                .map(row -> new TreeMap<>(row).toString())
                .sorted()
                .toList();
    }
}
