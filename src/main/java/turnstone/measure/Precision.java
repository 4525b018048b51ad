package turnstone.measure;

import java.util.Locale;

/** How many integer counts a channel may take. It changes cost, never a sum. */
public enum Precision {
    /** |q| &lt; 2^21: one word in the block kernel. */
    COARSE(1L << 21),
    /** |q| &lt; 2^43 − 2^21: two words, q = hi·2^22 + lo, each as a coarse count. */
    FINE((1L << 43) - (1L << 21));

    private final long limit;

    Precision(long limit) {
        this.limit = limit;
    }

    /** Counts are below this in size. */
    public long limit() {
        return limit;
    }

    /** The word for files and messages. */
    public String label() {
        return name().toLowerCase(Locale.ROOT);
    }
}
