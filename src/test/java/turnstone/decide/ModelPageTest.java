package turnstone.decide;

import static org.assertj.core.api.Assertions.assertThat;

import com.fasterxml.jackson.databind.JsonNode;
import java.nio.charset.StandardCharsets;
import java.util.List;
import org.junit.jupiter.api.Test;
import turnstone.json.Json;
import turnstone.measure.HeadSpec;
import turnstone.measure.TailSpec;

class ModelPageTest {
    @Test
    void thePageSaysWhatTheModelIsAndFitsTheScreen() {
        Model model = ModelFixture.plain();
        String page = ModelPage.of(model);
        assertThat(page.lines()).allMatch(line -> line.length() <= 80).noneMatch(line -> line.endsWith(" "));
        assertThat(page)
                .startsWith("Model " + model.fingerprint().substring(0, 12) + " (fleet)\n")
                .contains("2 ledger days: 2026-03-01 to 2026-03-02")
                .contains("2 000 records in 8 showings")
                .contains("2 instruments: avocet@2026-01-01, curlew@2026-01-01")
                .contains("head: snv on")
                .contains("tail: values as they come")
                .contains("poor")
                .contains("unfamiliar beyond distance 4.000")
                .contains("75.0 %  ######")
                .contains("a PET bottle         1 000   0.400   PP at 4.000")
                .contains("c PVC                3 000   0.200   PET bottle at 6.325")
                .contains("channel nm1010 hardly varies")
                .contains("lock-out");
    }

    @Test
    void pretreatmentIsSaidInWords() {
        JsonNode head = Json.read("""
                {"input": "raw counts", "channels": 4, "axis_nm": [900.0, 1000.0, 1100.0], "resampled": true,
                 "maxWhiteAge_ms": 28800000, "logarithm": "log10(1/R)", "mask": [{"from_nm": 900.0, "to_nm": 950.0}],
                 "snvSpreadFloor": 0.01, "later": 7}
                """.getBytes(StandardCharsets.UTF_8), "head");
        assertThat(PretreatmentWords.of(head))
                .isEqualTo(
                        "raw counts; 4 channels; resampled to 3 wavelengths, 900.0 to 1100.0 nm; white at most 8.0 h old;"
                                + " log10(1/R); without 900.0 to 950.0 nm; SNV with spread at least 0.01; later 7");
        TailSpec tail = TailSpec.of(new TailSpec.SavitzkyGolay(7, 2, 1), new TailSpec.Bins(2), new TailSpec.Mask(0, 3));
        assertThat(PretreatmentWords.of(tail.json()))
                .isEqualTo("Savitzky–Golay over 7 channels, order 2, derivative 1; bins of 2; without channels 1 to 4");
        assertThat(PretreatmentWords.of(TailSpec.none().json())).isEqualTo("values as they come");
        assertThat(PretreatmentWords.of(HeadSpec.none(3).json())).contains("3 channels");
    }

    @Test
    void theMapPutsMaterialsWhereTheyLie() {
        List<String> map = PositionMap.draw(new double[][] {{-2, 0}, {2, 0}, {0, 6}});
        String top = map.get(0);
        String bottom = map.get(map.size() - 1);
        assertThat(top.strip()).isEqualTo("c");
        assertThat(bottom.strip()).startsWith("a").endsWith("b").contains("+");
        // The third lies half way between the others, over the centre.
        assertThat(top.indexOf('c')).isEqualTo(bottom.indexOf('+'));
        assertThat(2 * top.indexOf('c'))
                .isBetween(
                        bottom.indexOf('a') + bottom.indexOf('b') - 1, bottom.indexOf('a') + bottom.indexOf('b') + 1);
    }

    @Test
    void oneAxisIsOneLineAndMaterialsOnOneSpotStandSideBySide() {
        List<String> map = PositionMap.draw(new double[][] {{-3}, {3}, {3}});
        assertThat(map).hasSize(1);
        assertThat(map.get(0)).contains("a").contains("bc").contains("+");
    }
}
