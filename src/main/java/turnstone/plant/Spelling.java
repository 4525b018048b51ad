package turnstone.plant;

import java.util.List;
import java.util.Locale;
import turnstone.fault.Fault;

/** The nearest known word to a misspelt one. */
public final class Spelling {
    private Spelling() {}

    /** The refusal of a name that is none of these, with the nearest of them where it may have been meant. */
    public static Fault unknown(String kind, String name, List<String> known) {
        String nearest = nearest(name, known);
        String hint = near(name, nearest) ? ", did you mean `" + nearest + "`?" : "";
        return Fault.usage("unknown " + kind + " `" + name + "`" + hint).expected("one of " + String.join(", ", known));
    }

    /** The word with the least changes of one letter; the first of equals. */
    static String nearest(String word, List<String> known) {
        String nearest = "";
        int least = Integer.MAX_VALUE;
        for (String candidate : known) {
            int changes = changes(word, candidate);
            if (changes < least) {
                least = changes;
                nearest = candidate;
            }
        }
        return nearest;
    }

    /** Whether one may have been meant for the other: at most half of its letters differ. */
    static boolean near(String word, String candidate) {
        return !candidate.isEmpty() && 2 * changes(word, candidate) <= Math.max(word.length(), candidate.length());
    }

    /** Letters to add, take out or replace (Levenshtein 1966), upper and lower case alike. */
    private static int changes(String left, String right) {
        String from = left.toLowerCase(Locale.ROOT);
        String to = right.toLowerCase(Locale.ROOT);
        int[] row = new int[to.length() + 1];
        for (int j = 0; j <= to.length(); j++) {
            row[j] = j;
        }
        for (int i = 1; i <= from.length(); i++) {
            int diagonal = row[0];
            row[0] = i;
            for (int j = 1; j <= to.length(); j++) {
                int replaced = diagonal + (from.charAt(i - 1) == to.charAt(j - 1) ? 0 : 1);
                diagonal = row[j];
                row[j] = Math.min(replaced, 1 + Math.min(row[j], row[j - 1]));
            }
        }
        return row[to.length()];
    }
}
