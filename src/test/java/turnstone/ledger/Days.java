package turnstone.ledger;

import java.math.BigDecimal;
import java.math.BigInteger;
import java.time.Instant;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Random;
import java.util.TreeMap;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.Precision;
import turnstone.moments.BlockKernels;
import turnstone.moments.KernelChoice;
import turnstone.moments.Moments;
import turnstone.moments.RowFolder;
import turnstone.store.Store;

/** Small invented days for tests: two instruments, two materials, two tray groups, three channels. */
final class Days {
    static final int CHANNELS = 3;
    static final LocalDate MONDAY = LocalDate.of(2026, 3, 2);
    static final LocalDate TUESDAY = LocalDate.of(2026, 3, 3);
    static final CountScale SCALE = CountScale.uniform(CHANNELS, BigDecimal.ZERO, BigDecimal.ONE, Precision.COARSE);
    static final HeadSpec HEAD = HeadSpec.none(CHANNELS);

    private Days() {}

    static Ledger ledger(Store store) {
        return Ledger.open(store, SCALE, HEAD);
    }

    /** A day whose showings are named {@code PREFIX-0} to {@code PREFIX-7}, one per key, and whose records come from the seed. */
    static DayDraft draft(LocalDate day, String prefix, long seed) {
        return draft(day, prefix, seed, List.of());
    }

    static DayDraft draft(LocalDate day, String prefix, long seed, List<String> without) {
        Random random = new Random(seed);
        Map<LedgerKey, Moments> moments = new TreeMap<>();
        List<ShowingSums> showings = new ArrayList<>();
        long accepted = 0;
        for (int k = 0; k < 8; k++) {
            String sorter = k % 2 == 0 ? "avocet" : "curlew";
            LedgerKey key = new LedgerKey(sorter + "@2026-01-01", k % 4 < 2 ? "PET bottle" : "PP", k / 4);
            Moments folded = moments(random, 5 + random.nextInt(20));
            String showing = prefix + "-" + k;
            if (without.contains(showing)) {
                continue;
            }
            moments.put(key, folded);
            accepted += folded.records();
            showings.add(new ShowingSums(
                    showing,
                    sorter,
                    key.instrument(),
                    "tray " + k,
                    key.trayGroup(),
                    key.material(),
                    folded.records(),
                    1,
                    2,
                    sums(folded)));
        }
        int s = showings.size();
        InputFile input = new InputFile(
                "records/" + day + ".parquet", 1234, Instant.parse("2026-03-02T22:00:00Z"), Optional.empty());
        DayCounts counts = new DayCounts(
                accepted + s + 2L * s + 1, accepted, s, new TreeMap<>(Map.of("saturated", 2L * s, "missing key", 1L)));
        return new DayDraft(day, List.of(input), counts, DayMoments.of(CHANNELS, moments, showings), without);
    }

    static Moments moments(Random random, int records) {
        RowFolder folder = new RowFolder(CHANNELS, new boolean[CHANNELS], BlockKernels.choose(KernelChoice.SCALAR), 16);
        for (int i = 0; i < records; i++) {
            folder.add(new double[] {random.nextInt(2001) - 1000, random.nextInt(50), -random.nextInt(1_000_000)}, 0);
        }
        return folder.snapshot();
    }

    static List<BigInteger> sums(Moments moments) {
        List<BigInteger> sums = new ArrayList<>();
        for (int i = 0; i < CHANNELS; i++) {
            sums.add(moments.sum(i));
        }
        return sums;
    }
}
