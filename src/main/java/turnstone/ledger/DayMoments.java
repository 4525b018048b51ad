package turnstone.ledger;

import java.math.BigInteger;
import java.util.Arrays;
import java.util.Collections;
import java.util.Map;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.moments.Moments;

/**
 * A day's sums: moments by key, and the showings that they came from. Immutable.
 *
 * <p>The two must agree: under each key the records and sums of its showings add up to the records and sums of its moments, exactly.
 */
public final class DayMoments {
    private final int channels;
    private final SortedMap<LedgerKey, Moments> moments;
    private final SortedMap<String, ShowingSums> showings;

    private DayMoments(int channels, SortedMap<LedgerKey, Moments> moments, SortedMap<String, ShowingSums> showings) {
        this.channels = channels;
        this.moments = moments;
        this.showings = showings;
    }

    /**
     * A day's sums, checked.
     *
     * @param channels number of channels of every moment and showing
     * @param moments by key; those of no records are left out
     * @param showings in any order
     * @throws IllegalArgumentException where the channels differ, a showing comes twice, or moments and showings don't agree
     */
    public static DayMoments of(int channels, Map<LedgerKey, Moments> moments, Iterable<ShowingSums> showings) {
        SortedMap<LedgerKey, Moments> kept = new TreeMap<>();
        moments.forEach((key, value) -> {
            if (value.channels() != channels) {
                throw new IllegalArgumentException(key + " has " + value.channels() + " channels, not " + channels);
            }
            if (value.records() > 0) {
                kept.put(key, value);
            }
        });
        SortedMap<String, ShowingSums> byId = new TreeMap<>();
        for (ShowingSums showing : showings) {
            if (showing.sums().size() != channels) {
                throw new IllegalArgumentException("showing " + showing.showing() + " has "
                        + showing.sums().size() + " channels, not " + channels);
            }
            if (byId.put(showing.showing(), showing) != null) {
                throw new IllegalArgumentException("showing " + showing.showing() + " comes twice");
            }
        }
        checkAgreement(channels, kept, byId);
        return new DayMoments(
                channels, Collections.unmodifiableSortedMap(kept), Collections.unmodifiableSortedMap(byId));
    }

    /** Number of channels. */
    public int channels() {
        return channels;
    }

    /** Moments by key, none of them without records; can't be changed. */
    public SortedMap<LedgerKey, Moments> moments() {
        return moments;
    }

    /** Showings by id; can't be changed. */
    public SortedMap<String, ShowingSums> showings() {
        return showings;
    }

    /** Accepted records over all keys. */
    public long records() {
        return moments.values().stream().mapToLong(Moments::records).sum();
    }

    private static void checkAgreement(
            int channels, SortedMap<LedgerKey, Moments> moments, SortedMap<String, ShowingSums> showings) {
        Map<LedgerKey, BigInteger[]> totals = new TreeMap<>();
        for (ShowingSums showing : showings.values()) {
            if (showing.records() > 0) {
                BigInteger[] total = totals.computeIfAbsent(showing.key(), key -> zeros(channels + 1));
                for (int i = 0; i < channels; i++) {
                    total[i] = total[i].add(showing.sums().get(i));
                }
                total[channels] = total[channels].add(BigInteger.valueOf(showing.records()));
            }
        }
        if (!totals.keySet().equals(moments.keySet())) {
            throw new IllegalArgumentException(
                    "moments are of keys " + moments.keySet() + ", showings of keys " + totals.keySet());
        }
        moments.forEach((key, value) -> {
            BigInteger[] total = totals.get(key);
            boolean agree = total[channels].equals(BigInteger.valueOf(value.records()));
            for (int i = 0; agree && i < channels; i++) {
                agree = total[i].equals(value.sum(i));
            }
            if (!agree) {
                throw new IllegalArgumentException("showings of " + key + " don't add up to its moments");
            }
        });
    }

    private static BigInteger[] zeros(int length) {
        BigInteger[] zeros = new BigInteger[length];
        Arrays.fill(zeros, BigInteger.ZERO);
        return zeros;
    }
}
