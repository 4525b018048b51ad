package turnstone.night;

import java.util.Locale;

/** Numbers as a person reads them. */
public final class Words {
    private static final double POINTS = 100;

    private Words() {}

    /** {@code 24 817}. */
    public static String number(long value) {
        return String.format(Locale.ROOT, "%,d", value).replace(',', ' ');
    }

    /** {@code 0.42 %}. */
    public static String share(double share) {
        return String.format(Locale.ROOT, "%.2f %%", share * POINTS);
    }

    /** The first digits of a fingerprint, enough to name a model. */
    public static String shortened(String fingerprint) {
        return fingerprint.substring(0, 12);
    }
}
