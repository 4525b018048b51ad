package turnstone.spark;

import java.util.HashMap;
import java.util.Map;
import org.apache.spark.unsafe.types.UTF8String;

/** Turns the engine's strings into ours once per distinct text, and knows the last one without looking. */
final class TextMemo {
    private static final int MOST_REMEMBERED = 100_000;

    /** A text in both forms; ours is made once. */
    private record Text(UTF8String bytes, String text) {}

    private final Map<UTF8String, Text> known = new HashMap<>();
    private Text last;

    String of(UTF8String value) {
        if (last == null || !last.bytes.equals(value)) {
            Text found = known.get(value);
            last = found == null ? remembered(value) : found;
        }
        return last.text;
    }

    private Text remembered(UTF8String value) {
        if (known.size() >= MOST_REMEMBERED) {
            known.clear();
        }
        // The engine writes over its strings: what is kept is a copy.
        Text text = new Text(value.copy(), value.toString());
        known.put(text.bytes, text);
        return text;
    }
}
