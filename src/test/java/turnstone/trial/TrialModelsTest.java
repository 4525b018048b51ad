package turnstone.trial;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.ByteArrayInputStream;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.ObjectInputStream;
import java.io.ObjectOutputStream;
import java.util.Optional;
import org.junit.jupiter.api.Test;
import turnstone.decide.Model;
import turnstone.decide.ModelFixture;

class TrialModelsTest {
    private static final String AVOCET = "avocet@2026-01-01";
    private final Model model = ModelFixture.plain();

    @Test
    void aRecordIsJudgedByThePairMadeWithoutItAndByNoOther() {
        TrialModels models = TrialModels.builder()
                .thisFleet(3, model, Optional.of(model))
                .machineNotSeen(3, AVOCET, model, Optional.of(model))
                .build();
        assertThat(models.find(TrialForm.THIS_FLEET, 3, AVOCET)).isPresent();
        assertThat(models.find(TrialForm.THIS_FLEET, 3, "curlew@2026-01-01")).isPresent();
        assertThat(models.find(TrialForm.THIS_FLEET, 4, AVOCET)).isEmpty();
        assertThat(models.find(TrialForm.MACHINE_NOT_SEEN, 3, AVOCET)).isPresent();
        assertThat(models.find(TrialForm.MACHINE_NOT_SEEN, 3, "curlew@2026-01-01"))
                .isEmpty();
        assertThat(models.find(TrialForm.MACHINE_NOT_SEEN, 4, AVOCET)).isEmpty();
        assertThat(models.compares()).isTrue();
        assertThat(models.size()).isEqualTo(2);
    }

    @Test
    void theTwoSidesAreAlike() {
        TrialModels.Builder builder = TrialModels.builder().thisFleet(1, model, Optional.empty());
        assertThatThrownBy(() -> builder.thisFleet(2, model, Optional.of(model)))
                .hasMessageContaining("has none");
        assertThatThrownBy(() -> builder.thisFleet(1, model, Optional.empty())).hasMessageContaining("twice");
        assertThatThrownBy(() -> TrialModels.builder().thisFleet(1, model, Optional.of(ModelFixture.onAnotherScale())))
                .hasMessageContaining("count scales");
        assertThat(builder.build().compares()).isFalse();
    }

    @Test
    void itTravelsAndCopies() throws IOException, ClassNotFoundException {
        TrialModels models =
                TrialModels.builder().thisFleet(1, model, Optional.empty()).build();
        ByteArrayOutputStream bytes = new ByteArrayOutputStream();
        try (ObjectOutputStream out = new ObjectOutputStream(bytes)) {
            out.writeObject(models);
        }
        try (ObjectInputStream in = new ObjectInputStream(new ByteArrayInputStream(bytes.toByteArray()))) {
            TrialModels read = ((TrialModels) in.readObject()).copy();
            assertThat(read.find(TrialForm.THIS_FLEET, 1, AVOCET).orElseThrow().inService())
                    .isEmpty();
        }
    }
}
