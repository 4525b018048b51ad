package turnstone.plant;

import java.util.ArrayList;
import java.util.List;

/** Names that must have been given elsewhere in the plant file, or must be given once. */
final class Known {
    private Known() {}

    /** The name, where it is one of these. */
    static String name(Entry entry, List<String> known, String kind) {
        return name(entry, entry.text(), known, kind);
    }

    static String name(Entry entry, String name, List<String> known, String kind) {
        if (known.contains(name)) {
            return name;
        }
        String nearest = Spelling.nearest(name, known);
        String hint = Spelling.near(name, nearest) ? ", did you mean `" + nearest + "`?" : "";
        throw entry.fault("unknown " + kind + " `" + name + "`" + hint).expected("one of " + String.join(", ", known));
    }

    /** The names, where each is one of these and none comes twice. */
    static List<String> names(Entry list, List<String> known, String kind) {
        for (Entry item : list.items()) {
            name(item, known, kind);
        }
        return once(list.items(), kind);
    }

    /** The texts of these values, where none comes twice. */
    static List<String> once(List<Entry> values, String kind) {
        List<String> names = new ArrayList<>();
        for (Entry value : values) {
            if (names.contains(value.text())) {
                throw value.fault(kind + " `" + value.text() + "` is given twice");
            }
            names.add(value.text());
        }
        return List.copyOf(names);
    }
}
