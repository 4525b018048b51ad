package turnstone.refit;

import java.util.ArrayList;
import java.util.Collections;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.SortedMap;
import java.util.SortedSet;
import java.util.TreeMap;
import java.util.TreeSet;
import java.util.concurrent.ConcurrentHashMap;
import java.util.function.Function;
import turnstone.fault.Fault;
import turnstone.fisher.Cell;
import turnstone.fisher.ScatterMemo;
import turnstone.ledger.DayEntry;
import turnstone.ledger.Ledger;
import turnstone.ledger.LedgerKey;
import turnstone.ledger.ShowingSums;
import turnstone.moments.Moments;
import turnstone.moments.MomentsAccumulator;
import turnstone.plant.RefitRecipe.Weighting;

/**
 * The sums of a window of ledger days, ready for tray groups and instruments to be left out by exact subtraction.
 *
 * <p>Holds the cells (instrument, material, tray group), and their totals by material, by material and group, and by material and
 * instrument: about (instruments + 1) × (groups + 1) × materials moments of d²/2 numbers of 16 bytes.
 */
public final class WindowSums {
    private record Part<T extends Comparable<T>>(String material, T of) implements Comparable<Part<T>> {
        @Override
        public int compareTo(Part<T> other) {
            int byMaterial = material.compareTo(other.material);
            return byMaterial != 0 ? byMaterial : of.compareTo(other.of);
        }
    }

    /** A cell less tray groups, formed by subtraction. */
    private record Formed(String material, String instrument, Set<Integer> trayGroups) {}

    /** What {@link #sharing} may hold at most, as a part of the memory that there is. */
    private static final int SHARE_OF_MEMORY = 8;

    private final List<DayEntry> days;
    private final int channels;
    private final SortedMap<LedgerKey, Moments> cells;
    private final SortedMap<LedgerKey, Long> showings;
    private final Map<String, Moments> byMaterial;
    private final SortedMap<Part<Integer>, Moments> byGroup;
    private final SortedMap<Part<String>, Moments> byInstrument;
    /** Null where nothing is shared. */
    private final Map<Formed, Moments> formed;

    private final ScatterMemo scatters;

    private WindowSums(
            List<DayEntry> days,
            int channels,
            SortedMap<LedgerKey, Moments> cells,
            SortedMap<LedgerKey, Long> showings) {
        this.days = List.copyOf(days);
        this.channels = channels;
        this.cells = Collections.unmodifiableSortedMap(cells);
        this.showings = Collections.unmodifiableSortedMap(showings);
        this.byMaterial = totals(LedgerKey::material);
        this.byGroup = totals(key -> new Part<>(key.material(), key.trayGroup()));
        this.byInstrument = totals(key -> new Part<>(key.material(), key.instrument()));
        this.formed = null;
        this.scatters = new ScatterMemo(0);
    }

    private WindowSums(WindowSums same, Map<Formed, Moments> formed, ScatterMemo scatters) {
        this.days = same.days;
        this.channels = same.channels;
        this.cells = same.cells;
        this.showings = same.showings;
        this.byMaterial = same.byMaterial;
        this.byGroup = same.byGroup;
        this.byInstrument = same.byInstrument;
        this.formed = formed;
        this.scatters = scatters;
    }

    /**
     * The same sums, which keep what they form for a fit, so that further fits without the same tray groups find it there. For as long as
     * those fits take: it holds a copy of about (instruments × materials) moments and the scatter of each, within an eighth of the memory
     * that there is. For many threads; numbers are the same as without.
     */
    public WindowSums sharing() {
        long most_bytes = Runtime.getRuntime().maxMemory() / SHARE_OF_MEMORY;
        return new WindowSums(this, new ConcurrentHashMap<>(), new ScatterMemo(most_bytes));
    }

    /** Where fits look for scatter that was formed before. */
    ScatterMemo scatters() {
        return scatters;
    }

    /**
     * Reads these days from the ledger and adds them up.
     *
     * @throws Fault of kind input where there is no day, of kind storage where a file is not what was written
     */
    public static WindowSums read(Ledger ledger, List<DayEntry> days) {
        if (days.isEmpty()) {
            throw Fault.input("no posted day in the window").remedy("post a day first, or widen the window");
        }
        SortedMap<LedgerKey, Moments> cells = ledger.window(days);
        SortedMap<LedgerKey, Long> showings = new TreeMap<>();
        for (DayEntry entry : days) {
            for (ShowingSums showing : ledger.showings(entry).values()) {
                if (showing.records() > 0) {
                    showings.merge(showing.key(), 1L, Math::addExact);
                }
            }
        }
        int channels = ledger.countScale().channels();
        return new WindowSums(days, channels, cells, showings);
    }

    private <K extends Comparable<K>> SortedMap<K, Moments> totals(Function<LedgerKey, K> by) {
        SortedMap<K, MomentsAccumulator> sums = new TreeMap<>();
        cells.forEach((key, moments) -> sums.computeIfAbsent(by.apply(key), k -> MomentsAccumulator.empty(channels))
                .merge(moments));
        SortedMap<K, Moments> totals = new TreeMap<>();
        sums.forEach((key, sum) -> totals.put(key, sum.snapshot()));
        return totals;
    }

    /** The days that were added up. */
    public List<DayEntry> days() {
        return days;
    }

    /** Channels of the sums. */
    public int channels() {
        return channels;
    }

    /** Records by instrument, material and tray group. */
    public SortedMap<LedgerKey, Long> records() {
        SortedMap<LedgerKey, Long> records = new TreeMap<>();
        cells.forEach((key, moments) -> records.put(key, moments.records()));
        return records;
    }

    /** Showings with accepted records by instrument, material and tray group. */
    public SortedMap<LedgerKey, Long> showings() {
        return showings;
    }

    /** The instruments that have records, in order of their names. */
    public SortedSet<String> instruments() {
        SortedSet<String> instruments = new TreeSet<>();
        cells.keySet().forEach(key -> instruments.add(key.instrument()));
        return instruments;
    }

    /** Whether there are records of a material. */
    public boolean has(String material) {
        return byMaterial.containsKey(material);
    }

    /** Whether a material has records left when these are taken out. */
    public boolean leaves(String material, HeldOut heldOut) {
        return cells.keySet().stream().anyMatch(key -> key.material().equals(material) && !heldOut.holds(key));
    }

    /** Showings that are left when these are taken out: what analytic shrinkage counts. */
    public long showingsWithout(HeldOut heldOut) {
        return showings.entrySet().stream()
                .filter(entry -> !heldOut.holds(entry.getKey()))
                .mapToLong(Map.Entry::getValue)
                .sum();
    }

    /**
     * The cells of one material that enter a fit. One cell as counted; one cell for each instrument, each with the same total weight,
     * where instruments weigh equally.
     */
    List<Cell> fitCells(String material, HeldOut heldOut, Weighting instruments) {
        if (instruments == Weighting.AS_COUNTED) {
            return List.of(Cell.asCounted(without(material, heldOut)));
        }
        List<Moments> kept = new ArrayList<>();
        for (Map.Entry<Part<String>, Moments> entry : byInstrument.entrySet()) {
            Part<String> part = entry.getKey();
            if (part.material().equals(material) && !heldOut.instruments().contains(part.of())) {
                Moments moments = formed(entry.getValue(), material, part.of(), heldOut);
                if (moments.records() > 0) {
                    kept.add(moments);
                }
            }
        }
        double mean = (double) kept.stream().mapToLong(Moments::records).sum() / kept.size();
        return kept.stream()
                .map(moments -> new Cell(moments, mean / moments.records()))
                .toList();
    }

    private Moments formed(Moments ofInstrument, String material, String instrument, HeldOut heldOut) {
        if (formed == null) {
            return withoutGroups(ofInstrument, material, instrument, heldOut);
        }
        return formed.computeIfAbsent(
                new Formed(material, instrument, heldOut.trayGroups()),
                key -> withoutGroups(ofInstrument, material, instrument, heldOut));
    }

    /** The total less its groups, less its instruments, plus what was taken out twice. */
    private Moments without(String material, HeldOut heldOut) {
        MomentsAccumulator sum = MomentsAccumulator.empty(channels).merge(byMaterial.get(material));
        for (int group : heldOut.trayGroups()) {
            Moments part = byGroup.get(new Part<>(material, group));
            if (part != null) {
                sum.subtract(part);
            }
        }
        for (String instrument : heldOut.instruments()) {
            Moments part = byInstrument.get(new Part<>(material, instrument));
            if (part != null) {
                sum.subtract(withoutGroups(part, material, instrument, heldOut));
            }
        }
        return sum.snapshot();
    }

    private Moments withoutGroups(Moments ofInstrument, String material, String instrument, HeldOut heldOut) {
        if (heldOut.trayGroups().isEmpty()) {
            return ofInstrument;
        }
        MomentsAccumulator sum = MomentsAccumulator.empty(channels).merge(ofInstrument);
        for (int group : heldOut.trayGroups()) {
            Moments cell = cells.get(new LedgerKey(instrument, material, group));
            if (cell != null) {
                sum.subtract(cell);
            }
        }
        return sum.snapshot();
    }

    /** Tray groups by material, to see which can be held out. */
    public Map<String, SortedSet<Integer>> groups() {
        Map<String, SortedSet<Integer>> groups = new HashMap<>();
        cells.keySet()
                .forEach(key -> groups.computeIfAbsent(key.material(), m -> new TreeSet<>())
                        .add(key.trayGroup()));
        return groups;
    }
}
