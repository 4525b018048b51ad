package turnstone.spark;

import java.util.HashMap;
import java.util.Map;
import org.apache.spark.unsafe.types.UTF8String;

/** Turns the engine's strings into ours once per distinct text, and knows the last one without looking. */
final class TextMemo {
    private static final int MOST_REMEMBERED = 100_000;

    private final Map<UTF8String, String> known = new HashMap<>();
    private UTF8String last;
    private String lastText;

    String of(UTF8String value) {
        if (last != null && last.equals(value)) {
            return lastText;
        }
        String text = known.get(value);
        UTF8String own = value.copy();
        if (text == null) {
            if (known.size() >= MOST_REMEMBERED) {
                known.clear();
            }
            text = value.toString();
            known.put(own, text);
        }
        last = own;
        lastText = text;
        return text;
    }
}
