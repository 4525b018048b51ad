package turnstone.spark;

/** Reads decimals strictly: what a person would call a number, and nothing that only Java does ({@code 1d}, {@code 0x1p3}). */
final class Decimals {
    private Decimals() {}

    /** How a field reads. */
    enum Reading {
        /** A decimal. */
        NUMBER,
        /** A word for not-a-number or infinity. */
        NON_FINITE,
        /** Anything else. */
        NOT_A_NUMBER
    }

    static Reading reading(String text) {
        int digits = 0;
        for (int i = 0; i < text.length(); i++) {
            char c = text.charAt(i);
            if (c >= '0' && c <= '9') {
                digits++;
            } else if (c != '.' && c != '-' && c != '+' && c != 'e' && c != 'E') {
                return word(text);
            }
        }
        return digits > 0 ? Reading.NUMBER : Reading.NOT_A_NUMBER;
    }

    private static Reading word(String text) {
        String plain = text.startsWith("-") || text.startsWith("+") ? text.substring(1) : text;
        return plain.equalsIgnoreCase("nan") || plain.equalsIgnoreCase("inf") || plain.equalsIgnoreCase("infinity")
                ? Reading.NON_FINITE
                : Reading.NOT_A_NUMBER;
    }
}
