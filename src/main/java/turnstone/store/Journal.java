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
 * <tr><td>{@code previous}</td><td>SHA-256 of the bytes of the entry before, or the journal's start for the first</td></tr>
 * <tr><td>{@code writer}</td><td>a name made anew for each attempt, so that no two attempts write the same bytes</td></tr>
 * <tr><td>{@code check}</td><td>SHA-256 of the canonical form of all the rest</td></tr>
 * </table>
 *
 * <p>An altered entry is noticed by its {@code check} or by the next one's {@code previous}; a swapped one likewise; a missing one by a
 * later one that is there. That the newest entries were taken away whole can't be noticed from the journal alone.
 */
public final class Journal {
    /** SHA-256 that stands before the first entry where the journal has nothing to hang on. */
    public static final String NO_START = "0".repeat(64);

    /** How far behind the first missing number a reader looks for a later one: one look is cheap, and holes are rare. */
    private static final int LOOK_AHEAD = 4;
    /** How far {@link #verify} looks: far enough for a few years of nights taken away. */
    private static final int LOOK_AHEAD_VERIFYING = 1000;

    private static final List<String> OWN_KEYS = List.of("number", "previous", "writer", "check");

    private final Store store;
    private final String folder;
    private final String start;

    private Journal(Store store, String folder, String start) {
        this.store = store;
        this.folder = Names.check(folder);
        this.start = start;
    }

    /**
     * The journal in a folder of a store; nothing is read or written yet.
     *
     * @param start SHA-256 of the file that the journal hangs on, or {@link #NO_START}
     */
    public static Journal in(Store store, String folder, String start) {
        if (!Digests.isSha256(start)) {
            throw new IllegalArgumentException("not a SHA-256: " + start);
        }
        return new Journal(store, folder, start);
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

    /** The entries given, which are the first ones, and all that have been added since. */
    public List<JournalEntry> entriesAfter(List<JournalEntry> known) {
        List<JournalEntry> entries = new ArrayList<>(known);
        while (true) {
            long number = entries.size() + 1L;
            Optional<byte[]> content = store.read(name(number));
            if (content.isEmpty()) {
                if (missingBefore(number, LOOK_AHEAD).isEmpty()) {
                    return List.copyOf(entries);
                }
                // A later one is there. Perhaps both came since the look: only a second look makes the hole certain.
                content = store.read(name(number));
                if (content.isEmpty()) {
                    throw notAsWritten(new Problem(
                            name(number), Problem.Trouble.MISSING, "an entry before later ones", "nothing"));
                }
            }
            String previous =
                    entries.isEmpty() ? start : entries.get(entries.size() - 1).sha256();
            entries.add(parse(number, content.get(), previous));
        }
    }

    /**
     * Publishes entry {@code number} = one more than the newest that the caller has seen.
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
                .put("previous", newest.map(JournalEntry::sha256).orElse(start))
                .put("writer", RunNames.fresh());
        entry.setAll(content);
        entry.put("check", Json.fingerprint(entry));
        return store.publish(name(number), Json.pretty(entry));
    }

    /** Reads everything again and names each entry that is missing or not what was written. */
    public List<Problem> verify() {
        List<Problem> problems = new ArrayList<>();
        String previous = start;
        for (long number = 1; ; number++) {
            Optional<byte[]> content = store.read(name(number));
            if (content.isEmpty()) {
                if (missingBefore(number, LOOK_AHEAD_VERIFYING).isEmpty()) {
                    return problems;
                }
                problems.add(
                        new Problem(name(number), Problem.Trouble.MISSING, "an entry before later ones", "nothing"));
                previous = null;
                continue;
            }
            check(number, content.get(), previous).ifPresent(problems::add);
            previous = Json.sha256(content.get());
        }
    }

    private Optional<Long> missingBefore(long number, int lookAhead) {
        for (long later = number + 1; later <= number + lookAhead; later++) {
            if (store.size(name(later)).isPresent()) {
                return Optional.of(later);
            }
        }
        return Optional.empty();
    }

    private JournalEntry parse(long number, byte[] content, String previous) {
        Optional<Problem> problem = check(number, content, previous);
        if (problem.isPresent()) {
            throw notAsWritten(problem.get());
        }
        ObjectNode node = (ObjectNode) Json.read(content, store.place(name(number)));
        return new JournalEntry(number, Json.sha256(content), node.without(OWN_KEYS));
    }

    /** Null for {@code previous} means: not known, because that entry is missing. */
    private Optional<Problem> check(long number, byte[] content, String previous) {
        String name = name(number);
        Optional<ObjectNode> parsed = object(content, name);
        if (parsed.isEmpty()) {
            return altered(name, "an entry of a journal", "other text of SHA-256 " + Json.sha256(content));
        }
        ObjectNode entry = parsed.get();
        String stated = entry.path("check").asText();
        String computed = Json.fingerprint(entry.deepCopy().without("check"));
        if (!stated.equals(computed)) {
            return altered(name, "check " + stated, computed);
        }
        if (!Arrays.equals(content, Json.pretty(entry))) {
            return altered(name, "the bytes of its form", "another form of the same content");
        }
        if (entry.path("number").asLong() != number) {
            return altered(
                    name, "number " + number, "number " + entry.path("number").asText());
        }
        String before = entry.path("previous").asText();
        if (previous != null && !before.equals(previous)) {
            return altered(
                    name,
                    "previous " + previous,
                    "previous " + before + ": this entry or the one before it was changed");
        }
        return Optional.empty();
    }

    private Optional<ObjectNode> object(byte[] content, String name) {
        try {
            return Json.read(content, name) instanceof ObjectNode node ? Optional.of(node) : Optional.empty();
        } catch (Fault notJson) {
            return Optional.empty();
        }
    }

    private static Optional<Problem> altered(String name, String expected, String found) {
        return Optional.of(new Problem(name, Problem.Trouble.ALTERED, expected, found));
    }

    private Fault notAsWritten(Problem problem) {
        return Fault.storage("not what was written: " + problem.trouble().label())
                .at(store.place(problem.file()))
                .found(problem.found())
                .expected(problem.expected())
                .remedy("restore the file from a copy, then run verify");
    }
}
