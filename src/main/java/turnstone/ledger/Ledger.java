package turnstone.ledger;

import java.time.LocalDate;
import java.util.Collection;
import java.util.HashSet;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import java.util.SortedMap;
import java.util.TreeMap;
import turnstone.fault.Fault;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.moments.Moments;
import turnstone.moments.MomentsAccumulator;
import turnstone.store.Content;
import turnstone.store.Journal;
import turnstone.store.JournalEntry;
import turnstone.store.Outcome;
import turnstone.store.Problem;
import turnstone.store.Store;

/**
 * Days of exact moments, posted once.
 *
 * <p>In its store: {@code ledger.json} (count scale and head, see {@link Terms}), {@code journal/00000001.json} … (one entry per posted
 * revision of a day, numbered over all days), and under {@code days/DAY/RUN/} the parts that an entry names, written before it. What no
 * entry names was left by a run that didn't finish: it is never read. One count scale and one head for good; nothing is written until
 * the first day is posted.
 */
public final class Ledger {
    static final String JOURNAL = "journal";

    private final Store store;
    private final Terms terms;

    private Ledger(Store store, Terms terms) {
        this.store = store;
        this.terms = terms;
    }

    /**
     * The ledger in a store, there or to come.
     *
     * @throws Fault of kind input, naming the fields that differ, where it is kept with another count scale or head
     */
    public static Ledger open(Store store, CountScale scale, HeadSpec head) {
        Terms wanted = new Terms(scale, head);
        Optional<Terms> there = terms(store);
        there.ifPresent(terms -> terms.require(wanted, store.place(Terms.FILE)));
        return new Ledger(store, wanted);
    }

    /** The ledger in a store in its own terms, or empty where none was ever posted to. */
    public static Optional<Ledger> existing(Store store) {
        return terms(store).map(terms -> new Ledger(store, terms));
    }

    /** The count scale that it is kept in. */
    public CountScale countScale() {
        return terms.scale();
    }

    /** The pretreatment head that it is kept with. */
    public HeadSpec head() {
        return terms.head();
    }

    /** Where it is, for messages. */
    public String describe() {
        return store.describe();
    }

    /** The newest revision of each posted day, in order of days. */
    public List<DayEntry> days() {
        return newest(entries());
    }

    /** The newest revision of a day, or empty where the day was never posted. */
    public Optional<DayEntry> day(LocalDate day) {
        return days().stream().filter(entry -> entry.day().equals(day)).findFirst();
    }

    /** Every revision of a day, in order. */
    public List<DayEntry> revisions(LocalDate day) {
        return entries().stream().filter(entry -> entry.day().equals(day)).toList();
    }

    /**
     * Posts a day: its parts first, then the entry that commits them.
     *
     * @return {@link PostOutcome#SAME_RECORDS} where the day's newest revision has the same canonical content: nothing is written then
     * @throws Fault of kind input where the day holds other records and isn't to be replaced, or a showing is posted on another day; of
     *     kind busy where somebody else posted the day meanwhile; of kind storage where nothing could be posted
     */
    public PostOutcome post(DayDraft draft, Replace replace) {
        if (draft.moments().channels() != terms.scale().channels()) {
            throw new IllegalArgumentException("a day of " + draft.moments().channels() + " channels, a ledger of "
                    + terms.scale().channels());
        }
        if (store.publish(Terms.FILE, terms.bytes()) == Outcome.LOST) {
            description();
        }
        return new Posting(store, Journal.in(store, JOURNAL), draft, terms).post(replace);
    }

    /**
     * A day's sums.
     *
     * @throws Fault of kind storage, naming the file, where a part is not what was written
     */
    public DayMoments load(DayEntry entry) {
        TreeMap<LedgerKey, Moments> moments = new TreeMap<>();
        Content.read(store, entry.momentsPart(), in -> MomentsPart.read(in, moments::put));
        return DayMoments.of(terms.scale().channels(), moments, showings(entry).values());
    }

    /** A day's showings by id; checked as {@link #load} does. */
    public SortedMap<String, ShowingSums> showings(DayEntry entry) {
        SortedMap<String, ShowingSums> showings = new TreeMap<>();
        for (ShowingSums showing : Content.read(store, entry.showingsPart(), ShowingsPart::read)) {
            showings.put(showing.showing(), showing);
        }
        return showings;
    }

    /**
     * The sum over several days, by key. Read key by key: memory holds the totals and one key more, never a day.
     *
     * @param days entries of different days
     * @throws Fault of kind storage, naming the file, where a part is not what was written
     */
    public SortedMap<LedgerKey, Moments> window(Collection<DayEntry> days) {
        Set<LocalDate> seen = new HashSet<>();
        TreeMap<LedgerKey, MomentsAccumulator> totals = new TreeMap<>();
        for (DayEntry entry : days) {
            if (!seen.add(entry.day())) {
                throw new IllegalArgumentException("two entries of " + entry.day() + " in one window");
            }
            Content.read(
                    store,
                    entry.momentsPart(),
                    in -> MomentsPart.read(
                            in,
                            (key, moments) -> totals.computeIfAbsent(
                                            key,
                                            k -> MomentsAccumulator.empty(
                                                    terms.scale().channels()))
                                    .merge(moments)));
        }
        SortedMap<LedgerKey, Moments> sums = new TreeMap<>();
        while (!totals.isEmpty()) {
            // One at a time, so that accumulators and snapshots aren't all held twice.
            var first = totals.pollFirstEntry();
            sums.put(first.getKey(), first.getValue().snapshot());
        }
        return sums;
    }

    /**
     * Reads everything again: the description, every entry, every part of every revision.
     *
     * @return each file that is missing or not what was written, by name; empty where all is well
     */
    public List<Problem> verify() {
        return LedgerCheck.of(store);
    }

    static List<DayEntry> newest(List<DayEntry> entries) {
        SortedMap<LocalDate, DayEntry> newest = new TreeMap<>();
        entries.forEach(entry -> newest.put(entry.day(), entry));
        return List.copyOf(newest.values());
    }

    static DayEntry parse(Store store, Journal journal, JournalEntry entry) {
        return DayEntryJson.read(entry, store.place(journal.name(entry.number())));
    }

    private List<DayEntry> entries() {
        Journal journal = Journal.in(store, JOURNAL);
        List<JournalEntry> entries = journal.entries();
        if (!entries.isEmpty()) {
            description();
        }
        return entries.stream().map(entry -> parse(store, journal, entry)).toList();
    }

    /** The description as it is there now, which must be of these terms. */
    private void description() {
        terms(store)
                .orElseThrow(() -> new IllegalStateException("a journal without a description"))
                .require(terms, store.place(Terms.FILE));
    }

    private static Optional<Terms> terms(Store store) {
        Optional<byte[]> content = store.read(Terms.FILE);
        if (content.isEmpty()) {
            refuseHeadless(store);
        }
        return content.map(bytes -> Terms.read(bytes, store.place(Terms.FILE)));
    }

    private static void refuseHeadless(Store store) {
        String first = Journal.in(store, JOURNAL).name(1);
        if (store.size(first).isPresent() && store.size(Terms.FILE).isEmpty()) {
            throw Fault.storage("missing, though days have been posted")
                    .at(store.place(Terms.FILE))
                    .remedy("restore the file from a copy, then run verify");
        }
    }
}
