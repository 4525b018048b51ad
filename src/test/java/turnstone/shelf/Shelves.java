package turnstone.shelf;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.time.Clock;
import java.time.Instant;
import java.time.ZoneId;
import java.time.ZoneOffset;
import org.assertj.core.api.ThrowableAssert.ThrowingCallable;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.store.MemoryStore;
import turnstone.store.Outcome;

/** What the tests of the shelf share: small models, a clock set by hand, a store in which somebody else acts in between. */
final class Shelves {
    static final Instant NIGHT = Instant.parse("2026-03-02T23:00:00Z");

    /** Models for these tests carry a fingerprint over all but it. */
    static final ModelReader READER = (model, place) -> {
        String stated = model.path("fingerprint").asText();
        ObjectNode rest = model.<ObjectNode>deepCopy();
        rest.remove("fingerprint");
        if (!Json.fingerprint(rest).equals(stated)) {
            throw Fault.storage("not what its fingerprint says").at(place);
        }
        return stated;
    };

    static final class Hands extends Clock {
        Instant now = NIGHT;

        @Override
        public Instant instant() {
            return now;
        }

        @Override
        public ZoneId getZone() {
            return ZoneOffset.UTC;
        }

        @Override
        public Clock withZone(ZoneId zone) {
            return this;
        }
    }

    /** Somebody else does something in the instant before a change is published. */
    static final class InterruptedStore extends MemoryStore {
        Runnable before = () -> {};
        int fired;

        @Override
        public Outcome publish(String name, byte[] content) {
            if (name.startsWith("journal/")) {
                Runnable now = before;
                before = () -> {};
                fired++;
                now.run();
            }
            return super.publish(name, content);
        }
    }

    private Shelves() {}

    static void assertRefused(Fault.Kind kind, ThrowingCallable change, String words) {
        assertThatThrownBy(change)
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(kind))
                .hasMessageContaining(words);
    }

    static ObjectNode model(int seed) {
        ObjectNode model = Json.object().put("format", "test").put("seed", seed);
        String fingerprint = Json.fingerprint(model);
        return model.put("fingerprint", fingerprint);
    }
}
