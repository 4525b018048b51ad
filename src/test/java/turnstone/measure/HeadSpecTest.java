package turnstone.measure;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.nio.charset.StandardCharsets;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.json.Json;

class HeadSpecTest {
    @Test
    void jsonComesBackThroughItsText() {
        HeadSpec full = HeadTest.everything();
        HeadSpec masked = HeadSpec.builder(5).dropChannels(1, 2).build();
        for (HeadSpec spec : new HeadSpec[] {full, masked, HeadSpec.none(3)}) {
            HeadSpec read = HeadSpec.fromJson(Json.read(Json.pretty(spec.json()), "test"));
            assertThat(read).isEqualTo(spec);
            assertThat(read.fingerprint()).isEqualTo(spec.fingerprint());
            assertThat(read.kept()).containsExactly(spec.kept());
        }
        assertThat(new String(Json.canonical(masked.json()), StandardCharsets.UTF_8))
                .isEqualTo("{\"channels\":5,\"input\":\"values\",\"mask\":[{\"fromChannel\":2,\"toChannel\":3}]}");
    }

    @Test
    void inputFollowsFromTheSteps() {
        assertThat(HeadSpec.none(3).input()).isEqualTo(InputKind.VALUES);
        assertThat(HeadSpec.builder(3).snv(1).build().input()).isEqualTo(InputKind.VALUES);
        assertThat(HeadSpec.builder(3).floor(0.1).absorbance().build().input()).isEqualTo(InputKind.REFLECTANCE);
        assertThat(HeadSpec.builder(3).correct(9).floor(0.1).build().input()).isEqualTo(InputKind.COUNTS);
        assertThat(HeadSpec.none(3).computes()).isFalse();
        assertThat(HeadSpec.builder(3).snv(1).build().computes()).isTrue();
        assertThat(HeadSpec.builder(3).snv(1).build().mayFindNoSignal()).isTrue();
    }

    @Test
    void differencesNameTheFields() {
        HeadSpec here = HeadSpec.builder(3).floor(0.001).build();
        HeadSpec there = HeadSpec.builder(3).floor(0.002).noSignalBelow(0.5).build();
        assertThat(here.differences(there))
                .containsExactly("floor: 0.001 here, 0.002 there", "noSignalBelow: absent here, 0.5 there");
        assertThat(here.differences(here)).isEmpty();
    }

    @Test
    void refusesUnknownAndMalformedKeys() {
        ObjectNode unknown = (ObjectNode) HeadSpec.none(3).json();
        unknown.put("flor", 0.1);
        storage(unknown, "flor");
        ObjectNode text = (ObjectNode) HeadSpec.builder(3).floor(0.1).build().json();
        text.put("floor", "low");
        storage(text, "floor");
        ObjectNode incomplete = (ObjectNode) HeadSpec.none(3).json();
        incomplete.remove("channels");
        storage(incomplete, "channels");
        storage(((ObjectNode) HeadSpec.none(3).json()).put("channels", 2.5), "channels");
        storage(((ObjectNode) HeadSpec.none(3).json()).put("input", "guess"), "guess");
    }

    private static void storage(ObjectNode node, String named) {
        assertThatThrownBy(() -> HeadSpec.fromJson(node))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.STORAGE))
                .hasMessageContaining(named);
    }
}
