package turnstone.fisher;

/** Whether the counts hold the source's values exactly: it decides what variance as small as the rounding itself means. */
public enum RoundedSource {
    /** Every count is the recorded value: a direction of very small variance may be real, and is remarked upon. */
    LOSSLESS,
    /** The head or the count scale rounded: variance of about step²/12 is rounding noise, and a ridge is required. */
    ROUNDED
}
