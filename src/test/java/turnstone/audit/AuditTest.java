package turnstone.audit;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import java.nio.charset.StandardCharsets;
import java.time.Clock;
import java.time.Instant;
import java.time.LocalDate;
import java.time.ZoneOffset;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalLong;
import java.util.TreeMap;
import java.util.TreeSet;
import org.assertj.core.api.ThrowableAssert.ThrowingCallable;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.store.MemoryStore;
import turnstone.store.Outcome;

class AuditTest {
    private static final String DUTY = "PET bottles to bale";
    private static final LocalDate DATE = LocalDate.of(2026, 3, 14);
    private static final Clock CLOCK = Clock.fixed(Instant.parse("2026-03-15T06:00:00Z"), ZoneOffset.UTC);

    private final MemoryStore store = new MemoryStore();
    private final AuditJournal journal = AuditJournal.in(store, CLOCK);

    private static Found found(Map<String, Double> mass_kg, Optional<Valves> valves, OptionalLong insteadOf) {
        return found(DATE, Found.Stream.PRODUCT, mass_kg, valves, insteadOf);
    }

    private static Found found(
            LocalDate date,
            Found.Stream stream,
            Map<String, Double> mass_kg,
            Optional<Valves> valves,
            OptionalLong insteadOf) {
        return new Found(
                date,
                DUTY,
                Found.Method.BALE,
                stream,
                new TreeMap<>(mass_kg),
                valves,
                new TreeSet<>(List.of("a".repeat(64))),
                insteadOf,
                "");
    }

    private static Found bale(double pet_kg, double pvc_kg) {
        return found(Map.of("PET bottle", pet_kg, "PVC", pvc_kg), Optional.empty(), OptionalLong.empty());
    }

    private static void assertRefused(Fault.Kind kind, ThrowingCallable what, String words) {
        assertThatThrownBy(what)
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(kind))
                .hasMessageContaining(words);
    }

    @Test
    void whatIsEnteredIsReadAgain() {
        Found whole = found(
                Map.of("PET bottle", 812.5, "PVC", 3.1),
                Optional.of(new Valves(120, 113.4, 400, 6.2)),
                OptionalLong.empty());
        Audit entered = journal.add(whole, "engineer");
        assertThat(entered).isEqualTo(new Audit(1, CLOCK.instant(), "engineer", whole));
        assertThat(AuditJournal.in(store, CLOCK).all()).containsExactly(entered);
        assertThat(journal.verify()).isEmpty();
        store.files()
                .replaceAll((name, bytes) -> new String(bytes, StandardCharsets.UTF_8)
                        .replace("812.5", "912.5")
                        .getBytes(StandardCharsets.UTF_8));
        assertRefused(Fault.Kind.STORAGE, journal::all, "altered");
        assertThat(journal.verify()).hasSize(1);
    }

    @Test
    void aResultCountsOnceAndCanBeCorrected() {
        journal.add(bale(90, 10), "x");
        assertRefused(Fault.Kind.INPUT, () -> journal.add(bale(90, 10), "y"), "entry 1 by x");
        Found better = found(Map.of("PET bottle", 95.0, "PVC", 5.0), Optional.empty(), OptionalLong.of(1));
        Audit corrected = journal.add(better, "y");
        assertThat(journal.standing()).containsExactly(corrected);
        assertThat(journal.all()).hasSize(2);
        assertRefused(
                Fault.Kind.INPUT,
                () -> journal.add(found(Map.of("PVC", 1.0), Optional.empty(), OptionalLong.of(1)), "z"),
                "no such entry to correct");
        assertRefused(
                Fault.Kind.INPUT,
                () -> journal.add(found(Map.of("PVC", 1.0), Optional.empty(), OptionalLong.of(7)), "z"),
                "no such entry to correct");
    }

    @Test
    void ofTwoEnteredAtOnceOneIsBusy() {
        MemoryStore raced = new MemoryStore() {
            private boolean first = true;

            @Override
            public Outcome publish(String name, byte[] content) {
                if (first) {
                    first = false;
                    AuditJournal.in(this, CLOCK).add(bale(1, 1), "winner");
                }
                return super.publish(name, content);
            }
        };
        AuditJournal ours = AuditJournal.in(raced, CLOCK);
        assertRefused(Fault.Kind.BUSY, () -> ours.add(bale(2, 2), "loser"), "same time");
        assertThat(ours.all())
                .singleElement()
                .satisfies(audit -> assertThat(audit.by()).isEqualTo("winner"));
    }

    @Test
    void massesThatCannotBeAreRefused() {
        assertRefused(Fault.Kind.USAGE, () -> bale(-1, 2), "PET bottle");
        assertRefused(Fault.Kind.USAGE, () -> bale(Double.NaN, 2), "not a mass");
        assertRefused(Fault.Kind.USAGE, () -> bale(0, 0), "0 kg");
        assertRefused(
                Fault.Kind.USAGE,
                () -> found(Map.of(), Optional.empty(), OptionalLong.empty()),
                "needs masses by material");
        assertRefused(Fault.Kind.USAGE, () -> new Valves(10, 11, 1, 0), "ejected=11");
        assertRefused(Fault.Kind.USAGE, () -> new Valves(0, 0, 1, 0), "decided above 0");
        assertRefused(Fault.Kind.USAGE, () -> new Valves(1, 1, 1, Double.NaN), "carried");
    }

    /**
     * By hand, of 100 kg with 60 kg target, purity 0.9 and recovery 0.9: decided to be sent 54 target and 6 other, the rest 6 and 34. Ejected
     * with efficiency 0.95 and co-ejection 0.02: target 54·0.95 + 6·0.02 = 51.42, other 6·0.95 + 34·0.02 = 6.38. Passed: target
     * 54·0.98 + 6·0.05 = 53.22, other 6·0.98 + 34·0.05 = 7.58.
     */
    @Test
    void aBaleFollowsFromTheDecisionsAndTheValves() {
        Valves valves = new Valves(100, 95, 50, 1);
        assertThat(new Predicted(0.9, 0.9, 0.6, Predicted.Product.EJECTED).balePurity(valves))
                .isCloseTo(51.42 / (51.42 + 6.38), within(1e-12));
        assertThat(new Predicted(0.9, 0.9, 0.6, Predicted.Product.PASSED).balePurity(valves))
                .isCloseTo(53.22 / (53.22 + 7.58), within(1e-12));
        Valves perfect = new Valves(1, 1, 1, 0);
        assertThat(new Predicted(0.9, 0.8, 0.6, Predicted.Product.EJECTED).balePurity(perfect))
                .isCloseTo(0.9, within(1e-12));
        assertThat(new Predicted(0.9, 0.8, 0.6, Predicted.Product.PASSED).balePurity(perfect))
                .isCloseTo(0.9, within(1e-12));
    }

    @Test
    void aBaleFigureIsGivenOnlyOnceTheValvesAreMeasured() {
        Map<String, Predicted> predicted = new LinkedHashMap<>();
        predicted.put("candidate", new Predicted(0.9, 0.9, 0.6, Predicted.Product.EJECTED));
        journal.add(bale(90, 10), "x");
        journal.add(
                found(
                        DATE.plusDays(1),
                        Found.Stream.PRODUCT,
                        Map.of("PET bottle", 300.0),
                        Optional.empty(),
                        OptionalLong.empty()),
                "x");
        journal.add(
                found(
                        DATE,
                        Found.Stream.REST,
                        Map.of("PET bottle", 10.0, "PP", 90.0),
                        Optional.empty(),
                        OptionalLong.empty()),
                "x");
        List<String> without = AuditReport.of(DUTY, List.of("PET bottle"), predicted, journal.standing());
        // 390 of 400 kg; both streams on the first date only: 90 of 100 kg.
        assertThat(without)
                .anySatisfy(line -> assertThat(line).contains("purity 97.50 % over 2 audits, 400.0 kg"))
                .anySatisfy(line -> assertThat(line).contains("recovery 90.00 % on 1 date"))
                .anySatisfy(line -> assertThat(line).contains("is not given").contains("have not been measured"))
                .noneSatisfy(line -> assertThat(line).contains("bale purity to expect"));
        journal.add(found(Map.of(), Optional.of(new Valves(60, 57, 20, 0.4)), OptionalLong.empty()), "x");
        journal.add(found(Map.of(), Optional.of(new Valves(40, 38, 30, 0.6)), OptionalLong.empty()), "x");
        List<String> with = AuditReport.of(DUTY, List.of("PET bottle"), predicted, journal.standing());
        assertThat(with)
                .anySatisfy(line -> assertThat(line)
                        .contains("bale purity to expect of candidate: 88.96 %")
                        .contains("ejection efficiency 95.00 % of 100.0 kg")
                        .contains("co-ejection 2.00 % of 50.0 kg"))
                .noneSatisfy(line -> assertThat(line).contains("not given"));
        assertThat(AuditReport.of(DUTY, List.of("PET bottle"), Map.of(), journal.standing()))
                .anySatisfy(line -> assertThat(line).contains("not given: the trial gave no figures"));
        assertThat(AuditReport.of("another duty", List.of("PVC"), predicted, journal.standing()))
                .anySatisfy(line -> assertThat(line).contains("no product of this duty was audited"))
                .anySatisfy(line -> assertThat(line).contains("have not been measured"));
    }
}
