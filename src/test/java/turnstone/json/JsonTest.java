package turnstone.json;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.nio.charset.StandardCharsets;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;

class JsonTest {
    @Test
    void doublesAreShortestRoundTripOnEveryJvm() {
        // 2.0E-3 and 1.0E23 are the classic cases in which Double.toString differed before Java 19 (JDK-4511638).
        assertThat(text(Json.canonical(
                        Json.array(new double[] {2e-3, 1.0E23, 2.2250738585072014E-308, 0.1, 9007199254740993.0}))))
                .isEqualTo("[0.002,1.0E23,2.2250738585072014E-308,0.1,9.007199254740992E15]");
        assertThat(text(Json.canonical(Json.array(new double[] {2.0E-322, 4.35E-322}))))
                .doesNotContain("99");
    }

    @Test
    void canonicalFormDoesNotDependOnTheOrderOfKeys() {
        assertThat(Json.fingerprint(Json.object().put("b", 1).put("a", 2.5)))
                .isEqualTo(Json.fingerprint(Json.object().put("a", 2.5).put("b", 1)));
        assertThat(text(Json.canonical(Json.object().put("b", 1).put("a", 2.5))))
                .isEqualTo("{\"a\":2.5,\"b\":1}");
    }

    @Test
    void brokenJsonIsNamedNotSwallowed() {
        assertThatThrownBy(() -> Json.read("{\"a\":1,\"a\":2}".getBytes(StandardCharsets.UTF_8), "model.json"))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("model.json")
                .hasMessageContaining("not valid JSON");
    }

    private static String text(byte[] utf8) {
        return new String(utf8, StandardCharsets.UTF_8);
    }
}
