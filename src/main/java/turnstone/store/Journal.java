package turnstone.store;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import turnstone.fault.Fault;
import turnstone.json.Json;

/**
 * A sequence of numbered, immutable entries: {@code FOLDER/00000001.json}, {@code 00000002.json}, … Whoever publishes a number has made
 * that change; everybody else has lost and has to look again.
 *
 * <p>Read by number until the first that is missing, never by listing. Besides its content each entry carries
 *
 * <table>
 * <caption>Keys that the journal adds</caption>
 * <tr><th>key</th><th>content</th></tr>
 * <tr><td>{@code number}</td><td>its number, from 1</td></tr>
 * <tr><td>{@code previous}</td><td>SHA-256 of the bytes of the entry before; 64 zeros in the first</td></tr>
 * <tr><td>{@code writer}</td><td>a name made anew for each attempt, so that no two attempts write the same bytes</td></tr>
 * <tr><td>{@code check}</td><td>SHA-256 of the canonical form of all the rest</td></tr>
 * </table>
 *
 * <p>An altered entry is noticed by its {@code check}, a replaced one by the next one's {@code previous}, one under another's number by
 * its {@code number}, a missing one by a later one that is there. That the newest entries were taken away whole can't be noticed from
 * the journal alone.
 */
public final class Journal {
    private static final String NOTHING_BEFORE = "0".repeat(64);

    /** How far behind the first missing number a reader looks for a later one: one look is cheap, and holes are rare. */
    private static final int LOOK_AHEAD = 4;
    /** How far {@link #scan} looks: far enough for a few years of nights taken away. */
    private static final int LOOK_AHEAD_SCANNING = 1000;

    private static final List<String> OWN_KEYS = List.of("number", "previous", "writer", "check");

    private final Store store;
    private final String folder;

    private Journal(Store store, String folder) {
        this.store = store;
        this.folder = Names.check(folder);
    }

    /** The journal in a folder of a store; nothing is read or written yet. */
    public static Journal in(Store store, String folder) {
        return new Journal(store, folder);
    }

    /** The name in the store of entry {@code number}. */
    public String name(long number) {
        if (number < 1 || number > 99_999_999) {
            throw new IllegalArgumentException("not the number of an entry: " + number);
        }
        return String.format(Locale.ROOT, "%s/%08d.json", folder, number);
    }

    /**
     * All entries, in order of their numbers.
     *
     * @throws Fault of kind storage where an entry is not what was written, or one is missing before a later one
     */
    public List<JournalEntry> entries() {
        return entriesAfter(List.of());
    }

    /**
     * The entries given and all that have been added since.
     *
     * @param known the first entries, as read before
     */
    public List<JournalEntry> entriesAfter(List<JournalEntry> known) {
        JournalScan scan = scan(known, LOOK_AHEAD);
        for (Problem problem : scan.problems()) {
            throw Fault.storage("not what was written: " + problem.trouble().label())
                    .at(store.place(problem.file()))
                    .found(problem.found())
                    .expected(problem.expected())
                    .remedy("restore the file from a copy, then run verify");
        }
        return scan.entries();
    }

    /** Reads everything again; tells what is whole and names what isn't. */
    public JournalScan scan() {
        return scan(List.of(), LOOK_AHEAD_SCANNING);
    }

    /**
     * Publishes the entry after {@code newest}.
     *
     * @param newest the newest entry that the caller has seen, or empty where there was none
     * @param content what the entry says; the journal's own keys are added
     * @return {@link Outcome#LOST} where somebody else has published that number: read it, then decide again
     */
    public Outcome append(Optional<JournalEntry> newest, ObjectNode content) {
        for (String key : OWN_KEYS) {
            if (content.has(key)) {
                throw new IllegalArgumentException("the journal sets " + key + " itself");
            }
        }
        long number = newest.map(JournalEntry::number).orElse(0L) + 1;
        ObjectNode entry = Json.object()
                .put("number", number)
                .put("previous", newest.map(JournalEntry::sha256).orElse(NOTHING_BEFORE))
                .put("writer", RunNames.fresh());
        entry.setAll(content);
        entry.put("check", Json.fingerprint(entry));
        return store.publish(name(number), Json.pretty(entry));
    }

    private JournalScan scan(List<JournalEntry> known, int lookAhead) {
        List<JournalEntry> entries = new ArrayList<>(known);
        List<Problem> problems = new ArrayList<>();
        // Null: the entry before is missing or has a problem of its own, so the link to it tells nothing new.
        String before =
                known.isEmpty() ? NOTHING_BEFORE : known.get(known.size() - 1).sha256();
        for (long number = known.size() + 1L; ; number++) {
            Optional<byte[]> content = store.read(name(number));
            if (content.isEmpty()) {
                if (!laterThan(number, lookAhead)) {
                    return new JournalScan(entries, problems);
                }
                // Perhaps both came since the first look: a second look makes the hole certain.
                content = store.read(name(number));
            }
            Optional<Problem> problem = content.isEmpty() ? missing(number) : flaw(number, content.get());
            if (problem.isPresent()) {
                problems.add(problem.get());
                before = null;
                continue;
            }
            ObjectNode node = (ObjectNode) Json.read(content.get(), name(number));
            String previous = node.path("previous").asText();
            if (before != null && !before.equals(previous)) {
                problems.add(replaced(number, previous, before));
            }
            before = Json.sha256(content.get());
            entries.add(new JournalEntry(number, before, node.without(OWN_KEYS)));
        }
    }

    private boolean laterThan(long number, int lookAhead) {
        for (long later = number + 1; later <= number + lookAhead; later++) {
            if (store.size(name(later)).isPresent()) {
                return true;
            }
        }
        return false;
    }

    /** What is wrong with an entry by itself. */
    private Optional<Problem> flaw(long number, byte[] content) {
        Optional<ObjectNode> parsed = object(content, name(number));
        if (parsed.isEmpty()) {
            return altered(number, "an entry of a journal", "other text of SHA-256 " + Json.sha256(content));
        }
        ObjectNode entry = parsed.get();
        String stated = entry.path("check").asText();
        String computed = Json.fingerprint(entry.deepCopy().without("check"));
        if (!stated.equals(computed)) {
            return altered(number, "content of SHA-256 " + stated, computed);
        }
        if (!Arrays.equals(content, Json.pretty(entry))) {
            return altered(number, "the form that it was written in", "the same content in another form");
        }
        if (entry.path("number").asLong() != number) {
            return altered(
                    number, "number " + number, "number " + entry.path("number").asText());
        }
        return Optional.empty();
    }

    private static Optional<ObjectNode> object(byte[] content, String name) {
        try {
            return Json.read(content, name) instanceof ObjectNode node ? Optional.of(node) : Optional.empty();
        } catch (Fault notJson) {
            return Optional.empty();
        }
    }

    private Optional<Problem> missing(long number) {
        return Optional.of(new Problem(name(number), Problem.Trouble.MISSING, "an entry before later ones", "nothing"));
    }

    private Optional<Problem> altered(long number, String expected, String found) {
        return Optional.of(new Problem(name(number), Problem.Trouble.ALTERED, expected, found));
    }

    /** Entry {@code number} is whole and remembers another one before it. */
    private Problem replaced(long number, String remembered, String there) {
        return number == 1
                ? new Problem(name(1), Problem.Trouble.ALTERED, "the first entry", "one that follows another")
                : new Problem(name(number - 1), Problem.Trouble.ALTERED, "SHA-256 " + remembered, there);
    }
}
