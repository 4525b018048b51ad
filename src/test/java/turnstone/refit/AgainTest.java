package turnstone.refit;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.nio.file.Path;
import java.time.LocalDate;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.Set;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import turnstone.decide.MadeFrom;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.ledger.Ledger;
import turnstone.ledger.LedgerFixture;
import turnstone.ledger.Replace;
import turnstone.measure.TailSpec;
import turnstone.plant.RefitRecipe.Balance;
import turnstone.plant.RefitRecipe.Prior;
import turnstone.plant.RefitRecipe.Weighting;
import turnstone.store.LocalStore;

class AgainTest {
    private static final List<String> MATERIALS = List.of("PET bottle", "PP");
    private static final LocalDate MONDAY = LocalDate.of(2026, 3, 2);

    @TempDir
    Path folder;

    private Ledger ledger;

    @BeforeEach
    void postTwoDays() {
        ledger = LedgerFixture.ledger(new LocalStore(folder));
        ledger.post(LedgerFixture.draft(MONDAY, "mon", 1), Replace.NO);
        ledger.post(LedgerFixture.draft(MONDAY.plusDays(1), "tue", 2), Replace.NO);
    }

    private static Recipe recipe(OptionalDouble ridge) {
        return new Recipe(
                28, new Balance(Weighting.EQUAL, Weighting.EQUAL), ridge, TailSpec.none(), 0, new Prior.Equal(), 0.01);
    }

    private Model made(OptionalDouble ridge, HeldOut heldOut, Optional<Model> guide) {
        WindowSums sums = WindowSums.read(ledger, Window.upTo(ledger, MONDAY.plusDays(1), 28));
        return new ModelMaker(MATERIALS, ledger.head(), ledger.countScale())
                .make(recipe(ridge), sums, heldOut, guide)
                .model();
    }

    @Test
    void theSameNumbersComeOutAgainHoweverTheModelWasMade() {
        Model plain = made(OptionalDouble.of(1e-3), HeldOut.NOTHING, Optional.empty());
        Model analytic = made(OptionalDouble.empty(), HeldOut.group(1), Optional.of(plain));
        Model without = made(
                OptionalDouble.of(1e-2), new HeldOut(Set.of(), Set.of("curlew@2026-01-01")), Optional.of(analytic));
        // Days that come later change nothing.
        ledger.post(LedgerFixture.draft(MONDAY.plusDays(2), "wed", 3), Replace.NO);
        assertThat(Again.make(MATERIALS, ledger, plain, Optional.empty()).fingerprint())
                .isEqualTo(plain.fingerprint());
        assertThat(Again.make(MATERIALS, ledger, analytic, Optional.of(plain)).fingerprint())
                .isEqualTo(analytic.fingerprint());
        Model again = Again.make(MATERIALS, ledger, without, Optional.of(analytic));
        assertThat(again.fingerprint()).isEqualTo(without.fingerprint());
        assertThat(ModelDifferences.of(without, again)).isEmpty();
        assertThat(plain.fingerprint()).isNotEqualTo(without.fingerprint());
    }

    @Test
    void aDayThatWasPostedAgainIsTakenAsItWas() {
        Model model = made(OptionalDouble.of(1e-3), HeldOut.NOTHING, Optional.empty());
        ledger.post(LedgerFixture.draft(MONDAY, "mon", 9), Replace.YES);
        assertThat(Again.make(MATERIALS, ledger, model, Optional.empty()).fingerprint())
                .isEqualTo(model.fingerprint());
        Ledger other = LedgerFixture.ledger(new LocalStore(folder.resolve("other")));
        other.post(LedgerFixture.draft(MONDAY, "mon", 9), Replace.NO);
        assertThatThrownBy(() -> Again.make(MATERIALS, other, model, Optional.empty()))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.INPUT))
                .hasMessageContaining("does not hold a day");
    }

    @Test
    void whatDiffersIsSaidFieldByField() {
        Model one = made(OptionalDouble.of(1e-3), HeldOut.NOTHING, Optional.empty());
        Model other = made(OptionalDouble.of(2e-3), HeldOut.NOTHING, Optional.empty());
        List<ModelDifferences.Field> fields = ModelDifferences.of(one, other);
        assertThat(fields)
                .extracting(ModelDifferences.Field::name)
                .contains("axes", "ridge", "recipe", "fisherRatios")
                .doesNotContain("materials/0/name", "countScale", "madeFrom", "fingerprint");
        assertThat(fields)
                .filteredOn(field -> field.name().equals("ridge"))
                .singleElement()
                .isEqualTo(new ModelDifferences.Field("ridge", 1, 1, "/ridge", "0.001", "0.002"));
        assertThat(fields)
                .filteredOn(field -> field.name().equals("axes"))
                .singleElement()
                .satisfies(field -> {
                    assertThat(field.values()).isEqualTo(3);
                    assertThat(field.differing()).isBetween(1, 3);
                    assertThat(field.first()).startsWith("/axes/0/");
                });
    }

    @Test
    void theLineageCountsWhatWasKeptWholeBecauseNothingElseWasLeft() {
        Ledger oneGroup = LedgerFixture.ledger(new LocalStore(folder.resolve("one-group")));
        oneGroup.post(LedgerFixture.draft(MONDAY, "mon", 1), Replace.NO);
        WindowSums sums = WindowSums.read(oneGroup, oneGroup.days());
        HeldOut all = new HeldOut(Set.of(0, 1), Set.of());
        ModelMaker.Made made = new ModelMaker(MATERIALS, oneGroup.head(), oneGroup.countScale())
                .make(recipe(OptionalDouble.of(1e-3)), sums, all);
        assertThat(made.keptWhole()).containsExactlyElementsOf(MATERIALS);
        long records =
                sums.records().values().stream().mapToLong(Long::longValue).sum();
        assertThat(made.model().madeFrom().parts().stream()
                        .mapToLong(MadeFrom.Part::records)
                        .sum())
                .isEqualTo(records);
    }
}
