package turnstone.decide;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.json.Json;

class ModelTest {
    private static final String GOLDEN = "/turnstone/decide/model-1.0.json";

    private static byte[] golden() throws IOException {
        try (InputStream in = ModelTest.class.getResourceAsStream(GOLDEN)) {
            return in.readAllBytes();
        }
    }

    @Test
    void theGoldenFileOfVersionOneIsReadAndWrittenByteForByte() throws IOException {
        Model model = Model.read(Json.read(golden(), GOLDEN), GOLDEN);
        assertThat(new String(Json.pretty(model.json()), StandardCharsets.UTF_8))
                .isEqualTo(new String(golden(), StandardCharsets.UTF_8));
        assertThat(Json.pretty(ModelFixture.plain().json())).isEqualTo(golden());
        assertThat(model.fingerprint())
                .isEqualTo(ModelFixture.plain().fingerprint())
                .hasSize(64);
    }

    @Test
    void everyKeyThatOtherProgramsRelyOnIsThere() {
        ObjectNode node = ModelFixture.plain().json();
        assertThat(node.has("board")).isFalse();
        assertThat(node.fieldNames())
                .toIterable()
                .contains(
                        "format",
                        "version",
                        "fingerprint",
                        "scope",
                        "madeFrom",
                        "channels",
                        "pretreatment",
                        "countScale",
                        "ridge",
                        "reciprocalCondition",
                        "withinDegreesOfFreedom",
                        "balance",
                        "fisherRatios",
                        "fisherShares",
                        "centre",
                        "axes",
                        "materials",
                        "decision",
                        "orientedTo");
        assertThat(node.path("materials").path(0).fieldNames())
                .toIterable()
                .containsExactly("name", "records", "mean", "position", "decisionPrior");
        assertThat(node.path("decision").fieldNames())
                .toIterable()
                .containsExactlyInAnyOrder("weights", "constants", "unfamiliarBeyond");
    }

    @Test
    void whatWasReadIsWhatWasWritten() {
        Model model = ModelFixture.withResidual();
        Model read = Model.read(Json.read(Json.pretty(model.json()), "memory"), "memory");
        assertThat(Json.canonical(read.json())).isEqualTo(Json.canonical(model.json()));
        assertThat(read.unfamiliarBeyond()).isEmpty();
        assertThat(read.residual().orElseThrow().basis()).isDeepEqualTo(new double[][] {{1, 0, 0}});
        assertThat(read.rank()).isEqualTo(1);
        assertThat(read.orientedTo()).isEmpty();
        assertThat(read.scaleLoss()).hasValue(0.5);
        assertThat(read.madeFrom().records()).isEqualTo(2000);
    }

    @Test
    void anAlteredModelIsRefused() {
        ObjectNode node = ModelFixture.plain().json();
        ((ArrayNode) node.path("axes").path(1))
                .set(0, Json.array(new double[] {1e-300}).get(0));
        assertThatThrownBy(() -> Model.read(node, "model.json"))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("model.json: the model is not what was written")
                .satisfies(e -> assertThat(((Fault) e).kind()).isEqualTo(Fault.Kind.STORAGE));
        ObjectNode lineage = ModelFixture.plain().json();
        ((ObjectNode) lineage.path("madeFrom").path("days").path(0)).put("fingerprint", "zz");
        assertThatThrownBy(() -> Model.read(lineage, "model.json")).hasMessageContaining("altered");
        ObjectNode unknownKey = ModelFixture.plain().json().put("added", 1);
        assertThatThrownBy(() -> Model.read(unknownKey, "model.json")).hasMessageContaining("altered");
        ObjectNode unsealed = ModelFixture.plain().json();
        unsealed.remove("fingerprint");
        assertThatThrownBy(() -> Model.read(unsealed, "model.json")).hasMessageContaining("states none");
    }

    @Test
    void namesOfInputsAndCoarseOrFineAreNoPartOfTheFingerprint() {
        ObjectNode node = ModelFixture.plain().json();
        ((ArrayNode) node.path("madeFrom").path("inputs")).removeAll().add("elsewhere.csv");
        ((ObjectNode) node.path("countScale").path("channels").path(0)).put("precision", "fine");
        Model read = Model.read(node, "model.json");
        assertThat(read.fingerprint()).isEqualTo(ModelFixture.plain().fingerprint());
        assertThat(read.madeFrom().inputs()).containsExactly("elsewhere.csv");
    }

    @Test
    void otherFormatsAndNewerVersionsAreRefused() {
        assertThatThrownBy(() -> Model.read(Json.object().put("format", "verdict"), "x.json"))
                .hasMessageContaining("x.json: not a model file; found format \"verdict\"")
                .satisfies(e -> assertThat(((Fault) e).kind()).isEqualTo(Fault.Kind.INPUT));
        ObjectNode newer = Model.sealed(ModelFixture.content(0.4, 0.4, 0.2).put("version", "1.7"))
                .json();
        assertThat(Model.read(newer, "x.json").rank()).isEqualTo(2);
        JsonNode major = ModelFixture.plain().json().put("version", "2.0");
        assertThatThrownBy(() -> Model.read(major, "x.json"))
                .hasMessageContaining("newer version; found version \"2.0\", expected version 1.x")
                .satisfies(e -> assertThat(((Fault) e).kind()).isEqualTo(Fault.Kind.INPUT));
        assertThatThrownBy(() -> Model.read(ModelFixture.plain().json().put("version", "new"), "x.json"))
                .hasMessageContaining("states no version");
    }

    @Test
    void aModelThatLacksPartsIsRefusedByName() {
        ObjectNode node = ModelFixture.content(0.4, 0.4, 0.2);
        node.remove("centre");
        node.put("fingerprint", Model.fingerprint(node));
        assertThatThrownBy(() -> Model.read(node, "x.json"))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("not complete")
                .hasMessageContaining("centre");
    }

    @Test
    void aPriorOfZeroIsRefused() {
        assertThatThrownBy(() -> ModelFixture.content(0.5, 0.5, 0)).hasMessageContaining("PVC");
    }
}
