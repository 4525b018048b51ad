package turnstone.spark;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.math.BigInteger;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.SortedMap;
import java.util.TreeMap;
import org.apache.spark.TaskContext;
import org.apache.spark.sql.Dataset;
import org.apache.spark.sql.Row;
import org.apache.spark.sql.types.DataTypes;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.extension.ExtendWith;
import org.junit.jupiter.api.io.TempDir;
import turnstone.fault.Fault;
import turnstone.ledger.LedgerKey;
import turnstone.ledger.ShowingSums;
import turnstone.measure.Precision;
import turnstone.moments.KernelChoice;
import turnstone.moments.Moments;

@ExtendWith(SharedSession.class)
class FoldJobTest {
    private static final long SEED = 20260301;

    @TempDir
    Path folder;

    private static SortedMap<LedgerKey, String> fingerprints(FoldResult result) {
        TreeMap<LedgerKey, String> prints = new TreeMap<>();
        result.moments().forEach((key, moments) -> prints.put(key, moments.fingerprint()));
        return prints;
    }

    private static void assertSame(FoldResult found, FoldResult expected) {
        assertThat(fingerprints(found)).isEqualTo(fingerprints(expected));
        assertThat(found.showings()).isEqualTo(expected.showings());
        assertThat(found.counts().accepted()).isEqualTo(expected.counts().accepted());
    }

    private static FoldResult fold(Session session, Dataset<Row> frame, ColumnNames names, FoldSettings settings) {
        return FoldJob.run(
                RecordSource.ofFrame(session, frame, names, -1), InventedDay.intake(Precision.COARSE), settings);
    }

    @Test
    void sumsAreThoseOfTheBigIntegerOracle(Session session) {
        List<InventedDay.Invented> records = InventedDay.records(9, SEED);
        FoldResult result = fold(
                session,
                InventedDay.arrayFrame(session, records, DataTypes.DoubleType),
                InventedDay.asArray(),
                FoldSettings.usual());
        assertThat(result.moments()).hasSize(36);
        for (Map.Entry<LedgerKey, Moments> entry : result.moments().entrySet()) {
            LedgerKey key = entry.getKey();
            List<long[]> counts = records.stream()
                    .filter(r -> key.instrument().startsWith(r.sorter())
                            && key.material().equals(r.material()))
                    .filter(r -> r.tray().endsWith(Integer.toString(key.trayGroup())))
                    .map(r -> java.util.Arrays.stream(r.channels())
                            .mapToLong(x -> Math.round(x * 1000))
                            .toArray())
                    .toList();
            assertThat(entry.getValue().records()).isEqualTo(counts.size());
            for (int i = 0; i < InventedDay.CHANNELS; i++) {
                for (int j = 0; j <= i; j++) {
                    BigInteger product = BigInteger.ZERO;
                    for (long[] q : counts) {
                        product = product.add(BigInteger.valueOf(q[i] * q[j]));
                    }
                    assertThat(entry.getValue().product(i, j)).isEqualTo(product);
                }
            }
        }
        BigInteger ofShowings = result.showings().values().stream()
                .map(showing -> showing.sums().get(3))
                .reduce(BigInteger.ZERO, BigInteger::add);
        BigInteger ofMoments =
                result.moments().values().stream().map(m -> m.sum(3)).reduce(BigInteger.ZERO, BigInteger::add);
        assertThat(ofShowings).isEqualTo(ofMoments);
        assertThat(result.showings().values().stream().mapToLong(ShowingSums::records))
                .containsOnly(9L);
    }

    @Test
    void numbersDoNotDependOnPartitionsOrderKernelOrBound(Session session) {
        List<InventedDay.Invented> records = InventedDay.records(20, SEED);
        Dataset<Row> frame = InventedDay.arrayFrame(session, records, DataTypes.DoubleType);
        FoldResult expected = fold(session, frame.coalesce(1), InventedDay.asArray(), FoldSettings.usual());
        assertThat(expected.counts().accepted()).isEqualTo(720);
        for (int partitions : new int[] {2, 7, 64}) {
            Dataset<Row> shuffled = InventedDay.arrayFrame(
                            session, InventedDay.shuffled(records, SEED + partitions), DataTypes.DoubleType)
                    .repartition(partitions);
            FoldResult found = fold(session, shuffled, InventedDay.asArray(), FoldSettings.usual());
            assertThat(found.partitions()).isEqualTo(partitions);
            assertSame(found, expected);
        }
        for (KernelChoice kernel : KernelChoice.values()) {
            FoldSettings settings = FoldSettings.usual().withKernel(kernel);
            assertSame(fold(session, frame, InventedDay.asArray(), settings), expected);
        }
        FoldResult fine = FoldJob.run(
                RecordSource.ofFrame(session, frame, InventedDay.asArray(), 720),
                InventedDay.intake(Precision.FINE),
                FoldSettings.usual());
        assertSame(fine, expected);
    }

    @Test
    void buffersOfATaskStayUnderTheBound(Session session) {
        List<InventedDay.Invented> records = InventedDay.shuffled(InventedDay.records(40, SEED), SEED);
        Dataset<Row> frame =
                InventedDay.arrayFrame(session, records, DataTypes.DoubleType).coalesce(1);
        FoldResult expected = fold(session, frame, InventedDay.asArray(), FoldSettings.usual());
        FoldSettings tight = new FoldSettings(20_000, 16, KernelChoice.AUTO, 3, 10);
        FoldResult found = fold(session, frame, InventedDay.asArray(), tight);
        assertThat(found.mostTask_bytes()).isPositive().isLessThanOrEqualTo(20_000);
        assertThat(expected.mostTask_bytes()).isGreaterThan(20_000);
        assertThat(found.rowsHanded()).isGreaterThan(36);
        assertThat(expected.sumsHanded()).isEqualTo(36);
        assertSame(found, expected);
        assertThatThrownBy(() -> fold(session, frame, InventedDay.asArray(), tight.withTaskBytes(1000)))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("too small for one key");
    }

    @Test
    void aFailedFirstAttemptChangesNothing(Session session) {
        List<InventedDay.Invented> records = InventedDay.records(10, SEED);
        Dataset<Row> frame =
                InventedDay.arrayFrame(session, records, DataTypes.DoubleType).repartition(4);
        FoldResult expected = fold(session, frame, InventedDay.asArray(), FoldSettings.usual());
        RecordSource sound = RecordSource.ofFrame(session, frame, InventedDay.asArray(), 360);
        var failures = session.spark().sparkContext().longAccumulator();
        RecordSource failing = sound.fedBy(new Feed() {
            @Override
            public <R> org.apache.spark.api.java.JavaRDD<R> over(PartitionTask<R> task) {
                return sound.over(cursor -> {
                    if (TaskContext.get().attemptNumber() == 0 && TaskContext.getPartitionId() % 2 == 1) {
                        while (cursor.next()) {
                            failures.add(1);
                        }
                        throw new IllegalStateException("the first attempt fails on purpose");
                    }
                    return task.run(cursor);
                });
            }

            @Override
            public turnstone.measure.SourceType sourceType() {
                return sound.sourceType();
            }

            @Override
            public ReadPath path() {
                return sound.readPath();
            }
        });
        FoldResult found = FoldJob.run(failing, InventedDay.intake(Precision.COARSE), FoldSettings.usual());
        assertSame(found, expected);
        assertThat(found.counts().read()).isEqualTo(360);
    }

    @Test
    void whatIsNoMeasurementIsQuarantinedWithItsReason(Session session) {
        List<InventedDay.Invented> records = new ArrayList<>(InventedDay.records(5, SEED));
        InventedDay.Invented sound = records.get(0);
        double[] missing = sound.channels().clone();
        missing[4] = Double.NaN;
        double[] tooLarge = sound.channels().clone();
        tooLarge[7] = 1e7;
        String day = sound.day();
        String showing = sound.showing();
        records.add(new InventedDay.Invented(day, "ibis", showing, sound.tray(), sound.material(), sound.channels()));
        records.add(new InventedDay.Invented(day, "avocet", showing, sound.tray(), "mud", sound.channels()));
        records.add(new InventedDay.Invented(day, "avocet", null, sound.tray(), "PP", sound.channels()));
        records.add(new InventedDay.Invented("2026-03-02", "avocet", "other", "t0", "PP", sound.channels()));
        records.add(new InventedDay.Invented(day, "avocet", showing, sound.tray(), sound.material(), missing));
        records.add(new InventedDay.Invented(day, "avocet", showing, sound.tray(), sound.material(), tooLarge));
        records.add(new InventedDay.Invented(day, "avocet", showing, sound.tray(), sound.material(), new double[3]));
        FoldResult result = fold(
                session,
                InventedDay.arrayFrame(session, records, DataTypes.DoubleType),
                InventedDay.asArray(),
                FoldSettings.usual());
        assertThat(result.counts().quarantined())
                .containsEntry("unknown sorter", 1L)
                .containsEntry("unknown material", 1L)
                .containsEntry("missing key", 1L)
                .containsEntry("wrong day", 1L)
                .containsEntry("non finite", 1L)
                .containsEntry("off scale", 1L)
                .containsEntry("wrong channel count", 1L)
                .hasSize(7);
        assertThat(result.counts().read())
                .isEqualTo(result.counts().accepted()
                        + result.counts().noSignal()
                        + result.counts().quarantinedTotal());
        assertThat(result.counts().quarantine())
                .filteredOn(record -> record.reason().equals("off scale"))
                .singleElement()
                .satisfies(record -> assertThat(record.channel()).isEqualTo(8));
        assertThat(result.showings().get(showing).quarantined()).isEqualTo(3);
        assertThat(result.showings()).doesNotContainKey("other");
    }

    @Test
    void aShowingOfTwoTraysIsRefusedByName(Session session) {
        List<InventedDay.Invented> records = new ArrayList<>(InventedDay.records(5, SEED));
        InventedDay.Invented sound = records.get(0);
        records.add(new InventedDay.Invented(
                sound.day(), sound.sorter(), sound.showing(), "another 0", sound.material(), sound.channels()));
        Dataset<Row> frame = InventedDay.arrayFrame(session, records, DataTypes.DoubleType);
        assertThatThrownBy(() -> fold(session, frame, InventedDay.asArray(), FoldSettings.usual()))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("showing avocet/PET bottle tray 0")
                .hasMessageContaining("tray PET bottle tray 0 and another 0");
    }

    @Test
    void aShowingLeftOutIsCountedApart(Session session) {
        List<InventedDay.Invented> records = InventedDay.records(5, SEED);
        IntakeSpec spec = InventedDay.intake(Precision.COARSE)
                .without(java.util.Set.of(records.get(0).showing()));
        FoldResult result = FoldJob.run(
                RecordSource.ofFrame(
                        session,
                        InventedDay.arrayFrame(session, records, DataTypes.DoubleType),
                        InventedDay.asArray(),
                        180),
                spec,
                FoldSettings.usual());
        assertThat(result.counts().leftOut()).isEqualTo(5);
        assertThat(result.counts().accepted()).isEqualTo(175);
        assertThat(result.showings())
                .hasSize(35)
                .doesNotContainKey(records.get(0).showing());
    }

    @Test
    void aDifferenceToTheIndependentCountIsRefused(Session session) {
        Dataset<Row> frame = InventedDay.arrayFrame(session, InventedDay.records(2, SEED), DataTypes.DoubleType);
        RecordSource source = RecordSource.ofFrame(session, frame, InventedDay.asArray(), 73);
        assertThatThrownBy(() -> FoldJob.run(source, InventedDay.intake(Precision.COARSE), FoldSettings.usual()))
                .isInstanceOf(Fault.class)
                .hasMessageContaining("found 72, expected 73");
    }
}
