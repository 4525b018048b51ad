package turnstone.store;

import java.util.regex.Pattern;

/**
 * The rule for names in a store: one or more segments joined by {@code /}, each of 1 to 200 letters, digits, {@code . _ - = @ +},
 * starting with a letter or a digit. So no name climbs out of the store, hides, or is spelled in two ways.
 */
final class Names {
    private static final Pattern NAME =
            Pattern.compile("[A-Za-z0-9][A-Za-z0-9._=@+-]{0,199}(/[A-Za-z0-9][A-Za-z0-9._=@+-]{0,199})*");

    private Names() {}

    static String check(String name) {
        if (name == null || !NAME.matcher(name).matches()) {
            throw new IllegalArgumentException("not a name in a store: " + name);
        }
        return name;
    }
}
