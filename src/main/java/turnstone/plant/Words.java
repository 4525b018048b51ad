package turnstone.plant;

import java.util.Locale;

/** Constants as the plant file writes them: {@code AS_COUNTED} is {@code as counted}. */
final class Words {
    private Words() {}

    static String of(Enum<?> constant) {
        return constant.name().toLowerCase(Locale.ROOT).replace('_', ' ');
    }

    /** The constant of a word that the schema has let through. */
    static <E extends Enum<E>> E constant(Class<E> type, String word) {
        return Enum.valueOf(type, word.toUpperCase(Locale.ROOT).replace(' ', '_'));
    }
}
